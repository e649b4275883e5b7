import { describe, expect, it } from 'vitest'
import { PHOTON_ENERGY_NM_EV } from '../../../shared/physics/constants.js'
import { makeCurve } from '../../../shared/physics/curve.js'
import {
  radiativeSaturationCurrent,
  saturationCurrentFromRadiative,
} from '../../../shared/physics/diode/reciprocity.js'

/** EQE = height above the gap, an exponential tail of 15 meV below it when asked for; fine steps at the edge. */
function stepWithTail(gapEv: number, height: number, tail: boolean) {
  const edge = PHOTON_ENERGY_NM_EV / gapEv
  const wavelengthNm = [250, 0.5 * (250 + edge), edge]
  const values = [height, height, height]
  for (let nm = edge + 0.02; nm < edge * 1.3; nm += nm < edge + 1 ? 0.02 : 0.05) {
    wavelengthNm.push(nm)
    values.push(tail ? height * Math.exp((PHOTON_ENERGY_NM_EV / nm - gapEv) / 0.015) : 0)
  }
  if (!tail) {
    wavelengthNm[3] = edge + 1e-6
  }
  return makeCurve(wavelengthNm, values)
}

describe('radiative saturation current', () => {
  it.each([
    ['1.12 eV step', 1.12, 1, false, 298.15, 6.2496e-14, 1e-4],
    ['1.68 eV step', 1.68, 1, false, 298.15, 4.7363e-23, 1e-4],
    ['1.12 eV step at 300 K', 1.12, 1, false, 300, 8.2302e-14, 1e-4],
    ['1.34 eV step at 300 K', 1.34, 1, false, 300, 2.3554e-17, 1e-4],
    ['0.9 above 1.60 eV', 1.6, 0.9, false, 298.15, 8.71464e-22, 1e-3],
    ['0.9 above 1.60 eV with tail', 1.6, 0.9, true, 298.15, 2.00322e-21, 1e-3],
    ['0.9 above 1.68 eV with tail', 1.68, 0.9, true, 298.15, 9.81896e-23, 1e-3],
  ])('%s', (_, gapEv, height, tail, temperatureK, expected, tolerance) => {
    const found = radiativeSaturationCurrent(stepWithTail(gapEv, height, tail), temperatureK)
    expect(Math.abs(found / expected - 1)).toBeLessThan(tolerance)
  })

  it('is linear in the EQE and leaves out what lies below the noise floor', () => {
    const scan = makeCurve([400, 700, 720, 900], [0.8, 0.8, 0.004, 0.004])
    const half = makeCurve([400, 700, 720, 900], [0.4, 0.4, 0.002, 0.002])
    const all = radiativeSaturationCurrent(scan, 298.15)
    expect(radiativeSaturationCurrent(half, 298.15) / all).toBeCloseTo(0.5, 12)
    expect(radiativeSaturationCurrent(scan, 298.15, { noiseFloor: 0.01 })).toBeLessThan(0.1 * all)
  })

  it('J01 is J0rad over the external radiative efficiency', () => {
    expect(saturationCurrentFromRadiative(2e-22, 0.01)).toBeCloseTo(2e-20, 30)
    expect(() => saturationCurrentFromRadiative(2e-22, 1.5)).toThrow(/between 0 and 1/)
    expect(() => saturationCurrentFromRadiative(0, 0.5)).toThrow(/no response/)
  })
})
