import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { PHOTON_ENERGY_NM_EV } from '../../shared/physics/constants.js'
import {
  coverage,
  cumulativeCurrentDensity,
  edgeResponse,
  shortCircuitCurrentDensity,
} from '../../shared/physics/currents.js'
import { makeCurve, type Curve } from '../../shared/physics/curve.js'
import { DomainError } from '../../shared/physics/errors.js'
import { makeSpectrum, referenceSpectrum, scaleSpectrum } from '../../shared/physics/spectrum.js'
import { fromFraction, fromNanometres, toFraction, toNanometres } from '../../shared/physics/units.js'

const global = referenceSpectrum('AM1.5G')
const direct = referenceSpectrum('AM1.5D')
const band = (fromNm: number, toNm: number): Curve => makeCurve([fromNm, toNm], [1, 1])
/** EQE 1 from 280 nm to the wavelength of a gap. */
const step = (gapEv: number): Curve => band(280, PHOTON_ENERGY_NM_EV / gapEv)

/** A scan as a laboratory takes it: 10 nm steps, a plateau and an edge at 780 nm. */
const scan = (): Curve => {
  const wavelengthNm = Array.from({ length: 61 }, (_, i) => 300 + 10 * i)
  return makeCurve(
    wavelengthNm,
    wavelengthNm.map((nm) => (0.88 - 2e-4 * Math.abs(nm - 550)) / (1 + Math.exp((nm - 780) / 8))),
  )
}

describe('EQE of 1 over a band (ASTM G173-03, checks 2.10 to 2.19)', () => {
  it.each([
    ['2.10', 280, 4000, 68.983, 63.892],
    ['2.12', 300, 1200, 46.456, 41.91],
    ['2.13', 300, 800, 27.27, 23.892],
    ['2.15', 300, 1100, 43.518, 39.108],
    ['2.16', 400, 700, 19.084, 16.742],
    ['2.17', 300, 1000, 38.061, 33.956],
    ['2.19', 300, 1800, 61.049, 56.019],
  ])('%s: %s to %s nm gives %s (global) and %s (direct) mA/cm²', (_, from, to, underGlobal, underDirect) => {
    expect(Math.abs(shortCircuitCurrentDensity(band(from, to), global) - underGlobal)).toBeLessThan(0.01)
    expect(Math.abs(shortCircuitCurrentDensity(band(from, to), direct) - underDirect)).toBeLessThan(0.01)
  })

  it('2.11: 280 to 1200 nm gives 46.456 mA/cm² (46.46 in Xu et al., PRX Energy 1, 023005 (2022))', () => {
    expect(Math.abs(shortCircuitCurrentDensity(band(280, 1200), global) - 46.456)).toBeLessThan(0.01)
  })

  it('2.33: bands add up', () => {
    const parts = [band(300, 800), band(800, 1200)].map((eqe) => shortCircuitCurrentDensity(eqe, global))
    expect(Math.abs((parts[0]! + parts[1]!) / shortCircuitCurrentDensity(band(300, 1200), global) - 1)).toBeLessThan(
      1e-9,
    )
  })
})

describe('steps of EQE 1 above a gap (checks 2.21 to 2.32)', () => {
  it.each([
    ['2.21', 1.0, 48.22, 43.594],
    ['2.22', 1.1, 44.23, 39.785],
    ['2.23', 1.12, 43.811, 39.386],
    ['2.25', 1.34, 35.032, 31.106],
    ['2.26', 1.42, 32.052, 28.323],
    ['2.28', 1.6, 25.467, 22.233],
    ['2.29', 1.68, 23.06, 20.03],
    ['2.30', 1.75, 21.06, 18.209],
    ['2.32', 1.9, 16.967, 14.5],
  ])('%s: %s eV gives %s (global) and %s (direct) mA/cm²', (_, gap, underGlobal, underDirect) => {
    expect(Math.abs(shortCircuitCurrentDensity(step(gap), global) - underGlobal)).toBeLessThan(0.015)
    expect(Math.abs(shortCircuitCurrentDensity(step(gap), direct) - underDirect)).toBeLessThan(0.015)
  })

  it.each([
    ['2.34', 738, 0.073],
    ['2.34', 1107, 0.0431],
  ])('%s: an edge at %s nm is worth %s mA/cm² a nm', (_, edge, perNm) => {
    const change =
      shortCircuitCurrentDensity(band(280, edge + 0.005), global) -
      shortCircuitCurrentDensity(band(280, edge - 0.005), global)
    expect(Math.abs(change / 0.01 - perNm)).toBeLessThan(5e-5)
  })

  it('1.13: 1 mA/cm² is 10 A/m²: monochromatic light of a known photon flux', () => {
    // 1 W m⁻² nm⁻¹ over 1 nm at 1239.84 nm is 1 A/m² for an EQE of 1.
    const line = makeSpectrum({ id: 'line', name: 'Line', curve: makeCurve([1239.341984, 1240.341984], [1, 1]) })
    expect(shortCircuitCurrentDensity(band(1000, 1300), line)).toBeCloseTo(0.1, 9)
  })
})

describe('the same scan, written differently', () => {
  const current = shortCircuitCurrentDensity(scan(), global)

  it('gives the same current from rows in reversed order and from every unit, to 1e-12', () => {
    const { wavelengthNm, values } = scan()
    for (const unit of ['nm', 'um', 'angstrom', 'eV'] as const)
      for (const of of ['fraction', 'percent', 'A/W'] as const) {
        const rows = Array.from(wavelengthNm, (nm, i) => [
          fromNanometres(nm, unit),
          fromFraction(values[i]!, of, nm),
        ]).reverse()
        const read = rows
          .map(([x, y]) => [toNanometres(x!, unit), toFraction(y!, of, toNanometres(x!, unit))] as const)
          .sort((p, q) => p[0] - q[0])
        const eqe = makeCurve(
          read.map(([x]) => x),
          read.map(([, y]) => y),
        )
        expect(Math.abs(shortCircuitCurrentDensity(eqe, global) / current - 1)).toBeLessThan(1e-12)
      }
  })

  it('is linear in the light and in the EQE', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 1e3, noNaN: true }), (factor) => {
        const brighter = scaleSpectrum(global, 1000.37 * factor)
        const unscaled = scaleSpectrum(global, 1000.37)
        const ratio = shortCircuitCurrentDensity(scan(), brighter) / shortCircuitCurrentDensity(scan(), unscaled)
        expect(Math.abs(ratio / factor - 1)).toBeLessThan(1e-12)
        const eqe = { ...scan(), values: scan().values.map((y) => y * factor) }
        expect(Math.abs(shortCircuitCurrentDensity(eqe, global) / (factor * current) - 1)).toBeLessThan(1e-12)
      }),
      { seed: 41, numRuns: 40 },
    )
  })

  it('adds up over bands, wherever they are cut', () => {
    fc.assert(
      fc.property(fc.double({ min: 300, max: 900, noNaN: true }), (cut) => {
        const parts =
          shortCircuitCurrentDensity(scan(), global, 300, cut) + shortCircuitCurrentDensity(scan(), global, cut, 900)
        expect(Math.abs(parts / current - 1)).toBeLessThan(1e-12)
      }),
      { seed: 42 },
    )
  })
})

it('4.19: junctions that share the light of 280 to 1200 nm share 46.456 mA/cm², however they share it', () => {
  const shares = fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 2, maxLength: 40 })
  fc.assert(
    fc.property(shares, (ofTop) => {
      const wavelengthNm = ofTop.map((_, i) => 280 + (920 * i) / (ofTop.length - 1))
      const top = shortCircuitCurrentDensity(makeCurve(wavelengthNm, ofTop), global)
      const rest = ofTop.map((share) => 1 - share)
      const bottom = shortCircuitCurrentDensity(makeCurve(wavelengthNm, rest), global)
      expect(Math.min(top, bottom)).toBeGreaterThanOrEqual(0)
      expect(Math.abs(top + bottom - 46.456)).toBeLessThan(0.01)
    }),
    { seed: 43, numRuns: 50 },
  )
})

describe('shortCircuitCurrentDensity', () => {
  it('does not extrapolate: outside the scan nothing is collected', () => {
    expect(shortCircuitCurrentDensity(band(100, 200), global)).toBe(0)
    expect(shortCircuitCurrentDensity(scan(), global, 900, 1200)).toBe(0)
  })

  it('refuses a band that ends before it begins', () => {
    const wrong = (): number => shortCircuitCurrentDensity(scan(), global, 800, 700)
    expect(wrong).toThrow(DomainError)
    expect(wrong).toThrow('The band ends at 700 nm, before it begins at 800 nm.')
  })

  it.each([
    ['fromNm', NaN, 700],
    ['toNm', 300, NaN],
    ['fromNm', NaN, undefined],
  ])('refuses %s that is no number', (argument, from, to) => {
    const wrong = (): number => shortCircuitCurrentDensity(scan(), global, from, to)
    expect(wrong).toThrow(DomainError)
    expect(wrong).toThrow(argument)
  })
})

describe('cumulativeCurrentDensity', () => {
  it('rises to the current, through the current of each band', () => {
    const { wavelengthNm, values } = cumulativeCurrentDensity(scan(), global)
    expect([wavelengthNm[0], wavelengthNm.at(-1)]).toEqual([300, 900])
    expect(values.at(-1)).toBe(shortCircuitCurrentDensity(scan(), global))
    expect(values.every((value, i) => i === 0 || value >= values[i - 1]!)).toBe(true)
    const at600 = values[wavelengthNm.indexOf(600)]!
    expect(at600).toBeCloseTo(shortCircuitCurrentDensity(scan(), global, 300, 600), 12)
  })
})

describe('coverage', () => {
  it('is whole where the scan reaches from 280 nm beyond its edge', () => {
    const { wavelengthNm, values } = scan()
    expect(coverage(makeCurve([280, ...wavelengthNm], [0.5, ...values]), global)).toBe(1)
  })

  it('is the share of photons up to the edge that the scan saw', () => {
    const { wavelengthNm, values } = scan()
    const late = makeCurve(wavelengthNm.slice(10), values.slice(10))
    const photons = (from: number, to: number): number => shortCircuitCurrentDensity(band(from, to), global)
    expect(coverage(late, global)).toBeCloseTo(photons(400, 780) / photons(280, 780), 2)
    expect(coverage(scan(), global)).toBeGreaterThan(0.999)
  })

  it('takes the end of the scan where the edge has not fallen, and is null without light there', () => {
    expect(coverage(band(400, 600), global)).toBeCloseTo(
      shortCircuitCurrentDensity(band(400, 600), global) / shortCircuitCurrentDensity(band(280, 600), global),
      12,
    )
    const infrared = makeSpectrum({ id: 'ir', name: 'IR', curve: makeCurve([1000, 1100], [1, 1]) })
    expect(coverage(scan(), infrared)).toBeNull()
  })
})

it('edgeResponse is the EQE at both ends of the scan', () => {
  expect(edgeResponse(makeCurve([300, 500, 700], [0.3, 0.8, 0.05]))).toEqual({
    shortNm: 300,
    shortEqe: 0.3,
    longNm: 700,
    longEqe: 0.05,
  })
})
