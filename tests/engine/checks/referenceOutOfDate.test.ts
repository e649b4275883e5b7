import { describe, expect, it } from 'vitest'
import { referenceOutOfDate as check } from '../../../shared/physics/checks/referenceOutOfDate.js'
import { contextOf, findingOf, run, withConditions } from './device.js'

const calibrated = (referenceCalibrationDate: string | null, measuredOn: string | null = '2026-11-20') =>
  withConditions(contextOf(0), { referenceCalibrationDate, measuredOn })

describe('reference out of date', () => {
  it('fires after 24 months', () => {
    const finding = findingOf(check, calibrated('2024-11-18'))
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.age!.value).toBeGreaterThan(24)
    expect(finding.message).toContain('24 months')
  })

  it('just passes on the day', () => {
    expect(run(check, calibrated('2024-11-20')).outcome).toBe('passed')
  })

  it.each([
    ['no calibration date of the reference detector', calibrated(null)],
    ['no date of the measurement', calibrated('2024-11-20', null)],
    ['a date that cannot be read; year-month-day is wanted', calibrated('last spring')],
  ])('%s: not checked', (reason, context) => {
    expect(run(check, context)).toEqual({ outcome: 'not-checked', reason })
  })
})
