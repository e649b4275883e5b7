import { describe, expect, it } from 'vitest'
import { makeCurve } from '../../../shared/physics/curve.js'
import { noisy as check } from '../../../shared/physics/checks/noisy.js'
import { seededRandom } from '../../../shared/physics/numerics/random.js'
import { contextOf, curveOf, findingOf, grid, run, topEqe } from './device.js'

/** The top's EQE with white noise; its maximum is near 0.83. */
function withNoise(sigma: number) {
  const random = seededRandom(5)
  const x = grid(300, 1200, 5)
  return {
    ...contextOf(0),
    scan: makeCurve(
      x,
      x.map((nm) => topEqe(nm) + sigma * random.normal()),
    ),
  }
}

describe('noisy', () => {
  it('fires when the second difference has more than 1 % rms', () => {
    const finding = findingOf(check, withNoise(0.006))
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.pointNoise!.value / 0.006).toBeCloseTo(1, 0)
    expect(finding.numbers.secondDifferenceRms!.value).toBeGreaterThan(0.01)
  })

  it('just passes at 0.8 % rms, and an absorption edge is no noise', () => {
    expect(run(check, withNoise((0.008 * 0.83) / Math.sqrt(6))).outcome).toBe('passed')
    expect(
      run(check, { ...contextOf(0), scan: curveOf(grid(300, 1200, 10), (nm) => (nm < 750 ? 0.8 : 0)) }).outcome,
    ).toBe('passed')
  })

  it('fewer than seven points, or no response: not checked', () => {
    expect(run(check, { ...contextOf(0), scan: curveOf([300, 400], topEqe) })).toEqual({
      outcome: 'not-checked',
      reason: 'the scan has fewer than seven points',
    })
    expect(run(check, { ...contextOf(0), scan: curveOf(grid(300, 400, 10), () => 0) }).outcome).toBe('not-checked')
  })
})
