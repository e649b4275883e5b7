import { describe, expect, it } from 'vitest'
import { shortCircuitCurrentDensity } from '../../../shared/physics/currents.js'
import { makeCurve, valueAt } from '../../../shared/physics/curve.js'
import { lossBudget } from '../../../shared/physics/lossBudget.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'
import { rootSumOfSquares, shiftedCurrent } from '../../../shared/physics/uncertainty/errorSources.js'
import {
  currentWeights,
  deviceErrors,
  propagateDevice,
  runMonteCarlo,
  weightedSum,
} from '../../../shared/physics/uncertainty/index.js'
import { shiftTable, tabulatedCurrent } from '../../../shared/physics/uncertainty/shiftTable.js'
import { band, tandem } from './device.js'

const sun = referenceSpectrum('AM1.5G')

describe('under AM1.5G', () => {
  it('weights give the current of the exact integral', () => {
    const eqe = band(310, 770, 0.88)
    const j = shortCircuitCurrentDensity(eqe, sun)
    expect(Math.abs(weightedSum(currentWeights(eqe.wavelengthNm, sun.curve), eqe.values) / j - 1)).toBeLessThan(1e-12)
  })

  /** Check value: 46 points of 10 nm, each weighted alike; J 21.810, u 0.4362 common and 0.0705 from point to point. */
  it('a step of 0.9 with 2 % has u = 0.4362 common to all points and 0.0705 independent, by the rule of the table', () => {
    const pointsMaCm2 = Array.from({ length: 46 }, (_, k) => 0.9 * 10 * valueAt(sun.photonCurrent, 300 + 10 * k))
    const j = pointsMaCm2.reduce((sum, part) => sum + part, 0)
    expect(j).toBeCloseTo(21.81, 2)
    expect(0.02 * j).toBeCloseTo(0.4362, 4)
    expect(0.02 * rootSumOfSquares(pointsMaCm2)).toBeCloseTo(0.0705, 4)
  })

  it('and 0.4310 and 0.0698 by exact integration (computed with numpy on the union grid)', () => {
    const nm = Float64Array.from({ length: 46 }, (_, k) => 300 + 10 * k)
    const pointsMaCm2 = currentWeights(nm, sun.curve).map((w) => 0.9 * w)
    const j = pointsMaCm2.reduce((sum, part) => sum + part, 0)
    expect(Math.abs(j / 21.55197958958368 - 1)).toBeLessThan(1e-9)
    expect(Math.abs((0.02 * rootSumOfSquares(pointsMaCm2)) / 0.06984426188287274 - 1)).toBeLessThan(1e-9)
  })

  it.each([0.5, 1, 3])('the table of offsets of %d nm is within 1e-6 of the integral', (u) => {
    const errors = deviceErrors(tandem(), sun)
    for (const junction of [0, 1]) {
      const table = shiftTable(errors, junction, 6 * u)
      for (let k = 0; k <= 100; k++) {
        const offset = 6 * u * (k / 50 - 1) * 0.9973
        expect(Math.abs(tabulatedCurrent(table, offset) / shiftedCurrent(errors, junction, offset) - 1)).toBeLessThan(
          1e-6,
        )
      }
    }
  })

  it('propagation and Monte Carlo agree within 3 % for a tandem with every kind of error', () => {
    const errors = deviceErrors(tandem(790), sun)
    const linear = propagateDevice(errors)
    const drawn = runMonteCarlo(errors, { seed: 20 })!
    linear.currents.forEach(({ uncertaintyMaCm2 }, i) =>
      expect(Math.abs(drawn.currents[i]!.uncertainty / uncertaintyMaCm2 - 1)).toBeLessThan(0.03),
    )
    expect(Math.abs(drawn.mismatch!.uncertainty / linear.mismatch!.uncertaintyPercent - 1)).toBeLessThan(0.03)
  })

  it('the loss budget of 300 to 1200 nm adds up to 46.456 mA/cm²', () => {
    const { whole } = lossBudget({
      junctions: [band(310, 770, 0.88), band(770, 1120, 0.9)],
      reflectance: makeCurve([300, 1200], [0.05, 0.05]),
      spectrum: sun,
      toNm: 1200,
    })
    expect(whole.totalMaCm2).toBeCloseTo(46.456, 2)
    const parts = [...whole.junctionsMaCm2, whole.reflectionMaCm2!, whole.remainderMaCm2]
    expect(Math.abs(parts.reduce((sum, part) => sum + part, 0) - whole.totalMaCm2)).toBeLessThan(1e-9)
  })
})
