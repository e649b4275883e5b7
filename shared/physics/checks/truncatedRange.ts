import { pointNoise } from '../measurement/pointNoise.js'
import { fired, PASSED, type Check } from './check.js'
import { percent } from './wording.js'

/** A scan that ends while the junction still responds leaves current out: its J_sc is a lower bound. */
export const truncatedRange: Check = {
  name: 'truncated-range',
  title: 'Truncated range',
  inputs: [],
  defaultThresholds: {
    largestEdgeResponse: { value: 0.02, unit: '', meaning: 'EQE at either end of the scan' },
  },
  advice: 'Go on beyond the end of the scan until the response is below the limit; until then Jsc is a lower bound.',
  run(context, thresholds) {
    const { wavelengthNm: x, values: y } = context.scan
    const last = y.length - 1
    const noise = pointNoise(context.scan)
    const ends = [
      { nm: x[0]!, next: x[1]!, response: y[0]! },
      { nm: x[last]!, next: x[last - 1]!, response: y[last]! },
    ].filter((end) => end.response > thresholds.largestEdgeResponse! + 2 * noise)
    if (ends.length === 0) return PASSED
    const words = ends.map((end) => `${percent(end.response)} at ${end.nm} nm`)
    return fired(this, {
      severity: 'caution',
      message: `The scan is truncated: EQE is still ${words.join(' and ')}, where it ends. Jsc is a lower bound.`,
      numbers: Object.fromEntries(
        ends.map((end) => [end.nm === x[0] ? 'responseAtStart' : 'responseAtEnd', { value: end.response, unit: '' }]),
      ),
      bandsNm: ends.map((end) => [Math.min(end.nm, end.next), Math.max(end.nm, end.next)] as const),
    })
  },
}
