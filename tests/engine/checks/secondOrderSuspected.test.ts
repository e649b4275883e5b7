import { describe, expect, it } from 'vitest'
import { secondOrderSuspected as check } from '../../../shared/physics/checks/secondOrderSuspected.js'
import { leakage } from '../../../shared/physics/checks/leakage.js'
import { simulateScan } from '../../../shared/physics/measurement/simulateScan.js'
import { contextOf, curveOf, findingOf, grid, run, tandem, topEqe, wellTaken, withConditions } from './device.js'

const unsorted = (secondOrderShare: number) =>
  withConditions(
    { ...contextOf(0), scan: simulateScan(tandem, { ...wellTaken[0]!, secondOrderShare }).scan },
    { filterChangesNm: [] },
  )

describe('second order suspected', () => {
  it('fires when the response beyond the edge follows that at half the wavelength', () => {
    const finding = findingOf(check, unsorted(0.03))
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.share!.value).toBeCloseTo(0.03, 2)
    expect(finding.bandsNm[0]![0]).toBeGreaterThan(780)
  })

  it('just passes at 0.8 %, and is not mistaken for leakage', () => {
    expect(run(check, unsorted(0.008)).outcome).toBe('passed')
    expect(run(leakage, unsorted(0.03)).outcome).toBe('passed')
  })

  it('passes where recorded filters stop the half wavelength everywhere', () => {
    expect(run(check, contextOf(0)).outcome).toBe('passed')
  })

  it('a scan that ends at the edge: not checked', () => {
    const context = { ...unsorted(0), scan: curveOf(grid(300, 780, 5), topEqe) }
    expect(run(check, context)).toEqual({
      outcome: 'not-checked',
      reason: 'the scan does not reach far enough beyond the junction’s edge',
    })
  })
})
