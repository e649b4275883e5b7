import { describe, expect, it, test } from 'vitest'
import { thermalVoltage } from '../../../shared/physics/constants.js'
import { makeCurve } from '../../../shared/physics/curve.js'
import {
  bestGaps,
  darkCurrentMaCm2,
  deviceLimit,
  limitMap,
  logDarkCurrentMaCm2,
  photonCurrent,
  seriesPower,
  shareOfLimit,
  stepCurrentMaCm2,
  ultimateEfficiency,
  type Connection,
} from '../../../shared/physics/limits/index.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'

const global = photonCurrent(referenceSpectrum('AM1.5G').curve)
const direct = photonCurrent(referenceSpectrum('AM1.5D').curve)
const standard = { temperatureK: 298.15 }
const steps = (low: number, high: number, step = 0.01): Float64Array =>
  Float64Array.from({ length: Math.round((high - low) / step) + 1 }, (_, i) => low + i * step)

/** The sun as a black body of 6000 K seen under sin² 0.2666°, or from everywhere. */
function blackBody(dilution: number) {
  const nm = Array.from({ length: 6000 }, (_, i) => 100 * 1.0009 ** i)
  const [h, c, k, t] = [6.62607015e-34, 299_792_458, 1.380649e-23, 6000]
  const irradiance = nm.map((x) => {
    const m = x * 1e-9
    return ((2 * Math.PI * h * c * c) / m ** 5 / Math.expm1((h * c) / (m * k * t))) * dilution * 1e-9
  })
  return photonCurrent(makeCurve(nm, irradiance), 5.670374419e-8 * t ** 4 * dilution)
}
const oneSun = blackBody(2.165e-5)

describe('dark current (checks 3.1 to 3.7)', () => {
  it.each([
    ['3.2', 1.12, 298.15, 6.2496e-14],
    ['3.4', 1.68, 298.15, 4.7363e-23],
    ['3.5', 1.12, 300, 8.2302e-14],
    ['3.6', 1.34, 300, 2.3554e-17],
    ['3.7', 1.68, 300, 7.134e-23],
  ])('%s', (_, gap, kelvin, expected) => expect(darkCurrentMaCm2(gap, kelvin) / expected).toBeCloseTo(1, 4))

  it('3.1 the Boltzmann form agrees to 1e-13 from 1.1 eV on', () => {
    const q = 1.602176634e-19
    const kt = 1.380649e-23 * 300
    const eg = 1.1 * q
    const boltzmann =
      ((2 * Math.PI * q) / (6.62607015e-34 ** 3 * 299_792_458 ** 2)) *
      (kt * eg * eg + 2 * kt * kt * eg + 2 * kt ** 3) *
      Math.exp(-eg / kt) *
      0.1
    expect(Math.abs(darkCurrentMaCm2(1.1, 300) / boltzmann - 1)).toBeLessThan(2e-13)
  })

  it('agrees with the integral also for a gap of a few kT', () => {
    const [gap, kt, n] = [0.05, thermalVoltage(300), 400_000]
    const top = gap + 40 * kt
    const h = (top - gap) / n
    let sum = 0
    for (let i = 0; i <= n; i++) {
      const e = gap + i * h
      sum += ((i === 0 || i === n ? 1 : i % 2 ? 4 : 2) * e * e) / Math.expm1(e / kt)
    }
    const q = 1.602176634e-19
    const integral = ((2 * Math.PI * q ** 4) / (6.62607015e-34 ** 3 * 299_792_458 ** 2)) * ((sum * h) / 3) * 0.1
    expect(darkCurrentMaCm2(gap, 300) / integral).toBeCloseTo(1, 9)
  })

  it('3.22 two-sided emission costs kT ln 2', () => {
    const voltage = (emission: 'oneSided' | 'twoSided'): number =>
      deviceLimit(global, [1.34], 'series', { ...standard, emission }).series!.openCircuitV
    expect(voltage('oneSided') - voltage('twoSided')).toBeCloseTo(0.01781, 5)
    expect(voltage('twoSided')).toBeCloseTo(1.0657, 4)
  })

  it('does not underflow for a wide gap at low temperature', () => {
    expect(logDarkCurrentMaCm2(3, 20)).toBeLessThan(-1700)
    expect(deviceLimit(global, [3], 'series', { temperatureK: 100 }).series!.openCircuitV).toBeGreaterThan(2.8)
  })
})

describe('single junctions under AM1.5G (checks 3.8 to 3.25)', () => {
  test.each([
    ['3.8', 0.67, 298.15, 61.083, 0.4624, 0.7931, 22.39],
    ['3.10', 1.12, 298.15, 43.811, 0.8783, 0.8705, 33.48],
    ['3.11', 1.34, 298.15, 35.032, 1.0835, 0.8897, 33.76],
    ['3.13', 1.55, 298.15, 27.264, 1.2797, 0.9031, 31.5],
    ['3.14', 1.6, 298.15, 25.467, 1.3263, 0.9057, 30.58],
    ['3.15', 1.68, 298.15, 23.06, 1.4013, 0.9097, 29.39],
    ['3.17', 1.12, 300, 43.811, 0.8766, 0.8697, 33.39],
    ['3.18', 1.34, 300, 35.032, 1.0817, 0.8891, 33.68],
  ])('%s: %d eV at %d K', (_, gap, temperatureK, current, voltage, fillFactor, efficiency) => {
    const { series, efficiency: found } = deviceLimit(global, [gap], 'series', { temperatureK })
    expect(Math.abs(series!.currentMaCm2 - current)).toBeLessThan(0.015)
    expect(Math.abs(series!.openCircuitV - voltage)).toBeLessThan(0.0005)
    expect(Math.abs(series!.fillFactor - fillFactor)).toBeLessThan(0.0003)
    expect(Math.abs(100 * found - efficiency)).toBeLessThan(0.03)
  })

  test.each([
    ['3.20 one-sided', 'oneSided', 33.77],
    ['3.21 two-sided', 'twoSided', 33.16],
  ] as const)('%s: the best gap', (_, emission, efficiency) => {
    const best = bestGaps(global, [{ low: 0.5, high: 3 }], 'series', { ...standard, emission })
    expect(Math.abs(100 * best.efficiency - efficiency)).toBeLessThan(0.02)
    expect(Math.abs(best.bandGapsEv[0]! - 1.336)).toBeLessThan(0.003)
  })

  it('3.23 there is a second, lower maximum near 1.145 eV', () => {
    const best = bestGaps(global, [{ low: 1.0, high: 1.2 }], 'series', standard)
    expect(Math.abs(100 * best.efficiency - 33.58)).toBeLessThan(0.02)
    expect(best.bandGapsEv[0]).toBeGreaterThan(1.139)
    expect(best.bandGapsEv[0]).toBeLessThan(1.151)
  })
})

describe('black-body sun (checks 3.25 to 3.33)', () => {
  const range = [
    { low: 0.5, high: 3 },
    { low: 0.4, high: 2.5 },
    { low: 0.4, high: 2 },
  ]
  it.each([
    ['3.25', 'series', 1, 30.96, 0.03],
    ['3.31', 'series', 2, 42.5, 0.05],
    ['3.32', 'independent', 2, 42.87, 0.05],
    ['3.33 series', 'series', 3, 48.64, 0.05],
    ['3.33 independent', 'independent', 3, 49.26, 0.05],
  ] as const)('%s', (_, connection: Connection, junctions, efficiency, within) => {
    const best = bestGaps(oneSun, range.slice(0, junctions), connection)
    expect(Math.abs(100 * best.efficiency - efficiency)).toBeLessThan(within)
  })

  it('3.26 at full concentration', () => {
    const best = bestGaps(blackBody(1), [{ low: 0.7, high: 2 }])
    expect(Math.abs(100 * best.efficiency - 40.8)).toBeLessThan(0.05)
    expect(Math.abs(best.bandGapsEv[0]! - 1.104)).toBeLessThan(0.01)
  })

  it('3.27 the ultimate efficiency', () => {
    const gaps = steps(0.9, 1.4, 0.005)
    const values = Array.from(gaps, (gap) => ultimateEfficiency(oneSun, gap))
    const best = Math.max(...values)
    expect(100 * best).toBeCloseTo(43.88, 2)
    expect(Math.abs(gaps[values.indexOf(best)]! - 1.12)).toBeLessThan(0.01)
  })
})

describe('two and three junctions (checks 3.34 to 3.52)', () => {
  it.each([
    ['3.34 series', 'series', 45.71, 1.6, 0.94],
    ['3.35 four terminals', 'independent', 46.06, 1.73, 0.94],
  ] as const)('%s: the best of a 10 meV grid under AM1.5G', (_, connection: Connection, efficiency, top, bottom) => {
    const map = limitMap(global, steps(1.3, 2.1), steps(0.7, 1.3), connection)
    expect(Math.abs(100 * map.efficiency[map.best]! - efficiency)).toBeLessThan(0.03)
    // Two summits of nearly one height: what is asked is that the named gaps reach the named efficiency.
    const named = deviceLimit(global, [top, bottom], connection)
    expect(Math.abs(100 * named.efficiency - efficiency)).toBeLessThan(0.03)
    expect(map.efficiency[map.best]! - named.efficiency).toBeLessThan(2e-4)
  })

  it.each([
    ['3.37 series', 'series', 45.15, 1.73],
    ['3.38 four terminals', 'independent', 45.34, 1.81],
  ] as const)('%s on a bottom of 1.12 eV', (_, connection: Connection, efficiency, top) => {
    const map = limitMap(global, steps(1.4, 2.2), Float64Array.of(1.12), connection, standard)
    expect(Math.abs(100 * map.efficiency[map.best]! - efficiency)).toBeLessThan(0.03)
    expect(Math.abs(map.topEv[map.best]! - top)).toBeLessThan(0.0101)
  })

  it('3.40 series under AM1.5D', () => {
    const map = limitMap(direct, steps(1.3, 2), steps(0.7, 1.2), 'series', standard)
    expect(Math.abs(100 * map.efficiency[map.best]! - 45.43)).toBeLessThan(0.05)
    expect(Math.abs(map.topEv[map.best % map.topEv.length]! - 1.57)).toBeLessThan(0.0101)
  })

  it('3.41 the best three junctions in series', () => {
    const best = bestGaps(global, [
      { low: 1.5, high: 2.3 },
      { low: 1, high: 1.8 },
      { low: 0.5, high: 1.2 },
    ])
    expect(Math.abs(100 * best.efficiency - 51.62)).toBeLessThan(0.03)
    ;[1.9, 1.367, 0.933].forEach((gap, i) => expect(Math.abs(best.bandGapsEv[i]! - gap)).toBeLessThan(0.01))
  })

  it.each([
    ['3.43', [1.68, 1.12], [23.06, 20.751], 2.2604, 0.9137, 42.84, 44.86],
    ['3.44', [1.73, 1.12], [21.668, 22.143], 2.309, 0.9027, 45.15, 45.16],
    ['3.46', [1.6, 0.94], [25.467, 25.994], 2.02, 0.8911, 45.82, 45.82],
  ])('%s', (_, gaps, currents, voltage, fillFactor, efficiency, independent) => {
    const limit = deviceLimit(global, gaps, 'series', standard)
    limit.currentsMaCm2.forEach((current, i) => expect(Math.abs(current - currents[i]!)).toBeLessThan(0.015))
    expect(limit.series!.openCircuitV).toBeCloseTo(voltage, 4)
    expect(limit.series!.fillFactor).toBeCloseTo(fillFactor, 4)
    expect(Math.abs(100 * limit.efficiency - efficiency)).toBeLessThan(0.03)
    const four = deviceLimit(global, gaps, 'independent', standard)
    expect(Math.abs(100 * four.efficiency - independent)).toBeLessThan(0.03)
  })

  it('3.49 three junctions, and a slice of their map', () => {
    const limit = deviceLimit(global, [1.9, 1.37, 0.94])
    ;[16.967, 17.034, 17.46].forEach((j, i) => expect(Math.abs(limit.currentsMaCm2[i]! - j)).toBeLessThan(0.015))
    expect(limit.series!.openCircuitV).toBeCloseTo(3.3789, 4)
    expect(limit.series!.fillFactor).toBeCloseTo(0.8999, 4)
    expect(Math.abs(100 * limit.efficiency - 51.57)).toBeLessThan(0.03)
    expect(Math.abs(100 * deviceLimit(global, [1.9, 1.37, 0.94], 'independent').efficiency - 51.58)).toBeLessThan(0.03)
    const slice = limitMap(global, Float64Array.of(1.9), Float64Array.of(1.37), 'series', { below: 0.94 })
    expect(slice.efficiency[0]).toBe(limit.efficiency)
  })

  it('3.52 the top gap that matches a step of 1.12 eV', () => {
    const difference = (gap: number): number => 2 * stepCurrentMaCm2(global, gap) - stepCurrentMaCm2(global, 1.12)
    expect(difference(1.7193)).toBeGreaterThan(0)
    expect(difference(1.7213)).toBeLessThan(0)
  })

  it('pairs in the wrong order have no efficiency in a map and are refused alone', () => {
    expect(limitMap(global, Float64Array.of(1), Float64Array.of(1.2)).efficiency[0]).toBe(0)
    expect(() => deviceLimit(global, [1, 1.2])).toThrow(/bandGapsEv\[1\] is 1\.2 eV/)
  })
})

describe('series power (checks 8.1 and 8.6)', () => {
  const cell = { currentMaCm2: 20, logDarkCurrent: Math.log(1e-15), slopeV: 1.2 * thermalVoltage(298.15) }

  it('8.1 identical junctions add their voltages and keep the fill factor', () => {
    const [one, three] = [seriesPower([cell]), seriesPower([cell, cell, cell])]
    expect(three.openCircuitV).toBeCloseTo(3 * one.openCircuitV, 9)
    expect(three.voltageAtMaximumV).toBeCloseTo(3 * one.voltageAtMaximumV, 9)
    expect(three.fillFactor).toBeCloseTo(one.fillFactor, 9)
  })

  it('8.6 agrees with the closed form of the ideal diode and with a search', () => {
    const { series } = deviceLimit(global, [1.34], 'series', standard)
    expect(series!.fillFactor).toBeCloseTo(0.88972, 5)
    const pair = [cell, { ...cell, currentMaCm2: 18.5, logDarkCurrent: Math.log(3e-12) }]
    const power = seriesPower(pair, 2)
    let best = 0
    for (let j = 15; j < 18.5; j += 1e-4) {
      const v = pair.reduce(
        (sum, c) => sum + c.slopeV * Math.log((c.currentMaCm2 - j) / Math.exp(c.logDarkCurrent) + 1),
        0,
      )
      best = Math.max(best, j * (v - 0.002 * j))
    }
    expect(power.powerMwCm2).toBeGreaterThanOrEqual(best)
    expect(power.powerMwCm2 - best).toBeLessThan(1e-6)
  })

  it('a mismatch raises the fill factor', () => {
    const mismatched = seriesPower([cell, { ...cell, currentMaCm2: 21 }])
    expect(mismatched.fillFactor).toBeGreaterThan(seriesPower([cell, cell]).fillFactor + 0.005)
  })

  it('no light, no power; no junction, no device', () => {
    expect(seriesPower([cell, { ...cell, currentMaCm2: 0 }]).powerMwCm2).toBe(0)
    expect(() => seriesPower([])).toThrow(/at least one/)
  })
})

it('the share of the limit is the product of its parts', () => {
  const limit = deviceLimit(global, [1.68, 1.12], 'series', standard)
  const share = shareOfLimit({ currentMaCm2: 19, openCircuitV: 1.9, fillFactor: 0.8 }, limit)
  const efficiency = (10 * 19 * 1.9 * 0.8) / global.irradianceWM2
  expect(share.efficiency).toBeCloseTo(efficiency / limit.efficiency, 12)
  expect(share.current).toBeCloseTo(19 / 20.751, 4)
  expect(() =>
    shareOfLimit({ currentMaCm2: 1, openCircuitV: 1, fillFactor: 1 }, deviceLimit(global, [1.1], 'independent')),
  ).toThrow(/series/)
})

it('light that is negative or absent is refused', () => {
  expect(() => photonCurrent(makeCurve([300, 400], [1, -1]))).toThrow(/spectrum\.values\[1\] is -1/)
  expect(() => photonCurrent(makeCurve([300, 400], [0, 0]))).toThrow(/irradianceWM2/)
})
