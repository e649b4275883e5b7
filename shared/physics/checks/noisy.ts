import { pointNoise } from '../measurement/pointNoise.js'
import { fired, notChecked, PASSED, type Check } from './check.js'
import { percent } from './wording.js'

/** Second differences of white noise have √6 times its standard deviation. */
const SECOND_DIFFERENCE = Math.sqrt(6)

/** The rms of the second difference, by the median so that an edge does not count, against the maximum of the scan. */
export const noisy: Check = {
  name: 'noisy',
  title: 'Noisy',
  inputs: ['scan of at least seven points'],
  defaultThresholds: {
    largestRms: { value: 0.01, unit: '', meaning: 'Rms of the second difference over the maximum of the scan' },
  },
  advice:
    'Average longer, raise the probe light, take the lower amplifier range, keep cables and chopper away from mains; ' +
    'wait three to five time constants after each step (common practice).',
  run(context, thresholds) {
    if (context.scan.values.length < 7) return notChecked('the scan has fewer than seven points')
    const maximum = context.scan.values.reduce((largest, y) => Math.max(largest, y), 0)
    if (!(maximum > 0)) return notChecked('the scan has no response')
    const noise = pointNoise(context.scan)
    const rms = (SECOND_DIFFERENCE * noise) / maximum
    if (rms <= thresholds.largestRms!) return PASSED
    return fired(this, {
      severity: 'caution',
      message:
        `The second difference has an rms of ${percent(rms, 2)} of the scan’s maximum: noise of about ` +
        `${percent(noise, 2)} (absolute EQE) from point to point.`,
      numbers: {
        secondDifferenceRms: { value: rms, unit: '' },
        pointNoise: { value: noise, unit: '' },
      },
    })
  },
}
