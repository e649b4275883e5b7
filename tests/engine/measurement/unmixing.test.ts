import { describe, expect, it } from 'vitest'
import { makeCurve, valueAt } from '../../../shared/physics/curve.js'
import { shortCircuitCurrentDensity } from '../../../shared/physics/currents.js'
import { simulateScan } from '../../../shared/physics/measurement/simulateScan.js'
import { unmixScans, unmixWith } from '../../../shared/physics/measurement/unmixing.js'
import { grid, infrared, blue, spectrum, tandem } from '../checks/device.js'

describe('unmixing', () => {
  it('round trip of the example: a = 0.315068 and 0.616438 give 0.9 and 0 back', () => {
    const wavelengthNm = grid(300, 1100, 10)
    const one = makeCurve(
      wavelengthNm,
      wavelengthNm.map((nm) => (nm < 700 ? 0.8 : 0)),
    )
    const two = makeCurve(
      wavelengthNm,
      wavelengthNm.map((nm) => (nm >= 700 ? 0.9 : 0)),
    )
    const seen = makeCurve(
      wavelengthNm,
      wavelengthNm.map((_, i) => (two.values[i]! + 0.46 * one.values[i]!) / 1.46),
    )
    expect(valueAt(seen, 900)).toBeCloseTo(0.616438, 6)
    const [, bottom] = unmixScans([one, seen])
    expect(bottom!.weights[0]!.weight).toBeCloseTo(0.315068, 6)
    expect(bottom!.ownShare).toBeCloseTo(1 / 1.46, 12)
    wavelengthNm.forEach((nm, i) => expect(bottom!.corrected.values[i]).toBeCloseTo(nm >= 700 ? 0.9 : 0, 12))
    expect(Math.max(...bottom!.addedUncertainty)).toBeLessThan(1e-6)
  })

  it('scans that leak into each other are solved together', () => {
    const [top, bottom] = tandem.eqes
    const nm = grid(300, 1200, 5)
    const mixed = [
      makeCurve(
        nm,
        nm.map((x) => 0.93 * valueAt(top!, x) + 0.07 * valueAt(bottom!, x)),
      ),
      makeCurve(
        nm,
        nm.map((x) => 0.85 * valueAt(bottom!, x) + 0.15 * valueAt(top!, x)),
      ),
    ]
    const unmixed = unmixScans(mixed)
    expect(unmixed[0]!.weights[0]!.weight).toBeCloseTo(0.07, 3)
    expect(unmixed[1]!.weights[0]!.weight).toBeCloseTo(0.15, 3)
    nm.forEach((x, i) => {
      expect(Math.abs(unmixed[0]!.corrected.values[i]! - valueAt(top!, x))).toBeLessThan(1e-3)
      expect(Math.abs(unmixed[1]!.corrected.values[i]! - valueAt(bottom!, x))).toBeLessThan(1e-3)
    })
  })

  it.each([0.3, 0.1, 0.06])('a bottom shunt of %f kΩ cm²: Jsc within 0.5 percent of the truth, with noise', (shunt) => {
    const leaky = {
      ...tandem,
      diodes: [tandem.diodes[0]!, { saturationCurrentMaCm2: 1e-10, shuntResistanceKohmCm2: shunt }],
    }
    const wavelengthNm = grid(300, 1200, 5)
    const top = simulateScan(leaky, { wavelengthNm, biasLight: [infrared], biasVoltageV: 0.6, noise: 1e-3, seed: 3 })
    const bottom = simulateScan(leaky, { wavelengthNm, biasLight: [blue], biasVoltageV: 1.1, noise: 1e-3, seed: 4 })
    expect(bottom.truth.selectivities[0]).toBeGreaterThan(0.001)
    const unmixed = unmixScans([top.scan, bottom.scan])[1]!
    const truth = shortCircuitCurrentDensity(tandem.eqes[1]!, spectrum)
    expect(Math.abs(shortCircuitCurrentDensity(unmixed.corrected, spectrum) / truth - 1)).toBeLessThan(0.005)
    expect(Math.abs(unmixed.weights[0]!.weight - bottom.truth.selectivities[0]!)).toBeLessThan(
      4 * unmixed.weights[0]!.uncertainty + 1e-3,
    )
    expect(Math.max(...unmixed.addedUncertainty)).toBeGreaterThan(0)
  })

  it('the originals are not changed', () => {
    const scans = tandem.eqes.map((c) => makeCurve(c.wavelengthNm, c.values))
    const before = scans.map((s) => Array.from(s.values))
    unmixScans(scans)
    expect(scans.map((s) => Array.from(s.values))).toEqual(before)
  })

  it('given weights are applied as they are, and refused when they leave nothing', () => {
    const scan = makeCurve([400, 500], [0.5, 0.5])
    const other = makeCurve([400, 500], [0.9, 0.4])
    const values = unmixWith(scan, [other], [0.2]).values
    expect(values[0]).toBeCloseTo(0.4, 12)
    expect(values[1]).toBeCloseTo(0.525, 12)
    expect(() => unmixWith(scan, [other], [1])).toThrow(/stay below 1/)
    expect(() => unmixWith(scan, [other], [-0.1])).toThrow(/zero or above/)
    expect(() => unmixWith(scan, [other], [])).toThrow(/0 weights for 1/)
    expect(() => unmixScans([scan])).toThrow(/two or more/)
    expect(() => unmixScans([scan, makeCurve([400, 500], [0, 0])])).toThrow(/no response/)
  })
})
