import { describe, expect, it } from 'vitest'
import { makeCurve } from '../../../shared/physics/curve.js'
import { biasPhotocurrents, sourceSpectrum, totalIrradiance } from '../../../shared/physics/measurement/biasLight.js'
import { evaluateBias, planBias, type BiasPlanDevice } from '../../../shared/physics/measurement/biasPlan.js'
import { curveOf, grid, tandem } from '../checks/device.js'

const led = (centreNm: number, irradianceWM2: number, fwhmNm = 30) => ({ centreNm, fwhmNm, irradianceWM2 })
const window = (from: number, to: number) =>
  curveOf(grid(300, 1800, 5), (nm) => 0.9 / (1 + Math.exp((from - nm) / 15)) / (1 + Math.exp((nm - to) / 10)))

const triple: BiasPlanDevice = {
  eqes: [window(300, 660), window(640, 880), window(860, 1700)],
  diodes: [
    { saturationCurrentMaCm2: 1e-24, shuntResistanceKohmCm2: 300 },
    { saturationCurrentMaCm2: 1e-17, shuntResistanceKohmCm2: 300 },
    { saturationCurrentMaCm2: 1e-5, shuntResistanceKohmCm2: 20 },
  ],
  couplingToNext: [0.05, 0.15],
  temperatureK: 298.15,
}

/** The widest margin on a grid of intensities, 0 … highest of each source, within the total. */
function bruteForce(
  device: BiasPlanDevice,
  sources: readonly ReturnType<typeof led>[],
  k: number,
  total: number,
): number {
  const steps = 20
  let best = -Infinity
  const currents = sources.map((s) => biasPhotocurrents(device.eqes, [s]))
  const walk = (s: number, shares: number[]): void => {
    if (s < sources.length) {
      for (let i = 0; i <= steps; i++) walk(s + 1, [...shares, i / steps])
      return
    }
    if (shares.reduce((sum, p, i) => sum + p * sources[i]!.irradianceWM2, 0) > total) return
    const j = device.eqes.map((_, i) => shares.reduce((sum, p, n) => sum + p * currents[n]![i]!, 0))
    best = Math.max(best, Math.min(...j.filter((_, i) => i !== k)) - j[k]!)
  }
  walk(0, [])
  return best
}

describe('bias light', () => {
  it('a band has the stated irradiance, and the current of its photons', () => {
    const spectrum = sourceSpectrum(led(850, 100, 40))
    const total = totalIrradiance([{ spectrum }])
    expect(total).toBeCloseTo(100, 9)
    const all = makeCurve([300, 1500], [1, 1])
    expect(biasPhotocurrents([all], [led(850, 100, 40)])[0]).toBeCloseTo((100 * 850) / 1239.841984 / 10, 3)
  })

  it('says what is wrong with a source', () => {
    expect(() => sourceSpectrum(led(850, -1))).toThrow(/irradianceWM2/)
    expect(() => sourceSpectrum(led(300, 1, 400))).toThrow(/zero wavelength/)
  })
})

describe('the bias plan', () => {
  const two = [led(450, 150), led(530, 80), led(850, 120), led(980, 200)]
  const three = [led(450, 150), led(780, 90), led(1050, 200)]

  it.each([
    ['top of two', tandem, two, 0, Infinity],
    ['bottom of two', tandem, two, 1, Infinity],
    ['bottom of two within 100 W/m²', tandem, two, 1, 100],
    ['top of three', triple, three, 0, Infinity],
    ['middle of three', triple, three, 1, Infinity],
    ['bottom of three within 90 W/m²', triple, three, 2, 90],
  ])('%s: no better margin on a grid of intensities', (_, device, sources, k, total) => {
    const plan = planBias(device, sources, k, { largestTotalWM2: total })
    const best = bruteForce(device, sources, k, total)
    expect(plan.isPossible).toBe(true)
    expect(plan.marginMaCm2).toBeGreaterThanOrEqual(best - 1e-6 * Math.abs(best))
    expect(plan.marginMaCm2).toBeLessThan(best * 1.15)
    plan.irradiancesWM2.forEach((w, s) => expect(w).toBeLessThanOrEqual(sources[s]!.irradianceWM2 * (1 + 1e-9)))
    expect(plan.totalIrradianceWM2).toBeLessThanOrEqual(total * (1 + 1e-9))
    expect(plan.selectivities[k]).toBeGreaterThan(0.9)
  })

  it('the bias voltage is the sum of the other open-circuit voltages', () => {
    const plan = planBias(triple, three, 1)
    const vt = 0.025692579
    const [one, , last] = plan.photocurrentsMaCm2
    const ideal = vt * (Math.log(one! / 1e-24 + 1) + Math.log(last! / 1e-5 + 1))
    expect(Math.abs(plan.biasVoltageV - ideal)).toBeLessThan(2e-3)
  })

  it('uses no light that does not widen the margin', () => {
    const plan = planBias(tandem, [...two, led(1400, 300)], 0)
    expect(plan.irradiancesWM2[4]).toBe(0)
    expect(plan.irradiancesWM2[0]).toBe(0)
  })

  it('coupling from above lowers the selectivity of a lower junction', () => {
    const plan = planBias(triple, three, 2)
    expect(plan.selectivitiesWithCoupling[2]).toBeLessThan(plan.selectivities[2]! - 0.05)
    expect(plan.selectivitiesWithCoupling[1]).toBeGreaterThan(0.1)
  })

  it('says when no plan makes the junction limit', () => {
    const plan = planBias(tandem, [led(450, 100)], 0)
    expect(plan.isPossible).toBe(false)
    expect(plan.totalIrradianceWM2).toBeLessThan(1e-6)
  })

  it('shows what the lab used: too little infrared light leaves the bottom limiting', () => {
    const used = evaluateBias(tandem, [led(450, 20), led(850, 2)], 0, 0.6)
    expect(used.marginMaCm2).toBeLessThan(0)
    expect(used.relativeMargin).toBeLessThan(0)
    expect(used.selectivities[1]).toBeGreaterThan(0.5)
    expect(used.biasVoltageV).toBe(0.6)
  })

  it('says what is wrong with its input', () => {
    expect(() => planBias(tandem, [], 0)).toThrow(/no light source/)
    expect(() => planBias(tandem, two, 2)).toThrow(/from 0 to 1/)
    expect(() => planBias(tandem, two, 0, { largestTotalWM2: 0 })).toThrow(/above zero/)
    expect(() => planBias({ ...tandem, diodes: [] }, two, 0)).toThrow(/each junction needs one/)
  })
})
