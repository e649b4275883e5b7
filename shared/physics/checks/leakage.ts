import { valueAt, type Curve } from '../curve.js'
import { foreignShare, type ForeignShare } from '../measurement/exclusiveBand.js'
import { fired, notChecked, PASSED, type Check, type ScanInContext } from './check.js'
import type { OtherJunction } from './otherJunctions.js'
import { isMissing, otherJunctions } from './otherJunctions.js'
import { secondOrderShare } from './secondOrderShare.js'
import { band, junctionName, percent } from './wording.js'

export interface Leak extends ForeignShare {
  readonly index: number
}

/** The share of every other junction in the scan, where that junction alone responds; those without a band left out. */
export function leaksOf(context: ScanInContext, others: readonly OtherJunction[]): Leak[] {
  const filters = context.conditions.filterChangesNm ?? []
  const second = secondOrderShare(
    context.scan,
    others.map((o) => o.scan),
    filters,
  )
  const isSecond = second !== null && second.share > 4 * second.uncertainty
  const secondOrder = (nm: number): number =>
    isSecond && nm >= second.bandNm[0] && !filters.some((f) => f <= nm && f > nm / 2)
      ? second.share * valueAt(context.scan, nm / 2)
      : 0
  return others.flatMap((other) => {
    const rest: Curve[] = others.flatMap((o) => (o.index === other.index ? [] : [o.scan]))
    const found = foreignShare(context.scan, other.scan, rest, secondOrder)
    return found ? [{ ...found, index: other.index }] : []
  })
}

/** Above this share the two scans show one and the same junction, and this check cannot tell which scan is wrong. */
const SAME_RESPONSE = 0.8

/** A junction with a low shunt resistance lets the others' spectrum through: w_k < 1, w_j > 0. */
export const leakage: Check = {
  name: 'leakage',
  title: 'Leakage from another junction',
  inputs: ['scans of the other junctions'],
  defaultThresholds: {
    cautionShare: {
      value: 0.01,
      unit: '',
      meaning: 'Share of another junction’s response, from which on to be careful',
    },
    rejectShare: { value: 0.05, unit: '', meaning: 'Share of another junction’s response, from which on to reject' },
  },
  advice:
    'Trace the J–V curve under the same bias light to see whether the junction under test is shunted or breaks down; ' +
    'adjust the bias voltage for the least response in the marked band, raise the other junctions’ bias light, and ' +
    'repeat. What remains can be unmixed into a corrected copy.',
  run(context, thresholds) {
    if (context.connection === 'independent') return notChecked('the junctions do not share a current')
    if (context.junctions.length < 2) return notChecked('the device has one junction')
    const others = otherJunctions(context)
    if (isMissing(others)) return notChecked(others.missing)
    const leaks = leaksOf(context, others)
    const strong = leaks.filter((l) => l.weight > thresholds.cautionShare! && l.weight > 4 * l.uncertainty)
    if (strong.length === 0)
      return leaks.length === others.length
        ? PASSED
        : notChecked('the scan has no band where another junction alone responds')
    const same = strong.find((l) => l.weight > SAME_RESPONSE)
    if (same)
      return fired(this, {
        severity: 'caution',
        message:
          `The scans of ${junctionName(context.junctionIndex)} and ${junctionName(same.index)} show the same response ` +
          `at ${band(same.bandNm)} (${percent(same.weight, 0)}): in one of the two the junction under test did not limit.`,
        numbers: { [`shareOfJunction${same.index + 1}`]: { value: same.weight, unit: '' } },
        bandsNm: [same.bandNm],
      })
    const worst = strong.reduce((a, b) => (b.weight > a.weight ? b : a))
    const parts = strong.map(
      (l) => `${percent(l.weight)} of ${junctionName(l.index)} (± ${percent(l.uncertainty, 2)}) at ${band(l.bandNm)}`,
    )
    return fired(this, {
      severity: worst.weight - 2 * worst.uncertainty > thresholds.rejectShare! ? 'reject' : 'caution',
      message: `Where only another junction absorbs, the scan shows ${parts.join('; ')}.`,
      numbers: Object.fromEntries(
        strong.flatMap((l) => [
          [`shareOfJunction${l.index + 1}`, { value: l.weight, unit: '' }],
          [`uncertaintyOfJunction${l.index + 1}`, { value: l.uncertainty, unit: '' }],
        ]),
      ),
      bandsNm: strong.map((l) => l.bandNm),
    })
  },
}
