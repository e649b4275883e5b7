import { describe, expect, it } from 'vitest'
import { valueAt } from '../../../shared/physics/curve.js'
import { radiativeSaturationCurrent } from '../../../shared/physics/diode/reciprocity.js'
import { planBias } from '../../../shared/physics/measurement/biasPlan.js'
import { diodeByReciprocity, estimatedEqes } from '../../../shared/physics/measurement/planInputs.js'

describe('curves from gaps alone', () => {
  it('respond between the own gap and that of the junction above, and half at each gap', () => {
    const [top, bottom] = estimatedEqes([1.7, 1.1])
    expect(valueAt(top!, 500)).toBeCloseTo(0.85, 6)
    expect(valueAt(bottom!, 500)).toBeLessThan(1e-6)
    expect(valueAt(bottom!, 900)).toBeCloseTo(0.85, 6)
    expect(valueAt(top!, 1239.841984 / 1.7)).toBeCloseTo(0.425, 1)
    expect(top!.values.at(-1)).toBeLessThan(1e-3)
  })

  it('refuses gaps that do not fall from the sunward side, and one that is not above zero', () => {
    expect(() => estimatedEqes([1.1, 1.7])).toThrow(/junction 2 is 1\.7 eV .* fall from the sunward side/)
    expect(() => estimatedEqes([1.1, 0])).toThrow(/gapsEv\[1\]/)
    expect(() => estimatedEqes([6])).toThrow(/beyond 300 nm/)
  })

  it('lead to a plan that lights the other junction', () => {
    const eqes = estimatedEqes([1.7, 1.1])
    const diodes = eqes.map((eqe) => diodeByReciprocity(eqe, 298.15))
    const sources = [470, 940].map((centreNm) => ({ centreNm, fwhmNm: 30, irradianceWM2: 100 }))
    const plan = planBias({ eqes, diodes, temperatureK: 298.15 }, sources, 0)
    expect(plan.isPossible).toBe(true)
    expect(plan.irradiancesWM2[0]).toBeCloseTo(0, 6)
    expect(plan.irradiancesWM2[1]).toBeCloseTo(100, 6)
    expect(plan.selectivities[0]).toBeGreaterThan(0.999)
  })
})

describe('a diode by reciprocity', () => {
  const [eqe] = estimatedEqes([1.4])
  it('is the radiative current over the stated efficiency', () => {
    const { radiativeCurrentMaCm2, saturationCurrentMaCm2 } = diodeByReciprocity(eqe!, 298.15, 0.02)
    expect(radiativeCurrentMaCm2).toBe(radiativeSaturationCurrent(eqe!, 298.15, { noiseFloor: 0.01 }))
    expect(saturationCurrentMaCm2).toBeCloseTo(50 * radiativeCurrentMaCm2, 30)
  })

  it('refuses an efficiency above one and a curve without response', () => {
    expect(() => diodeByReciprocity(eqe!, 298.15, 1.2)).toThrow(/externalRadiativeEfficiency/)
    const dark = { wavelengthNm: eqe!.wavelengthNm, values: eqe!.values.map(() => 0) }
    expect(() => diodeByReciprocity(dark, 298.15)).toThrow(/no response above its noise floor/)
  })
})
