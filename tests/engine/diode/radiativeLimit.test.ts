import { describe, expect, it } from 'vitest'
import { PHOTON_ENERGY_NM_EV } from '../../../shared/physics/constants.js'
import { shortCircuitCurrentDensity } from '../../../shared/physics/currents.js'
import { makeCurve, type Curve } from '../../../shared/physics/curve.js'
import { junctionOpenCircuitVoltage } from '../../../shared/physics/diode/junction.js'
import {
  radiativeSaturationCurrent,
  saturationCurrentFromRadiative,
} from '../../../shared/physics/diode/reciprocity.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'

const TEMPERATURE_K = 298.15
const URBACH_EV = 0.015
const global = referenceSpectrum('AM1.5G')

/** EQE 0.9 from 280 nm to the gap and nothing, or an Urbach tail of 15 meV, below it. */
const step = (gapEv: number): Curve => makeCurve([280, PHOTON_ENERGY_NM_EV / gapEv], [0.9, 0.9])
function tail(gapEv: number): Curve {
  const edgeNm = PHOTON_ENERGY_NM_EV / gapEv
  const wavelengthNm = Array.from({ length: 12_001 }, (_, i) => edgeNm + 0.02 * i)
  return makeCurve(
    wavelengthNm,
    wavelengthNm.map((nm) => 0.9 * Math.exp((PHOTON_ENERGY_NM_EV / nm - gapEv) / URBACH_EV)),
  )
}

const voltageOf = (currentMaCm2: number, saturationCurrentMaCm2: number): number =>
  junctionOpenCircuitVoltage({ saturationCurrentMaCm2 }, currentMaCm2, TEMPERATURE_K)

describe('a step of 0.9 with an Urbach tail of 15 meV under AM1.5G (checks 7.14 and 7.16)', () => {
  it.each([
    ['7.14', 1.6, 22.9204, 0.4853, 1.32635, 1.3055],
    ['7.16', 1.68, 20.7537, 0.4361, 1.40133, 1.38043],
  ])('%s: at %s eV %s + %s mA/cm², and Voc,rad falls from %s to %s V', (_, gapEv, ofStep, ofTail, sharp, soft) => {
    const stepMaCm2 = shortCircuitCurrentDensity(step(gapEv), global)
    const tailMaCm2 = shortCircuitCurrentDensity(tail(gapEv), global)
    expect(Math.abs(stepMaCm2 - ofStep)).toBeLessThan(0.002)
    expect(Math.abs(tailMaCm2 - ofTail)).toBeLessThan(0.002)
    const stepJ0 = radiativeSaturationCurrent(step(gapEv), TEMPERATURE_K)
    const tailJ0 = radiativeSaturationCurrent(tail(gapEv), TEMPERATURE_K)
    expect(Math.abs(voltageOf(stepMaCm2, stepJ0) - sharp)).toBeLessThan(1e-4)
    expect(Math.abs(voltageOf(stepMaCm2 + tailMaCm2, stepJ0 + tailJ0) - soft)).toBeLessThan(1e-4)
  })
})

it('7.12: two decades of luminescence yield are worth 118.32 mV at 298.15 K (Rau, Phys. Rev. B 76, 085303 (2007))', () => {
  const radiative = radiativeSaturationCurrent(step(1.6), TEMPERATURE_K)
  const voltage = (yieldOfLight: number): number =>
    voltageOf(22, saturationCurrentFromRadiative(radiative, yieldOfLight))
  expect(Math.abs(voltage(1) - voltage(0.01) - 0.11832)).toBeLessThan(1e-5)
  expect(Math.abs(voltage(0.1) - voltage(0.01) - 0.05916)).toBeLessThan(1e-5)
})

it.each([
  [0.0047, 0.1377],
  [0.0309, 0.0893],
])('7.13: an electroluminescence yield of %s costs %s V', (yieldOfLight, loss) => {
  const radiative = radiativeSaturationCurrent(step(1.6), TEMPERATURE_K)
  const real = voltageOf(22, saturationCurrentFromRadiative(radiative, yieldOfLight))
  expect(Math.abs(voltageOf(22, radiative) - real - loss)).toBeLessThan(1e-4)
})
