import { describe, expect, it } from 'vitest'
import {
  darkConductance,
  darkCurrent,
  junctionOpenCircuitVoltage,
  junctionVoltage,
  voltageAtDarkCurrent,
  type JunctionDiode,
} from '../../../shared/physics/diode/junction.js'
import { DomainError } from '../../../shared/physics/errors.js'

const T = 298.15
const top: JunctionDiode = { saturationCurrentMaCm2: 1e-17, ideality: 1.5, shuntResistanceKohmCm2: 100 }
const kinds: [string, JunctionDiode][] = [
  ['one diode and a shunt', top],
  ['no shunt', { saturationCurrentMaCm2: 1e-9 }],
  ['two diodes', { saturationCurrentMaCm2: 1e-12, secondSaturationCurrentMaCm2: 1e-7, shuntResistanceKohmCm2: 2 }],
  [
    'breakdown',
    {
      saturationCurrentMaCm2: 1e-9,
      shuntResistanceKohmCm2: 1,
      breakdown: { voltageV: -4, share: 0.3, exponent: 3.2 },
    },
  ],
]

describe('a junction', () => {
  it('has the voltages of the example: 1.593174 V at 1 mA/cm², 1.597241 V open', () => {
    expect(junctionVoltage(top, 10, 1, T)).toBeCloseTo(1.593174, 5)
    expect(junctionOpenCircuitVoltage(top, 10, T)).toBeCloseTo(1.597241, 5)
  })

  it.each(kinds)('%s: the voltage at a dark current is the inverse of the dark current', (_, diode) => {
    for (const current of [-3, -0.1, -1e-6, 0, 1e-12, 1e-6, 0.3, 40]) {
      const voltage = voltageAtDarkCurrent(diode, current, T)
      const back = darkCurrent(diode, voltage, T)
      expect(Math.abs(back - current)).toBeLessThan(1e-12 * Math.max(1e-3, Math.abs(current)))
    }
  })

  it.each(kinds)('%s: the conductance is the slope of the dark current', (_, diode) => {
    for (const voltage of [-2, -0.4, 0.2, 0.5]) {
      const h = 1e-5
      const slope = (darkCurrent(diode, voltage + h, T) - darkCurrent(diode, voltage - h, T)) / (2 * h)
      expect(darkConductance(diode, voltage, T) / slope).toBeCloseTo(1, 5)
    }
  })

  it('a breakdown holds the voltage above the breakdown voltage at any reverse current', () => {
    const diode = kinds[3]![1]
    expect(voltageAtDarkCurrent(diode, -1000, T)).toBeGreaterThan(-4)
    expect(voltageAtDarkCurrent(diode, -1000, T)).toBeLessThan(-3)
  })

  it('no shunt counts as 1e9 kΩ cm²', () => {
    expect(voltageAtDarkCurrent({ saturationCurrentMaCm2: 1e-15 }, -1e-9, T)).toBeCloseTo(-1, 5)
  })

  it.each([
    ['diode.saturationCurrentMaCm2', { saturationCurrentMaCm2: 0 }],
    ['diode.saturationCurrentMaCm2', { saturationCurrentMaCm2: NaN }],
    ['diode.ideality', { saturationCurrentMaCm2: 1e-9, ideality: 0 }],
    ['diode.shuntResistanceKohmCm2', { saturationCurrentMaCm2: 1e-9, shuntResistanceKohmCm2: 0 }],
    ['diode.breakdown.voltageV', { saturationCurrentMaCm2: 1e-9, breakdown: { voltageV: 2, share: 1, exponent: 3 } }],
  ])('names %s when it is outside its domain', (argument, diode) => {
    expect(() => darkCurrent(diode, 0, T)).toThrow(expect.objectContaining({ name: 'DomainError', argument }))
    expect(() => darkCurrent(top, 0, -1)).toThrow(DomainError)
  })
})
