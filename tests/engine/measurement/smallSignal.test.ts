import { describe, expect, it } from 'vitest'
import type { JunctionDiode } from '../../../shared/physics/diode/junction.js'
import { stackCurrent, type SeriesStack } from '../../../shared/physics/diode/stack.js'
import { apparentEqe, smallSignal } from '../../../shared/physics/measurement/smallSignal.js'
import { makeCurve } from '../../../shared/physics/curve.js'

const T = 298.15

/** dJ/dJ_ph,i of the full circuit by central differences of two widths (Richardson). */
function finiteDifferences(stack: SeriesStack, voltage: number): number[] {
  return stack.junctions.map((junction, i) => {
    const at = (step: number): number =>
      stackCurrent(
        {
          ...stack,
          junctions: stack.junctions.map((j, k) =>
            k === i ? { ...j, photocurrentMaCm2: junction.photocurrentMaCm2 + step } : j,
          ),
        },
        voltage,
      )
    const slope = (h: number): number => (at(h) - at(-h)) / (2 * h)
    const h = 2e-4 * Math.abs(junction.photocurrentMaCm2)
    return (4 * slope(h / 2) - slope(h)) / 3
  })
}

const two = (bottomShunt: number, eta = 0): SeriesStack => ({
  junctions: [
    { diode: { saturationCurrentMaCm2: 1e-19, shuntResistanceKohmCm2: 1000 }, photocurrentMaCm2: 8 },
    { diode: { saturationCurrentMaCm2: 1e-9, shuntResistanceKohmCm2: bottomShunt }, photocurrentMaCm2: 1 },
  ],
  seriesResistanceKohmCm2: 1e-4,
  couplingToNext: [eta],
  temperatureK: T,
})

const three = (limiting: number, shunts: readonly number[], coupling: readonly number[]): SeriesStack => {
  const diodes: JunctionDiode[] = [
    { saturationCurrentMaCm2: 1e-24, shuntResistanceKohmCm2: shunts[0]! },
    { saturationCurrentMaCm2: 1e-17, ideality: 1.2, shuntResistanceKohmCm2: shunts[1]! },
    { saturationCurrentMaCm2: 1e-6, secondSaturationCurrentMaCm2: 1e-4, shuntResistanceKohmCm2: shunts[2]! },
  ]
  return {
    junctions: diodes.map((diode, i) => ({ diode, photocurrentMaCm2: i === limiting ? 2 : 6 + i })),
    seriesResistanceKohmCm2: 2e-3,
    couplingToNext: coupling,
    temperatureK: T,
  }
}

describe('small-signal response', () => {
  it('the issued example: 0.083421 and 0.914750 at 2.364235 mA/cm²', () => {
    const { selectivities, operatingPoint } = smallSignal(two(0.05), 1.1)
    expect(operatingPoint.currentMaCm2).toBeCloseTo(2.364235, 6)
    expect(selectivities[0]).toBeCloseTo(0.083421, 6)
    expect(selectivities[1]).toBeCloseTo(0.91475, 6)
  })

  it('with coupling of 0.3 and 0.5 kΩ cm²: 0.236447 and 0.763401', () => {
    const { selectivities } = smallSignal(two(0.5, 0.3), 1.1)
    expect(selectivities[0]).toBeCloseTo(0.236447, 6)
    expect(selectivities[1]).toBeCloseTo(0.763401, 6)
  })

  it.each([
    [1000, 0, 4.0e-6, 0.999996, 1e-6],
    [1, 0, 0.005182, 0.994818, 1e-6],
    [0.3, 0, 0.032824, 1 - 0.032824, 1e-6],
    [0.3, 1.5, 0.014587, 1 - 0.014587, 1e-6],
  ])('bottom shunt %f kΩ cm² at %f V', (shunt, voltage, top, bottom, tolerance) => {
    const stack: SeriesStack = {
      junctions: [
        {
          diode: { saturationCurrentMaCm2: 1e-17, ideality: 1.5, shuntResistanceKohmCm2: 100 },
          photocurrentMaCm2: 10,
        },
        { diode: { saturationCurrentMaCm2: 1e-9, shuntResistanceKohmCm2: shunt }, photocurrentMaCm2: 1 },
      ],
      temperatureK: T,
    }
    const { selectivities } = smallSignal(stack, voltage)
    expect(Math.abs(selectivities[0]! - top)).toBeLessThan(tolerance)
    expect(Math.abs(selectivities[1]! - bottom)).toBeLessThan(tolerance)
  })

  it.each([
    ['two, shunted', two(0.05), 1.1],
    ['two, shunted and coupled', two(0.5, 0.3), 1.1],
    ['two, short circuit', two(1), 0],
    ['three, top limits', three(0, [0.4, 50, 50], [0, 0]), 1.5],
    ['three, middle limits, coupled', three(1, [20, 0.3, 5], [0.2, 0.5]), 1.2],
    ['three, bottom limits, coupled', three(2, [20, 30, 0.05], [0.4, 0.3]), 2.1],
  ])('%s: equals finite differences of the full circuit to 1e-6', (_, stack, voltage) => {
    const { selectivities } = smallSignal(stack, voltage)
    const expected = finiteDifferences(stack, voltage)
    selectivities.forEach((w, i) => expect(Math.abs(w - expected[i]!)).toBeLessThan(1e-6))
  })

  it('without coupling and series resistance the selectivities sum to one', () => {
    const { selectivities } = smallSignal({ ...three(1, [2, 3, 4], [0, 0]), seriesResistanceKohmCm2: 0 }, 1)
    expect(selectivities.reduce((sum, w) => sum + w, 0)).toBeCloseTo(1, 12)
  })

  it('an ideal limiting bottom cell with coupling η shows (EQE2 + η EQE1)/(1 + η), at most half of EQE1', () => {
    for (const eta of [0.1, 0.46, 1]) {
      const { selectivities } = smallSignal({ ...two(1e6, eta), seriesResistanceKohmCm2: 0 }, 1.1)
      expect(selectivities[0]).toBeCloseTo(eta / (1 + eta), 5)
      expect(selectivities[1]).toBeCloseTo(1 / (1 + eta), 5)
      expect(selectivities[0]).toBeLessThanOrEqual(0.5 + 1e-6)
    }
  })
})

describe('apparent EQE', () => {
  it('is the weighted sum, each curve zero outside its range', () => {
    const top = makeCurve([300, 700], [0.8, 0.8])
    const bottom = makeCurve([701, 1100], [0.9, 0.9])
    const seen = apparentEqe([top, bottom], [0.46 / 1.46, 1 / 1.46], [500, 900, 1200])
    expect(seen.values[0]).toBeCloseTo(0.8 * 0.315068, 6)
    expect(seen.values[1]).toBeCloseTo(0.616438, 6)
    expect(seen.values[2]).toBe(0)
    expect(() => apparentEqe([top], [1, 0], [500])).toThrow(/each junction needs one/)
  })
})
