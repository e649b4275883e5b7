import { assertFinite, assertPositive, assertWithin, DomainError } from '../errors.js'

const SQRT_2_PI = Math.sqrt(2 * Math.PI)

/** Density of the standard normal distribution at z. */
export function normalDensity(z: number): number {
  return Math.exp(-0.5 * z * z) / SQRT_2_PI
}

/**
 * Φ(z), the probability that a standard normal variable lies below z.
 *
 * For |z| < 3 the series `Φ = ½ + φ(z) Σ z^(2n+1)/(1·3·…·(2n+1))` (Abramowitz & Stegun 26.2.11, all terms of one sign),
 * else Laplace's continued fraction (26.2.14). Absolute error below 1e-15; tails keep 12 digits. NaN in, DomainError.
 */
export function normalProbabilityBelow(z: number): number {
  if (Number.isNaN(z)) throw new DomainError('z', 'z is NaN; it must be a number.')
  if (z > 39) return 1
  if (z < -39) return 0
  const size = Math.abs(z)
  if (size < 3) {
    let term = z
    let sum = z
    for (let n = 1; Math.abs(term) > 1e-17 * Math.abs(sum); n++) {
      term *= (z * z) / (2 * n + 1)
      sum += term
    }
    return 0.5 + normalDensity(z) * sum
  }
  let fraction = size
  for (let n = 120; n >= 1; n--) fraction = size + n / fraction
  const tail = normalDensity(size) / fraction
  return z > 0 ? 1 - tail : tail
}

/** ln Γ(x) for x > 0: Stirling's series after raising x above 12 by recurrence (A&S 6.1.40). Error below 1e-13. */
function logGamma(x: number): number {
  let shift = 0
  let y = x
  while (y < 12) {
    shift += Math.log(y)
    y += 1
  }
  const r = 1 / (y * y)
  const series = (1 / 12 - r * (1 / 360 - r * (1 / 1260 - r * (1 / 1680 - r / 1188)))) / y
  return (y - 0.5) * Math.log(y) - y + 0.5 * Math.log(2 * Math.PI) + series - shift
}

/** Regularised incomplete beta function I_x(a, b) by its continued fraction (A&S 26.5.8, modified Lentz). */
function incompleteBeta(x: number, a: number, b: number): number {
  if (x <= 0) return 0
  if (x >= 1) return 1
  if (x > (a + 1) / (a + b + 2)) return 1 - incompleteBeta(1 - x, b, a)
  const front = Math.exp(a * Math.log(x) + b * Math.log1p(-x) + logGamma(a + b) - logGamma(a) - logGamma(b)) / a
  const tiny = 1e-300
  const bounded = (value: number): number => (Math.abs(value) < tiny ? tiny : value)
  let c = 1
  let d = 1 / bounded(1 - ((a + b) * x) / (a + 1))
  let fraction = d
  for (let m = 1; m <= 500; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m))
    d = 1 / bounded(1 + even * d)
    c = bounded(1 + even / c)
    fraction *= d * c
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1))
    d = 1 / bounded(1 + odd * d)
    c = bounded(1 + odd / c)
    const step = d * c
    fraction *= step
    if (Math.abs(step - 1) < 1e-15) break
  }
  return front * fraction
}

/**
 * Coverage factor k of a two-sided interval: `P(|t| < k) = probability` for Student's t with ν degrees of freedom
 * (JCGM 100:2008, G.3 and Table G.2). ν = Infinity gives the normal distribution's factor.
 *
 * @param probability between 0 and 1, both excluded, e.g. 0.95. @param degreesOfFreedom above zero, not necessarily whole.
 * @returns k to about 1e-10. @throws DomainError outside the domain. Cost: about 60 evaluations of the beta function.
 */
export function coverageFactor(probability: number, degreesOfFreedom: number): number {
  assertWithin(probability, 1e-12, 1 - 1e-12, 'probability')
  if (degreesOfFreedom !== Infinity) assertPositive(degreesOfFreedom, 'degreesOfFreedom')
  const inside = (k: number): number =>
    degreesOfFreedom > 1e8
      ? 1 - 2 * normalProbabilityBelow(-k)
      : 1 - incompleteBeta(degreesOfFreedom / (degreesOfFreedom + k * k), degreesOfFreedom / 2, 0.5)
  let low = 0
  let high = 1
  while (inside(high) < probability) high *= 2
  assertFinite(high, 'degreesOfFreedom')
  for (let step = 0; step < 200 && high - low > 1e-12 * high; step++) {
    const middle = 0.5 * (low + high)
    if (inside(middle) < probability) low = middle
    else high = middle
  }
  return 0.5 * (low + high)
}
