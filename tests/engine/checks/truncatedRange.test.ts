import { describe, expect, it } from 'vitest'
import { makeCurve } from '../../../shared/physics/curve.js'
import { truncatedRange as check } from '../../../shared/physics/checks/truncatedRange.js'
import { contextOf, findingOf, run } from './device.js'

const ends = (first: number, last: number) => ({
  ...contextOf(0),
  scan: makeCurve([300, 500, 700, 710], [first, 0.8, 0.8, last]),
})

describe('truncated range', () => {
  it('fires at either end above 2 %', () => {
    const late = findingOf(check, ends(0, 0.021))
    expect(late.severity).toBe('caution')
    expect(late.bandsNm).toEqual([[700, 710]])
    expect(late.numbers).toEqual({ responseAtEnd: { value: 0.021, unit: '' } })
    expect(late.message).toMatch(/2\.1 % at 710 nm/)
    expect(findingOf(check, ends(0.3, 0.5)).bandsNm.length).toBe(2)
  })

  it('just passes at 2 %', () => {
    expect(run(check, ends(0.02, 0.02)).outcome).toBe('passed')
  })

  it('needs nothing but the scan', () => {
    expect(check.inputs).toEqual([])
    expect(run(check, { ...ends(0, 0), junctions: [{ scan: null }], conditions: {}, spectrum: null }).outcome).toBe(
      'passed',
    )
  })
})
