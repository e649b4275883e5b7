import type { ReadScan } from './readingResult.js'

/** Above this a fraction is none; below it a whole scan of a junction is suspiciously small. */
const LARGEST_FRACTION = 1.5
const SMALLEST_MAXIMUM = 0.015

/** What looks wrong about scans as they were read, whoever chose the units. */
export function doubtsAbout(scans: readonly ReadScan[]): string[] {
  return scans.flatMap(({ label, quantity, values }) => {
    if (quantity === 'irradiance') return []
    const largest = values.reduce((most, value) => Math.max(most, value), -Infinity)
    const inPercent = Number((100 * largest).toPrecision(4))
    if (largest > LARGEST_FRACTION)
      return [`As read, “${label}” reaches ${inPercent} %; its unit may be percent, or A/W, and not a fraction.`]
    if (largest > 0 && largest < SMALLEST_MAXIMUM)
      return [`As read, “${label}” reaches only ${inPercent} %; its unit may be a fraction and not percent.`]
    return []
  })
}
