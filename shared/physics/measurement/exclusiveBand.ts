import { valueAt, type Curve } from '../curve.js'
import { median, pointNoise } from './pointNoise.js'

/** How much of another junction's response shows in a scan, read where that junction alone responds. */
export interface ForeignShare {
  /** w: median of the scan over the other junction's EQE. */
  readonly weight: number
  /** Standard uncertainty of the weight. */
  readonly uncertainty: number
  readonly bandNm: readonly [number, number]
  readonly wavelengthNm: number[]
}

const LEAST_RESPONSE = 0.4
const LARGEST_THIRD_SHARE = 0.3
const WINDOW_NM = 40
const FOURTH = 0.25

/**
 * The share of junction `other` in `scan`, on the band where `other` alone responds. The own response of the junction
 * under test can only add to the ratio scan/other, so the band is where a window of three to five points (about 40 nm)
 * has the lowest median ratio, grown to both sides for as long as the ratio stays at that level.
 * @param rest scans of the remaining junctions; where one of them reaches 0.3 of `other` the band ends.
 * @param subtract known foreign signal at a wavelength (second order), taken off first.
 * @returns null when fewer neighbouring points than a window of the scan lie where `other` stands alone.
 * Cost: O(n).
 */
export function foreignShare(
  scan: Curve,
  other: Curve,
  rest: readonly Curve[],
  subtract: (wavelengthNm: number) => number = () => 0,
): ForeignShare | null {
  const peak = other.values.reduce((largest, y) => Math.max(largest, y), 0)
  const noise = Math.max(pointNoise(scan), 1e-9)
  const otherNoise = pointNoise(other)
  const runs = alone(scan, other, rest, peak)
  let best: { run: number[]; start: number; level: number } | null = null
  const ratios = new Map<number, number>()
  const step = (scan.wavelengthNm.at(-1)! - scan.wavelengthNm[0]!) / (scan.wavelengthNm.length - 1)
  const window = Math.max(3, Math.min(5, Math.round(WINDOW_NM / step)))
  for (const run of runs) {
    for (const i of run) {
      const nm = scan.wavelengthNm[i]!
      ratios.set(i, (scan.values[i]! - subtract(nm)) / valueAt(other, nm))
    }
    for (let start = 0; start + window <= run.length; start++) {
      const level = median(run.slice(start, start + window).map((i) => ratios.get(i)!))
      if (!best || level < best.level) best = { run, start, level }
    }
  }
  if (!best) return null
  const { run, start, level } = best
  const isAtLevel = (i: number): boolean => {
    const response = valueAt(other, scan.wavelengthNm[i]!)
    const spread = (3 * Math.hypot(noise, level * otherNoise)) / response
    return ratios.get(i)! <= level + spread + Math.min(0.005, FOURTH * Math.abs(level)) + 0.0005
  }
  let from = start
  let to = start + window - 1
  while (from > 0 && isAtLevel(run[from - 1]!)) from--
  while (to + 1 < run.length && isAtLevel(run[to + 1]!)) to++
  const chosen = run.slice(from, to + 1)
  const weights = chosen.map((i) => ratios.get(i)!)
  const weight = median(weights)
  const response = median(chosen.map((i) => valueAt(other, scan.wavelengthNm[i]!)))
  return {
    weight,
    // A median of n normal values is 1.25 times as uncertain as their mean.
    uncertainty: (1.2533 * Math.hypot(noise, weight * otherNoise)) / (response * Math.sqrt(chosen.length)),
    bandNm: [scan.wavelengthNm[chosen[0]!]!, scan.wavelengthNm[chosen.at(-1)!]!],
    wavelengthNm: chosen.map((i) => scan.wavelengthNm[i]!),
  }
}

/** Runs of neighbouring points of the scan where `other` responds well and none of the rest does. */
function alone(scan: Curve, other: Curve, rest: readonly Curve[], peak: number): number[][] {
  const runs: number[][] = []
  let run: number[] = []
  scan.wavelengthNm.forEach((nm, i) => {
    const response = valueAt(other, nm)
    const isAlone =
      response > 0 &&
      response >= LEAST_RESPONSE * peak &&
      rest.every((curve) => valueAt(curve, nm) <= LARGEST_THIRD_SHARE * response)
    if (isAlone) run.push(i)
    else if (run.length > 0) {
      runs.push(run)
      run = []
    }
  })
  if (run.length > 0) runs.push(run)
  return runs
}

/** The longest wavelength at which a curve still reaches half of its maximum, nm. */
export function longWaveEdgeNm(curve: Curve): number {
  const { wavelengthNm: x, values: y } = curve
  const half = 0.5 * y.reduce((largest, value) => Math.max(largest, value), 0)
  for (let i = y.length - 1; i > 0; i--)
    if (y[i]! < half && y[i - 1]! >= half)
      return x[i - 1]! + ((x[i]! - x[i - 1]!) * (y[i - 1]! - half)) / (y[i - 1]! - y[i]!)
  return x.at(-1)!
}
