import { indexAtOrBelow, type Curve } from '../curve.js'
import { pointNoise } from '../measurement/pointNoise.js'
import { fired, notChecked, PASSED, type Check } from './check.js'
import { percent } from './wording.js'

/** Where an order-sorting filter comes in the scan must go on smoothly. */
export const filterStep: Check = {
  name: 'filter-step',
  title: 'Step at a filter change',
  inputs: ['wavelengths of filter changes'],
  defaultThresholds: {
    smallestStep: { value: 0.005, unit: '', meaning: 'EQE step below which none is reported' },
    noiseFactor: { value: 4, unit: '', meaning: 'Step over its noise from which on it counts' },
  },
  advice:
    'Take a few points on both sides of the change with and without the filter; check that the reference pass used the ' +
    'same filter at the same wavelengths, and that stray light or second order does not enter before it.',
  run(context, thresholds) {
    const { filterChangesNm } = context.conditions
    if (!filterChangesNm) return notChecked('no filter changes recorded')
    const noise = pointNoise(context.scan)
    const steps = filterChangesNm.flatMap((nm) => stepAt(context.scan, nm) ?? [])
    if (steps.length === 0 && filterChangesNm.length > 0)
      return notChecked('no filter change lies within the scan, three points from its ends')
    const jumps = steps.filter(
      (s) =>
        Math.abs(s.step) > thresholds.smallestStep! + s.slopeAllowance + thresholds.noiseFactor! * NOISE_GAIN * noise,
    )
    if (jumps.length === 0) return PASSED
    const worst = jumps.reduce((a, b) => (Math.abs(b.step) > Math.abs(a.step) ? b : a))
    return fired(this, {
      severity: 'caution',
      message: `EQE jumps by ${percent(worst.step, 2)} (absolute) between ${worst.bandNm[0]} and ${worst.bandNm[1]} nm, where a filter changes.`,
      numbers: {
        step: { value: worst.step, unit: '' },
        allowed: { value: worst.slopeAllowance + thresholds.noiseFactor! * NOISE_GAIN * noise, unit: '' },
      },
      bandsNm: jumps.map((s) => s.bandNm),
    })
  },
}

interface Step {
  readonly step: number
  /** How far lines through three points each side may miss for the local curvature. */
  readonly slopeAllowance: number
  readonly bandNm: readonly [number, number]
}

/** Noise of the difference of two straight lines through three points, carried on by half a step. */
const NOISE_GAIN = Math.sqrt(2 * (1 / 3 + 1.5 ** 2 / 2))

function stepAt(scan: Curve, nm: number): Step | null {
  const { wavelengthNm: x, values: y } = scan
  // The filter is in from its own wavelength on.
  const at = indexAtOrBelow(x, nm)
  const right = at >= 0 && x[at] === nm ? at : at + 1
  if (right < 3 || right + 2 >= x.length) return null
  const middle = 0.5 * (x[right - 1]! + x[right]!)
  const left = line(x, y, right - 3)
  const later = line(x, y, right)
  return {
    step: later.at(middle) - left.at(middle),
    slopeAllowance: 2 * (left.bend + later.bend),
    bandNm: [x[right - 1]!, x[right]!],
  }
}

/** Least-squares line through three points from `i`, and how far the middle one lies off the outer two. */
function line(x: Float64Array, y: Float64Array, i: number): { at: (nm: number) => number; bend: number } {
  const xs = [x[i]!, x[i + 1]!, x[i + 2]!]
  const ys = [y[i]!, y[i + 1]!, y[i + 2]!]
  const meanX = (xs[0]! + xs[1]! + xs[2]!) / 3
  const meanY = (ys[0]! + ys[1]! + ys[2]!) / 3
  const slope =
    xs.reduce((sum, v, k) => sum + (v - meanX) * (ys[k]! - meanY), 0) / xs.reduce((sum, v) => sum + (v - meanX) ** 2, 0)
  const share = (xs[1]! - xs[0]!) / (xs[2]! - xs[0]!)
  return {
    at: (nm) => meanY + slope * (nm - meanX),
    bend: Math.abs(ys[1]! - (1 - share) * ys[0]! - share * ys[2]!),
  }
}
