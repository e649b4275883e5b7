import { describe, expect, it } from 'vitest'
import { makeCurve } from '../../../shared/physics/curve.js'
import { sumAboveAbsorptance as check } from '../../../shared/physics/checks/sumAboveAbsorptance.js'
import { contextOf, curveOf, findingOf, grid, run } from './device.js'

const x = grid(300, 1200, 10)
const flat = (own: number, other: number, reflectance: number | null) => ({
  ...contextOf(0),
  scan: makeCurve(
    x,
    x.map((nm) => (nm < 800 ? own : 0)),
  ),
  junctions: [
    { scan: null },
    {
      scan: makeCurve(
        x,
        x.map(() => other),
      ),
    },
  ],
  reflectance: reflectance === null ? null : curveOf(x, () => reflectance),
})

describe('sum above absorptance', () => {
  it('fires when Σ EQE + R exceeds one by more than twice its uncertainty', () => {
    const finding = findingOf(check, flat(0.8, 0.13, 0.1))
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.largestSum!.value).toBeCloseTo(1.03, 9)
    expect(finding.bandsNm).toEqual([[300, 790]])
  })

  it('just passes at 1.019', () => {
    expect(run(check, flat(0.8, 0.119, 0.1)).outcome).toBe('passed')
  })

  it('without reflectance it still fires on the EQE alone, and else says that it was not checked', () => {
    expect(findingOf(check, flat(0.8, 0.25, null)).message).toContain('without reflectance')
    expect(run(check, flat(0.8, 0.13, null))).toEqual({ outcome: 'not-checked', reason: 'no reflectance' })
  })

  it('no scan of the other junction: not checked', () => {
    expect(run(check, { ...flat(0.8, 0.1, 0.1), junctions: [{ scan: null }, { scan: null }] })).toEqual({
      outcome: 'not-checked',
      reason: 'no scan of junction 2',
    })
  })
})
