import { describe, expect, it } from 'vitest'
import { makeCurve, valueAt } from '../../../shared/physics/curve.js'
import { missingResponse as check } from '../../../shared/physics/checks/missingResponse.js'
import { contextOf, findingOf, run, tandem } from './device.js'

/** A bottom scan with the top's response mixed in by `share`, and a clean repeat. */
function mixed(share: number, scale = 1) {
  const context = contextOf(1)
  const x = context.scan.wavelengthNm
  const values = x.map(
    (nm) => scale * ((1 - share) * valueAt(tandem.eqes[1]!, nm) + share * valueAt(tandem.eqes[0]!, nm)),
  )
  return { ...context, scan: makeCurve(x, values), repeats: [context.scan] }
}

describe('missing response', () => {
  it('fires when the own band is low and another junction shows', () => {
    const finding = findingOf(check, mixed(0.03))
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.shortfall!.value).toBeCloseTo(0.03, 2)
    expect(finding.numbers.foreignGain!.value).toBeCloseTo(0.03, 2)
    expect(finding.bandsNm[0]![0]).toBeGreaterThan(700)
    expect(finding.bandsNm[1]![1]).toBeLessThan(720)
  })

  it('just passes below 2 %, and when the scan is only scaled', () => {
    expect(run(check, mixed(0.015)).outcome).toBe('passed')
    expect(run(check, mixed(0, 0.95)).outcome).toBe('passed')
  })

  it('no repeat, or no scan of the other junction: not checked', () => {
    expect(run(check, contextOf(1))).toEqual({ outcome: 'not-checked', reason: 'no repeat or neighbour scan' })
    expect(run(check, { ...mixed(0.03), junctions: [{ scan: null }, { scan: null }] })).toEqual({
      outcome: 'not-checked',
      reason: 'no scan of junction 1',
    })
  })
})
