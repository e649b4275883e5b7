import { describe, expect, it } from 'vitest'
import { makeCurve } from '../../../shared/physics/curve.js'
import { outOfBounds as check } from '../../../shared/physics/checks/outOfBounds.js'
import { contextOf, findingOf, run } from './device.js'

const scan = (...values: number[]) => ({
  ...contextOf(0),
  scan: makeCurve(
    values.map((_, i) => 300 + 10 * i),
    values,
  ),
})

describe('negative or above one', () => {
  it.each([
    ['below −0.01', [0, -0.011, 0.5, 0], [[310, 310]]],
    ['above 1.02', [0, 1.021, 1.03, 0.9], [[310, 320]]],
  ])('fires %s and marks the band', (_, values, bands) => {
    const finding = findingOf(check, scan(...values))
    expect(finding.severity).toBe('caution')
    expect(finding.bandsNm).toEqual(bands)
  })

  it('just passes at −0.01 and 1.02', () => {
    expect(run(check, scan(-0.01, 0.5, 1.02)).outcome).toBe('passed')
  })

  it('needs nothing but the scan', () => {
    expect(check.inputs).toEqual([])
    expect(run(check, { ...scan(0, 0.5, 0), junctions: [{ scan: null }], conditions: {} }).outcome).toBe('passed')
  })
})
