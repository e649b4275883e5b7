import { describe, expect, it } from 'vitest'
import { coarseStep as check } from '../../../shared/physics/checks/coarseStep.js'
import { contextOf, curveOf, findingOf, grid, run, topEqe } from './device.js'

const stepped = (step: number, offset = 0) => ({
  ...contextOf(0),
  scan: curveOf(grid(300 + offset, 900 + offset, step), topEqe),
})

describe('coarse step', () => {
  it('fires at 50 nm, and marks the steepest step', () => {
    const finding = findingOf(check, stepped(50))
    expect(finding.severity).toBe('caution')
    expect(Math.abs(finding.numbers.change!.value)).toBeGreaterThan(0.003)
    expect(finding.numbers.steepestStep).toEqual({ value: 50, unit: 'nm' })
  })

  it('passes at 5 nm; the same change passes or fires as the threshold lies above or below it', () => {
    expect(run(check, stepped(5)).outcome).toBe('passed')
    const change = Math.abs(findingOf(check, stepped(50)).numbers.change!.value)
    expect(check.run(stepped(50), { largestChange: change * 1.001 }).outcome).toBe('passed')
    expect(check.run(stepped(50), { largestChange: change * 0.999 }).outcome).toBe('fired')
  })

  it.each([
    ['no spectrum', { ...stepped(5), spectrum: null }],
    ['the scan has fewer than five points', { ...stepped(5), scan: curveOf([300, 500, 700], topEqe) }],
    ['the scan has no response to count a current from', { ...stepped(5), scan: curveOf(grid(300, 900, 10), () => 0) }],
  ])('%s: not checked', (reason, context) => {
    expect(run(check, context)).toEqual({ outcome: 'not-checked', reason })
  })
})
