import type { Curve } from '../curve.js'

/** 1/Φ⁻¹(3/4): the median of |x| of a normal variable, turned into its standard deviation. */
const NORMAL_PER_MEDIAN = 1.482602218505602

/** The median of numbers; NaN never goes in, an empty list gives 0. */
export function median(values: readonly number[]): number {
  if (values.length === 0) return 0
  const sorted = [...values].sort((a, b) => a - b)
  const middle = sorted.length >> 1
  return sorted.length % 2 === 1 ? sorted[middle]! : 0.5 * (sorted[middle - 1]! + sorted[middle]!)
}

/**
 * Standard deviation of the noise from point to point of a scan, in the unit of its values. Second and fourth
 * differences (each point against the parabola through its neighbours), scaled to white noise, by the median so that
 * an absorption edge does not count as noise; the smaller of the two, because a smooth curve loses with the order
 * and noise does not. Zero with fewer than seven points.
 * Source: the difference estimator of T. Gasser, L. Sroka, C. Jennen-Steinmetz, Biometrika 73 (1986) 625.
 */
export function pointNoise(curve: Curve): number {
  const { wavelengthNm: x, values: y } = curve
  const n = y.length
  if (n < 7) return 0
  const second: number[] = []
  for (let i = 1; i + 1 < n; i++) {
    const t = (x[i]! - x[i - 1]!) / (x[i + 1]! - x[i - 1]!)
    const deviation = y[i]! - (1 - t) * y[i - 1]! - t * y[i + 1]!
    second.push(Math.abs(deviation) / Math.sqrt(1 + (1 - t) ** 2 + t ** 2))
  }
  const fourth: number[] = []
  for (let i = 2; i + 2 < n; i++)
    fourth.push(Math.abs(y[i - 2]! - 4 * y[i - 1]! + 6 * y[i]! - 4 * y[i + 1]! + y[i + 2]!) / Math.sqrt(70))
  return NORMAL_PER_MEDIAN * Math.min(median(second), median(fourth))
}
