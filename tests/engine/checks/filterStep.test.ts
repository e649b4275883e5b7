import { describe, expect, it } from 'vitest'
import { filterStep as check } from '../../../shared/physics/checks/filterStep.js'
import { simulateScan } from '../../../shared/physics/measurement/simulateScan.js'
import { contextOf, findingOf, run, tandem, wellTaken, withConditions } from './device.js'

const stepped = (factor: number, noise = 3e-4) => ({
  ...contextOf(0),
  scan: simulateScan(tandem, { ...wellTaken[0]!, noise, filters: [{ atNm: 600, factor }] }).scan,
})

describe('step at a filter change', () => {
  it.each([0.97, 1.03])('fires when the scan jumps by a factor of %f at the filter', (factor) => {
    const finding = findingOf(check, stepped(factor))
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.step!.value).toBeCloseTo(0.8 * (factor - 1), 2)
    expect(finding.bandsNm).toEqual([[595, 600]])
  })

  it('just passes at 0.5 %, within noise, and at an absorption edge', () => {
    expect(run(check, stepped(1.005)).outcome).toBe('passed')
    expect(run(check, stepped(1.02, 0.01)).outcome).toBe('passed')
    for (const nm of [735, 745, 755, 765])
      expect(run(check, withConditions(contextOf(0), { filterChangesNm: [nm] })).outcome).toBe('passed')
  })

  it('no filter changes recorded, or none within the scan: not checked', () => {
    expect(run(check, withConditions(stepped(0.9), { filterChangesNm: null }))).toEqual({
      outcome: 'not-checked',
      reason: 'no filter changes recorded',
    })
    expect(run(check, withConditions(stepped(0.9), { filterChangesNm: [200] })).outcome).toBe('not-checked')
  })
})
