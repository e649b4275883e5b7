import { describe, expect, it } from 'vitest'
import { currentVoltageCurve, currentVoltageFigures } from '../../../shared/physics/diode/currentVoltage.js'
import {
  differentialResistances,
  solveStack,
  stackCurrent,
  stackVoltage,
  type SeriesStack,
} from '../../../shared/physics/diode/stack.js'

const T = 298.15
const P: SeriesStack = {
  junctions: [
    { diode: { saturationCurrentMaCm2: 1e-15, ideality: 1.2, shuntResistanceKohmCm2: 2 }, photocurrentMaCm2: 20 },
  ],
  seriesResistanceKohmCm2: 0.002,
  temperatureK: T,
}
const times = (n: number): SeriesStack => ({
  ...P,
  junctions: Array.from({ length: n }, () => P.junctions[0]!),
  seriesResistanceKohmCm2: 0.002 * n,
})
const tandem = (topMaCm2: number, bottomMaCm2: number, bottomShuntKohmCm2 = 10): SeriesStack => ({
  junctions: [
    {
      diode: { saturationCurrentMaCm2: 1e-18, ideality: 1.3, shuntResistanceKohmCm2: 5 },
      photocurrentMaCm2: topMaCm2,
    },
    {
      diode: { saturationCurrentMaCm2: 2e-11, shuntResistanceKohmCm2: bottomShuntKohmCm2 },
      photocurrentMaCm2: bottomMaCm2,
    },
  ],
  seriesResistanceKohmCm2: 0.002,
  temperatureK: T,
})

describe('current–voltage figures', () => {
  it('reference set P: all figures of the single-diode solution', () => {
    const figures = currentVoltageFigures(P)
    expect(figures.shortCircuitCurrentMaCm2).toBeCloseTo(19.98002, 5)
    expect(figures.openCircuitVoltageV).toBeCloseTo(1.156326, 5)
    expect(Math.abs(figures.voltageAtMaximumPowerV - 1.01047)).toBeLessThan(1e-5)
    expect(Math.abs(figures.currentAtMaximumPowerMaCm2 - 18.892456)).toBeLessThan(1e-4)
    expect(figures.maximumPowerMwCm2).toBeCloseTo(19.090259, 5)
    expect(figures.fillFactor).toBeCloseTo(0.826296, 5)
    expect(figures.efficiency).toBeCloseTo(0.19090259, 7)
  })

  it('J(V) of P equals the Lambert-W solution', () => {
    const curve = currentVoltageCurve(P, [0.5, 0.9, 1.0, 1.1, 1.15])
    const expected = [19.73027, 19.513606, 19.060945, 12.435645, 1.727787]
    expected.forEach((j, i) => expect(curve.currentMaCm2[i]).toBeCloseTo(j, 5))
  })

  it('N identical junctions multiply the voltages and leave Jsc and the fill factor', () => {
    const one = currentVoltageFigures(P)
    const three = currentVoltageFigures(times(3))
    expect(three.openCircuitVoltageV).toBeCloseTo(3.468977, 5)
    expect(three.maximumPowerMwCm2).toBeCloseTo(57.270776, 5)
    expect(three.voltageAtMaximumPowerV / 3).toBeCloseTo(one.voltageAtMaximumPowerV, 6)
    expect(three.shortCircuitCurrentMaCm2).toBeCloseTo(one.shortCircuitCurrentMaCm2, 9)
    expect(three.fillFactor).toBeCloseTo(one.fillFactor, 9)
  })

  it.each([
    [-0.5, 19.3631, 2.1921, 36.2692, 0.85449],
    [0.5, 19.3772, 2.1923, 36.523, 0.85976],
  ])('mismatch %f mA/cm²', (difference, jsc, voc, power, fillFactor) => {
    const figures = currentVoltageFigures(tandem(19.5 + difference / 2, 19.5 - difference / 2))
    expect(Math.abs(figures.shortCircuitCurrentMaCm2 - jsc)).toBeLessThan(1e-4)
    expect(Math.abs(figures.openCircuitVoltageV - voc)).toBeLessThan(1e-4)
    expect(Math.abs(figures.maximumPowerMwCm2 - power)).toBeLessThan(1e-4)
    expect(Math.abs(figures.fillFactor - fillFactor)).toBeLessThan(1e-4)
  })

  it.each([
    [1000, 18.0014, 34.9474, 0.886],
    [1, 19.3162, 33.943, 0.8024],
  ])('a limiting bottom cell with %f kΩ cm² lets more than its photocurrent through', (shunt, jsc, power, ff) => {
    const figures = currentVoltageFigures(tandem(20, 18, shunt))
    expect(Math.abs(figures.shortCircuitCurrentMaCm2 - jsc)).toBeLessThan(2e-4)
    expect(Math.abs(figures.maximumPowerMwCm2 - power)).toBeLessThan(2e-4)
    expect(Math.abs(figures.fillFactor - ff)).toBeLessThan(2e-4)
  })

  it('a stack in the dark gives no power and says so', () => {
    expect(() => currentVoltageFigures(tandem(0, 0))).toThrow(/both must be above zero/)
  })
})

describe('the circuit', () => {
  const measured = (bottomShuntKohmCm2: number): SeriesStack => ({
    junctions: [
      {
        diode: { saturationCurrentMaCm2: 1e-17, ideality: 1.5, shuntResistanceKohmCm2: 100 },
        photocurrentMaCm2: 10,
      },
      {
        diode: { saturationCurrentMaCm2: 1e-9, shuntResistanceKohmCm2: bottomShuntKohmCm2 },
        photocurrentMaCm2: 1,
      },
    ],
    temperatureK: T,
  })

  it('good bottom cell: J = 1.001593 mA/cm²', () => {
    expect(stackCurrent(measured(1000), 0)).toBeCloseTo(1.001593, 6)
  })

  it('shunted bottom cell: currents, voltages and differential resistances of the example', () => {
    const stack = measured(1)
    const state = solveStack(stack, 0)
    expect(state.currentMaCm2).toBeCloseTo(2.58569, 5)
    expect(state.junctionVoltagesV[0]).toBeCloseTo(1.58569, 5)
    expect(state.junctionVoltagesV[1]).toBeCloseTo(-1.58569, 5)
    const [top, bottom] = differentialResistances(stack, state)
    expect(top! * 1000).toBeCloseTo(5.209, 3)
    expect(bottom! * 1000).toBeCloseTo(1000, 6)
  })

  it('V(J) and J(V) are inverse to each other, with luminescent coupling too', () => {
    const stack: SeriesStack = { ...measured(0.3), seriesResistanceKohmCm2: 0.003, couplingToNext: [0.4] }
    for (const voltage of [-1, 0, 0.8, 1.5, 1.9])
      expect(stackVoltage(stack, stackCurrent(stack, voltage))).toBeCloseTo(voltage, 9)
  })

  it('a coupled, limiting bottom cell passes (J2 + η J1)/(1 + η)', () => {
    const stack: SeriesStack = { ...measured(1e6), couplingToNext: [0.46] }
    const ideal: SeriesStack = {
      ...stack,
      junctions: stack.junctions.map((j) => ({ ...j, diode: { ...j.diode, shuntResistanceKohmCm2: 1e6 } })),
    }
    expect(stackCurrent(ideal, 1.5)).toBeCloseTo((1 + 0.46 * 10) / 1.46, 4)
  })

  it('names what is wrong with a stack', () => {
    expect(() => solveStack({ junctions: [], temperatureK: T }, 0)).toThrow(/at least one junction/)
    expect(() => solveStack({ ...measured(1), couplingToNext: [0.1, 0.2] }, 0)).toThrow(/1 pairs/)
    expect(() => solveStack({ ...measured(1), couplingToNext: [1.2] }, 0)).toThrow(/between 0 and 1/)
    expect(() => solveStack(measured(1), NaN)).toThrow(/terminalVoltageV/)
  })
})
