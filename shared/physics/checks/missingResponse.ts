import { valueAt, type Curve } from '../curve.js'
import { median, pointNoise } from '../measurement/pointNoise.js'
import { fired, notChecked, PASSED, type Check } from './check.js'
import { isMissing, otherJunctions } from './otherJunctions.js'
import { leaksOf } from './leakage.js'
import { junctionName, percent } from './wording.js'

/** Too little in the own band and, together with it, something in another junction's band: the signature of w_k < 1. */
export const missingResponse: Check = {
  name: 'missing-response',
  title: 'Missing response',
  inputs: ['repeat or neighbour scans of the same junction', 'scans of the other junctions'],
  defaultThresholds: {
    smallestShortfall: { value: 0.02, unit: '', meaning: 'Share by which the own band falls short of the best repeat' },
    smallestForeignGain: {
      value: 0.005,
      unit: '',
      meaning: 'Share of another junction’s response that the scan shows more of than the repeat',
    },
  },
  advice:
    'The junction under test is not selected alone here. Compare the bias light and bias voltage of the two scans, ' +
    'raise the bias light of the other junctions, and take the scan with the higher own response.',
  run(context, thresholds) {
    if (context.connection === 'independent') return notChecked('the junctions do not share a current')
    if (context.junctions.length < 2) return notChecked('the device has one junction')
    if (!context.repeats || context.repeats.length === 0) return notChecked('no repeat or neighbour scan')
    const others = otherJunctions(context)
    if (isMissing(others)) return notChecked(others.missing)
    const own = leaksOf(context, others)
    const candidates = context.repeats.flatMap((repeat) => {
      const short = shortfall(context.scan, repeat)
      const foreign = leaksOf({ ...context, scan: repeat }, others)
      const gains = own.flatMap((l) => {
        const there = foreign.find((f) => f.index === l.index)
        return there
          ? [{ leak: l, gain: l.weight - there.weight, uncertainty: Math.hypot(l.uncertainty, there.uncertainty) }]
          : []
      })
      const gain = gains.sort((a, b) => b.gain - a.gain)[0]
      return short && gain ? [{ short, gain }] : []
    })
    const worst = candidates.sort((a, b) => b.short.share - a.short.share)[0]
    if (!worst) return notChecked('the repeat scans share no band with this one to compare')
    const { short, gain } = worst
    const isShort = short.share > thresholds.smallestShortfall! && short.share > 3 * short.uncertainty
    const isForeign = gain.gain > thresholds.smallestForeignGain! && gain.gain > 3 * gain.uncertainty
    if (!isShort || !isForeign) return PASSED
    return fired(this, {
      severity: 'caution',
      message:
        `The own response is ${percent(short.share)} below a repeat scan, and ${percent(gain.gain)} more of ` +
        `${junctionName(gain.leak.index)} shows: the junction under test is selected only in part.`,
      numbers: {
        shortfall: { value: short.share, unit: '' },
        foreignGain: { value: gain.gain, unit: '' },
        otherJunction: { value: gain.leak.index + 1, unit: '' },
      },
      bandsNm: [short.bandNm, gain.leak.bandNm],
    })
  },
}

interface Shortfall {
  readonly share: number
  readonly uncertainty: number
  readonly bandNm: readonly [number, number]
}

/** How far the scan lies below a repeat where the repeat is above half of its maximum. */
function shortfall(scan: Curve, repeat: Curve): Shortfall | null {
  const half = 0.5 * repeat.values.reduce((largest, y) => Math.max(largest, y), 0)
  const chosen = Array.from(scan.wavelengthNm.keys()).filter((i) => valueAt(repeat, scan.wavelengthNm[i]!) > half)
  if (chosen.length < 5 || !(half > 0)) return null
  const ratios = chosen.map((i) => scan.values[i]! / valueAt(repeat, scan.wavelengthNm[i]!))
  const noise = Math.hypot(pointNoise(scan), pointNoise(repeat)) / half
  return {
    share: 1 - median(ratios),
    uncertainty: noise / Math.sqrt(chosen.length),
    bandNm: [scan.wavelengthNm[chosen[0]!]!, scan.wavelengthNm[chosen.at(-1)!]!],
  }
}
