import { assertFinite, assertPositive, DomainError } from '../errors.js'

export interface RootOptions {
  /** Absolute tolerance on x, in the unit of x; rounding of x itself is always allowed for. Default 0. */
  readonly tolerance?: number
  readonly maxIterations?: number
}

/**
 * A zero of `f` between `low` and `high` by Brent's method: inverse quadratic steps, secants and bisections, none of
 * which leaves the bracket. `f` may be infinite (its sign is what counts), never NaN.
 * Source: R. P. Brent, Algorithms for Minimization without Derivatives (1973), chapter 4.
 * @throws DomainError when the bracket is not finite or not in order, f has the same sign at both ends, or f is NaN.
 * Cost: 8 to 15 evaluations for a smooth f, at worst about 60 bisections squared; the default limit is 300.
 */
export function findRoot(f: (x: number) => number, low: number, high: number, options: RootOptions = {}): number {
  const tolerance = options.tolerance ?? 0
  checkBracket(low, high)
  let a = low
  let b = high
  let fa = valueOf(f, a)
  let fb = valueOf(f, b)
  if (fa === 0) return a
  if (fb === 0) return b
  if (fa > 0 === fb > 0) throw noSignChange(low, high, fa, fb)
  let c = a
  let fc = fa
  let step = b - a
  let stepBefore = step
  for (let iteration = 0; iteration < (options.maxIterations ?? 300); iteration++) {
    if (Math.abs(fc) < Math.abs(fb)) {
      ;[a, b, c] = [b, c, b]
      ;[fa, fb, fc] = [fb, fc, fb]
    }
    const close = 2 * Number.EPSILON * Math.abs(b) + 0.5 * tolerance
    const middle = 0.5 * (c - b)
    if (Math.abs(middle) <= close || fb === 0) return b
    if (Math.abs(stepBefore) >= close && Math.abs(fa) > Math.abs(fb) && Number.isFinite(fa) && Number.isFinite(fc)) {
      const s = fb / fa
      let p: number
      let q: number
      if (a === c) {
        p = 2 * middle * s
        q = 1 - s
      } else {
        const t = fa / fc
        const r = fb / fc
        p = s * (2 * middle * t * (t - r) - (b - a) * (r - 1))
        q = (t - 1) * (r - 1) * (s - 1)
      }
      if (p > 0) q = -q
      p = Math.abs(p)
      if (2 * p < Math.min(3 * middle * q - Math.abs(close * q), Math.abs(stepBefore * q))) {
        stepBefore = step
        step = p / q
      } else {
        step = middle
        stepBefore = middle
      }
    } else {
      step = middle
      stepBefore = middle
    }
    a = b
    fa = fb
    b += Math.abs(step) > close ? step : middle > 0 ? close : -close
    fb = valueOf(f, b)
    if (fb > 0 === fc > 0) {
      c = a
      fc = fa
      step = b - a
      stepBefore = step
    }
  }
  return b
}

/**
 * A zero of a monotone `f` between `low` and `high` by Newton steps; a step that would leave the bracket, or that does
 * not halve it fast enough, is replaced by a bisection.
 * @param f returns the value and the derivative at x.
 * @param start first guess; the middle of the bracket otherwise.
 * @throws DomainError when the bracket is not finite or not in order, or f has the same sign at both ends.
 * Cost: about 6 evaluations from a good start.
 */
export function findMonotoneRoot(
  f: (x: number) => readonly [value: number, slope: number],
  low: number,
  high: number,
  start = 0.5 * (low + high),
): number {
  checkBracket(low, high)
  const atLow = f(low)[0]
  const atHigh = f(high)[0]
  if (atLow === 0) return low
  if (atHigh === 0) return high
  if (Number.isNaN(atLow) || Number.isNaN(atHigh) || atLow > 0 === atHigh > 0)
    throw noSignChange(low, high, atLow, atHigh)
  const rises = atHigh > 0
  let a = low
  let b = high
  let x = Math.min(b, Math.max(a, start))
  let before = b - a
  for (let iteration = 0; iteration < 200; iteration++) {
    const [value, slope] = f(x)
    if (value === 0) return x
    if (value > 0 === rises) b = x
    else a = x
    const newton = x - value / slope
    const isUsable = newton >= a && newton <= b && Math.abs(newton - x) <= 0.5 * before
    const next = isUsable ? newton : 0.5 * (a + b)
    before = Math.abs(next - x)
    if (before <= Number.EPSILON * Math.abs(next) || next === x) return next
    x = next
  }
  return x
}

function checkBracket(low: number, high: number): void {
  assertFinite(low, 'low')
  assertPositive(high - low, 'high − low')
}

function valueOf(f: (x: number) => number, x: number): number {
  const value = f(x)
  if (Number.isNaN(value)) throw new DomainError('f', `f(${x}) is not a number.`)
  return value
}

function noSignChange(low: number, high: number, atLow: number, atHigh: number): DomainError {
  return new DomainError(
    'low',
    `f is ${atLow} at ${low} and ${atHigh} at ${high}; it must change sign between the two ends of the bracket.`,
  )
}
