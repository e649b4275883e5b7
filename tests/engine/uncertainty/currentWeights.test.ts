import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { PHOTON_ENERGY_NM_EV } from '../../../shared/physics/constants.js'
import { makeCurve, valueAt } from '../../../shared/physics/curve.js'
import type { Curve } from '../../../shared/physics/curve.js'
import { currentWeights, weightedSum } from '../../../shared/physics/uncertainty/index.js'
import { deviceErrors, shiftedCurrent } from '../../../shared/physics/uncertainty/errorSources.js'
import { shiftTable, tabulatedCurrent } from '../../../shared/physics/uncertainty/shiftTable.js'
import { band, stripedSun, tandem } from './device.js'

/** The same integral on the union of the grids by Simpson's rule, exact for the product of two linear pieces. */
function simpson(eqe: Curve, sun: Curve): number {
  const flux = makeCurve(
    sun.wavelengthNm,
    sun.values.map((e, j) => e * sun.wavelengthNm[j]!),
  )
  const grid = [...new Set([...eqe.wavelengthNm, ...sun.wavelengthNm])].sort((a, b) => a - b)
  let sum = 0
  for (let i = 1; i < grid.length; i++) {
    const [a, b] = [grid[i - 1]!, grid[i]!]
    if (a < eqe.wavelengthNm[0]! || b > eqe.wavelengthNm.at(-1)!) continue
    const f = (x: number): number => valueAt(eqe, x) * valueAt(flux, x)
    sum += ((b - a) / 6) * (f(a) + 4 * f(0.5 * (a + b)) + f(b))
  }
  return sum / (10 * PHOTON_ENERGY_NM_EV)
}

describe('weights of the current', () => {
  const sun = stripedSun().curve

  it('give the exact integral of the product on the union of the grids', () => {
    const eqe = band(310, 770, 0.88)
    const j = weightedSum(currentWeights(eqe.wavelengthNm, sun), eqe.values)
    expect(Math.abs(j / simpson(eqe, sun) - 1)).toBeLessThan(1e-12)
  })

  it('give the closed form for a flat response under a flat photon flux', () => {
    // E λ = 1239.84 W/m² at every wavelength: 1 A/m² per nm, so 0.1 mA/cm² per nm.
    const nm = [300, 420, 555, 900]
    const flat = makeCurve(
      nm,
      nm.map((x) => PHOTON_ENERGY_NM_EV / x),
    )
    const grid = Float64Array.of(350, 351, 400, 700)
    expect(weightedSum(currentWeights(grid, flat), Float64Array.of(1, 1, 1, 1))).toBeCloseTo(35, 10)
  })

  it('count nothing where the spectrum does not reach', () => {
    const short = makeCurve([500, 600], [1, 1])
    const weights = currentWeights(Float64Array.of(300, 400, 499, 550, 800, 900), short)
    expect(weights[0]).toBe(0)
    expect(weights[5]).toBe(0)
    expect(weights[3]).toBeGreaterThan(0)
  })

  it('are linear in the spectrum and add up over parts of the response', () => {
    const grid = fc
      .uniqueArray(fc.integer({ min: 250, max: 2100 }), { minLength: 3, maxLength: 40 })
      .map((nm) => Float64Array.from(nm).sort())
    fc.assert(
      fc.property(grid, fc.double({ min: 0.01, max: 10, noNaN: true }), (nm, scale) => {
        const one = currentWeights(nm, sun)
        const scaled = currentWeights(nm, { ...sun, values: sun.values.map((e) => e * scale) })
        one.forEach((w, k) => expect(Math.abs(scaled[k]! - scale * w)).toBeLessThan(1e-12 * scale * 100))
        const total = weightedSum(
          one,
          nm.map(() => 1),
        )
        const ends = currentWeights(Float64Array.of(nm[0]!, nm[nm.length - 1]!), sun)
        expect(Math.abs(total - ends[0]! - ends[1]!)).toBeLessThan(1e-11 * Math.max(1, total))
      }),
      { seed: 23, numRuns: 40 },
    )
  })

  it('refuse a grid that does not rise', () => {
    expect(() => currentWeights(Float64Array.of(400, 400), sun)).toThrow('wavelengthNm[1] = 400')
  })
})

describe('table of the current against a wavelength offset', () => {
  it.each([0.5, 1, 3])('is within 1e-6 of the exact integral for offsets up to six times %d nm', (u) => {
    const errors = deviceErrors(tandem(), stripedSun())
    for (const junction of [0, 1]) {
      const table = shiftTable(errors, junction, 6 * u)
      for (let k = 0; k <= 200; k++) {
        const offset = 6 * u * (k / 100 - 1) * 0.9973
        const exact = shiftedCurrent(errors, junction, offset)
        expect(Math.abs(tabulatedCurrent(table, offset) / exact - 1)).toBeLessThan(1e-6)
      }
    }
  })

  it('integrates beyond its ends', () => {
    const errors = deviceErrors(tandem(), stripedSun())
    const table = shiftTable(errors, 0, 1)
    expect(tabulatedCurrent(table, 4.2)).toBe(shiftedCurrent(errors, 0, 4.2))
  })
})
