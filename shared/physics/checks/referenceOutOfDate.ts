import { fired, notChecked, PASSED, type Check } from './check.js'

const DAYS_PER_MONTH = 365.2425 / 12
const MS_PER_DAY = 86_400_000

/** A detector drifts: its calibration counts for a limited time. */
export const referenceOutOfDate: Check = {
  name: 'reference-out-of-date',
  title: 'Reference out of date',
  inputs: ['calibration date of the reference detector', 'date of the measurement'],
  defaultThresholds: {
    oldestMonths: { value: 24, unit: 'months', meaning: 'Age of the calibration on the day of the measurement' },
  },
  advice:
    'Have the reference detector calibrated, or compare it with one in date, and scale the scans of the meantime.',
  run(context, thresholds) {
    const { referenceCalibrationDate, measuredOn } = context.conditions
    if (!referenceCalibrationDate) return notChecked('no calibration date of the reference detector')
    if (!measuredOn) return notChecked('no date of the measurement')
    const days = (Date.parse(measuredOn) - Date.parse(referenceCalibrationDate)) / MS_PER_DAY
    if (!Number.isFinite(days)) return notChecked('a date that cannot be read; year-month-day is wanted')
    const months = days / DAYS_PER_MONTH
    if (months <= thresholds.oldestMonths!) return PASSED
    return fired(this, {
      severity: 'caution',
      message:
        `The reference detector was calibrated on ${referenceCalibrationDate}, ${months.toFixed(1)} months before ` +
        `the measurement; the limit is ${thresholds.oldestMonths} months.`,
      numbers: {
        age: { value: months, unit: 'months' },
        limit: { value: thresholds.oldestMonths!, unit: 'months' },
      },
    })
  },
}
