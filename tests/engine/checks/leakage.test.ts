import { describe, expect, it } from 'vitest'
import { makeCurve, valueAt } from '../../../shared/physics/curve.js'
import { leakage as check } from '../../../shared/physics/checks/leakage.js'
import { seededRandom } from '../../../shared/physics/numerics/random.js'
import { contextOf, findingOf, run, tandem } from './device.js'

/** The scan of a junction that holds a share of the other, with a little noise. */
function leaking(junctionIndex: number, share: number) {
  const context = contextOf(junctionIndex)
  const random = seededRandom(21)
  const own = tandem.eqes[junctionIndex]!
  const other = tandem.eqes[1 - junctionIndex]!
  const x = context.scan.wavelengthNm
  const values = x.map((nm) => (1 - share) * valueAt(own, nm) + share * valueAt(other, nm) + 3e-4 * random.normal())
  return { ...context, scan: makeCurve(x, values) }
}

describe('leakage from another junction', () => {
  it.each([0, 1])('rejects 6 percent in the scan of junction index %i, and says where', (index) => {
    const finding = findingOf(check, leaking(index, 0.06))
    expect(finding.severity).toBe('reject')
    expect(finding.numbers[`shareOfJunction${2 - index}`]!.value).toBeCloseTo(0.06, 2)
    const [from, to] = finding.bandsNm[0]!
    if (index === 0) expect(from).toBeGreaterThan(770)
    else expect(to).toBeLessThan(720)
  })

  it.each([0, 1])(
    'cautions at 1.3 percent in the scan of junction index %i and just passes at 0.8 percent',
    (index) => {
      expect(findingOf(check, leaking(index, 0.013)).severity).toBe('caution')
      expect(run(check, leaking(index, 0.008)).outcome).toBe('passed')
    },
  )

  it('no scan of the other junction, or no band of its own: not checked', () => {
    const context = contextOf(0)
    expect(run(check, { ...context, junctions: [{ scan: null }, { scan: null }] })).toEqual({
      outcome: 'not-checked',
      reason: 'no scan of junction 2',
    })
    const short = makeCurve([400, 500, 600], [0.8, 0.8, 0.8])
    expect(run(check, { ...context, scan: short })).toEqual({
      outcome: 'not-checked',
      reason: 'the scan has no band where another junction alone responds',
    })
  })
})
