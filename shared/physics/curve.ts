import { DomainError } from './errors.js'

/**
 * A quantity known at wavelengths and taken as linear between them: EQE or reflectance (fraction), spectral irradiance
 * (W m⁻² nm⁻¹), responsivity (A/W). `wavelengthNm` is strictly increasing, at least two points; both arrays have the
 * same length. What lies outside the range is not known; each function says what it takes it for.
 */
export interface Curve {
  readonly wavelengthNm: Float64Array
  readonly values: Float64Array
}

/**
 * Builds a curve, checking lengths, finiteness and order.
 * @throws DomainError when there are fewer than two points, the lengths differ, a value is not finite, or a wavelength
 * is not above the one before it.
 */
export function makeCurve(wavelengthNm: ArrayLike<number>, values: ArrayLike<number>): Curve {
  const curve = { wavelengthNm: Float64Array.from(wavelengthNm), values: Float64Array.from(values) }
  assertCurve(curve, 'curve')
  return curve
}

/** Throws a DomainError that names the first element that breaks the rules of `Curve`. */
export function assertCurve(curve: Curve, argument: string): void {
  const { wavelengthNm, values } = curve
  if (wavelengthNm.length !== values.length)
    throw new DomainError(
      argument,
      `${argument} has ${wavelengthNm.length} wavelengths and ${values.length} values; each wavelength needs one value.`,
    )
  if (wavelengthNm.length < 2)
    throw new DomainError(argument, `${argument} has ${wavelengthNm.length} points; it needs at least two.`)
  for (let i = 0; i < values.length; i++) {
    if (!Number.isFinite(values[i]!))
      throw new DomainError(argument, `${argument}.values[${i}] is ${values[i]}; it must be a finite number.`)
    if (!(wavelengthNm[i]! > 0) || !Number.isFinite(wavelengthNm[i]!))
      throw new DomainError(argument, `${argument}.wavelengthNm[${i}] is ${wavelengthNm[i]}; it must be above zero.`)
    if (i > 0 && !(wavelengthNm[i]! > wavelengthNm[i - 1]!))
      throw new DomainError(
        argument,
        `${argument}.wavelengthNm[${i}] = ${wavelengthNm[i]} is not above ${wavelengthNm[i - 1]} before it.`,
      )
  }
}

/** First and last wavelength, nm. */
export function rangeNm(curve: Curve): [number, number] {
  return [curve.wavelengthNm[0]!, curve.wavelengthNm[curve.wavelengthNm.length - 1]!]
}

/** Index of the last wavelength that is not above `wavelengthNm`; −1 before the first. Bisection, O(log n). */
export function indexAtOrBelow(grid: Float64Array, wavelengthNm: number): number {
  let low = -1
  let high = grid.length
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (grid[middle]! <= wavelengthNm) low = middle
    else high = middle
  }
  return low
}

/** Value at one wavelength, linear between points; `outside` (default 0) beyond the range, never extrapolated. */
export function valueAt(curve: Curve, wavelengthNm: number, outside = 0): number {
  const x = curve.wavelengthNm
  const y = curve.values
  const last = x.length - 1
  if (!(wavelengthNm >= x[0]! && wavelengthNm <= x[last]!)) return outside
  const i = Math.min(indexAtOrBelow(x, wavelengthNm), last - 1)
  const t = (wavelengthNm - x[i]!) / (x[i + 1]! - x[i]!)
  return y[i]! + t * (y[i + 1]! - y[i]!)
}
