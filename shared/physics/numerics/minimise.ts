import { assertFinite, assertPositive, DomainError } from '../errors.js'

/** Where a function of one variable is least, and what the search cost. */
export interface IntervalMinimum {
  readonly x: number
  readonly value: number
  readonly evaluations: number
}

export interface IntervalSearchOptions {
  /** Absolute tolerance on x, in the unit of x. Default 1e-9 of the interval. */
  readonly tolerance?: number
  /** Equidistant points looked at first, so that a function with several valleys is not left in the wrong one. */
  readonly samples?: number
}

const GOLDEN = (3 - Math.sqrt(5)) / 2

/**
 * Least value of `f` on [low, high]: equidistant samples, then Brent's golden-section and parabolic search around the
 * best of them. A minimum at an end of the interval is found exactly there.
 * Source: R. P. Brent, Algorithms for Minimization without Derivatives (1973), chapter 5.
 * @param f must be finite on the whole interval; a kink is allowed.
 * @throws DomainError when the bounds are not finite or not in order, or when `f` returns a value that is not finite.
 * Cost: `samples` + about 40 evaluations.
 */
export function minimiseOnInterval(
  f: (x: number) => number,
  low: number,
  high: number,
  options: IntervalSearchOptions = {},
): IntervalMinimum {
  assertFinite(low, 'low')
  assertFinite(high, 'high')
  if (!(high > low)) throw new DomainError('high', `high is ${high}; it must be above low = ${low}.`)
  const tolerance = options.tolerance ?? 1e-9 * (high - low)
  assertPositive(tolerance, 'tolerance')
  const samples = Math.max(2, options.samples ?? 48)
  let evaluations = 0
  const at = (x: number): number => {
    const value = f(x)
    evaluations++
    assertFinite(value, `f(${x})`)
    return value
  }

  const sampleAt = (i: number): number => (i === samples ? high : low + ((high - low) * i) / samples)
  let best = 0
  let bestValue = at(low)
  for (let i = 1; i <= samples; i++) {
    const value = at(sampleAt(i))
    if (value < bestValue) {
      best = i
      bestValue = value
    }
  }
  const found = brent(at, sampleAt(Math.max(0, best - 1)), sampleAt(Math.min(samples, best + 1)), tolerance)
  const isBetter = found.value < bestValue
  return { x: isBetter ? found.x : sampleAt(best), value: isBetter ? found.value : bestValue, evaluations }
}

function brent(f: (x: number) => number, low: number, high: number, tolerance: number): { x: number; value: number } {
  let a = low
  let b = high
  let x = a + GOLDEN * (b - a)
  let w = x
  let v = x
  let fx = f(x)
  let fw = fx
  let fv = fx
  let step = 0
  let stepBefore = 0
  for (let iteration = 0; iteration < 200; iteration++) {
    const middle = 0.5 * (a + b)
    const close = tolerance + 1e-15 * Math.abs(x)
    if (Math.abs(x - middle) <= 2 * close - 0.5 * (b - a)) break
    let usesParabola = false
    if (Math.abs(stepBefore) > close) {
      const r = (x - w) * (fx - fv)
      let q = (x - v) * (fx - fw)
      let p = (x - v) * q - (x - w) * r
      q = 2 * (q - r)
      if (q > 0) p = -p
      q = Math.abs(q)
      const limit = stepBefore
      stepBefore = step
      if (Math.abs(p) < Math.abs(0.5 * q * limit) && p > q * (a - x) && p < q * (b - x)) {
        step = p / q
        const u = x + step
        if (u - a < 2 * close || b - u < 2 * close) step = middle >= x ? close : -close
        usesParabola = true
      }
    }
    if (!usesParabola) {
      stepBefore = x >= middle ? a - x : b - x
      step = GOLDEN * stepBefore
    }
    const u = x + (Math.abs(step) >= close ? step : step > 0 ? close : -close)
    const fu = f(u)
    if (fu <= fx) {
      if (u >= x) a = x
      else b = x
      v = w
      fv = fw
      w = x
      fw = fx
      x = u
      fx = fu
    } else {
      if (u < x) a = u
      else b = u
      if (fu <= fw || w === x) {
        v = w
        fv = fw
        w = u
        fw = fu
      } else if (fu <= fv || v === x || v === w) {
        v = u
        fv = fu
      }
    }
  }
  return { x, value: fx }
}
