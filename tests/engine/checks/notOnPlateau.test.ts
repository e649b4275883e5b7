import { describe, expect, it } from 'vitest'
import { makeCurve } from '../../../shared/physics/curve.js'
import { notOnPlateau as check } from '../../../shared/physics/checks/notOnPlateau.js'
import { contextOf, findingOf, run } from './device.js'

function series(scales: readonly number[], ownIndex: number) {
  const context = contextOf(0)
  const members = scales.map((scale, i) => ({
    scan: makeCurve(
      context.scan.wavelengthNm,
      context.scan.values.map((y) => scale * y),
    ),
    irradianceWM2: 20 * (i + 1),
    biasVoltageV: 0.6,
  }))
  return { ...context, scan: members[ownIndex]!.scan, biasSeries: { members, ownIndex } }
}

describe('not on the plateau', () => {
  it('fires when Jsc moves by more than 0.5 % to both neighbours', () => {
    const finding = findingOf(check, series([0.9, 0.95, 0.96, 1], 1))
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.change!.value).toBeCloseTo(0.96 / 0.95 - 1, 9)
  })

  it('just passes at 0.49 % to one neighbour', () => {
    expect(run(check, series([0.9, 1, 1.0049], 1)).outcome).toBe('passed')
    expect(run(check, series([0.9, 1, 1.0051], 1)).outcome).toBe('fired')
  })

  it('looks along the voltage where the intensity is the same', () => {
    const { biasSeries, ...rest } = series([1, 1.02], 0)
    const members = biasSeries.members.map((m, i) => ({ ...m, irradianceWM2: 50, biasVoltageV: i / 10 }))
    expect(findingOf(check, { ...rest, biasSeries: { members, ownIndex: 0 } }).numbers.change!.value).toBeCloseTo(
      0.02,
      9,
    )
  })

  it.each([
    ['no bias series', contextOf(0)],
    ['no spectrum', { ...series([1, 1], 0), spectrum: null }],
  ])('%s: not checked', (reason, context) => {
    expect(run(check, context)).toEqual({ outcome: 'not-checked', reason })
  })
})
