import { assertFinite, assertNotNegative, assertWithin, DomainError } from '../errors.js'
import { adaptiveIntegral } from './adaptiveIntegral.js'
import { normalDensity, normalProbabilityBelow } from './normalDistribution.js'

/** No junction is called limiting below this probability (physics of the verdict: 95 %). */
export const LIMITING_THRESHOLD = 0.95

/** Variances below this share of the largest are rounding, not uncertainty. */
const RELATIVE_ZERO = 1e-13
/** Beyond this many standard deviations the normal density is below 1e-17. */
const FAR = 8.6

/**
 * What may be said of the stack: one junction limits with probability ≥ 0.95, or none does and the currents are
 * matched within their uncertainty. Junctions are numbered from 1, the sunward one.
 */
export type LimitingVerdict =
  | { readonly kind: 'limited'; readonly junction: number; readonly probability: number }
  | { readonly kind: 'matched-within-uncertainty'; readonly likeliest: number; readonly probability: number }

/**
 * Probability that each junction carries the least current, for normally distributed currents.
 *
 * Two junctions: `P(1 limits) = Φ((J_2 − J_1)/u(J_2 − J_1))`. More: the probability that all differences `J_j − J_i`
 * are positive, a multivariate normal integral; it is made a chain of one-dimensional integrals by a pivoted Cholesky
 * factor of the differences' covariance (Genz, J. Comput. Graph. Stat. 1 (1992) 141), each done adaptively. Error below
 * 1e-7; the probabilities are scaled to add up to 1 exactly. Junctions that are equal and share every error tie: they
 * share the probability evenly.
 *
 * @param currentsMaCm2 n ≥ 1 estimates, mA cm⁻². @param covariance n × n, (mA cm⁻²)², symmetric, positive semidefinite.
 * @returns n probabilities. @throws DomainError on non-finite currents or a covariance of another shape, not symmetric
 * or not semidefinite. Cost: n = 2 one Φ; n = 3 about 1e4, n = 4 about 1e6 evaluations of Φ.
 */
export function limitingProbabilities(
  currentsMaCm2: ArrayLike<number>,
  covariance: readonly ArrayLike<number>[],
): number[] {
  const count = currentsMaCm2.length
  if (count === 0) throw new DomainError('currentsMaCm2', 'currentsMaCm2 is empty; it needs one current a junction.')
  assertCovariance(currentsMaCm2, covariance)
  const groups = tiedGroups(currentsMaCm2, covariance)
  const leaders = groups.map((group) => group[0]!)
  const raw = leaders.map((leader) => probabilityOfLeast(leader, leaders, currentsMaCm2, covariance))
  const total = raw.reduce((sum, p) => sum + p, 0)
  const probabilities = new Array<number>(count).fill(0)
  groups.forEach((group, g) => {
    for (const junction of group) probabilities[junction] = raw[g]! / total / group.length
  })
  return probabilities
}

/** The verdict that the probabilities allow. @throws DomainError when there are none or one lies outside 0…1. */
export function limitingVerdict(probabilities: readonly number[]): LimitingVerdict {
  if (probabilities.length === 0)
    throw new DomainError('probabilities', 'probabilities is empty; it needs one value a junction.')
  probabilities.forEach((p, i) => assertWithin(p, 0, 1 + 1e-12, `probabilities[${i}]`))
  const likeliest = probabilities.indexOf(Math.max(...probabilities))
  const probability = probabilities[likeliest]!
  return probability >= LIMITING_THRESHOLD
    ? { kind: 'limited', junction: likeliest + 1, probability }
    : { kind: 'matched-within-uncertainty', likeliest: likeliest + 1, probability }
}

/** Mean and standard deviation of the smaller of two normal currents, and the probability that it is the first. */
export interface MinimumMoments {
  readonly meanMaCm2: number
  readonly uncertaintyMaCm2: number
  readonly probabilityFirst: number
}

/**
 * Exact moments of `min(J_1, J_2)` of two jointly normal currents (Clark, Oper. Res. 9 (1961) 145, for the maximum of
 * the negatives): with `a² = u1² + u2² − 2ρu1u2`, `α = (J_2 − J_1)/a`,
 * `mean = J_1 Φ(α) + J_2 Φ(−α) − a φ(α)`, `E[min²] = (J_1² + u1²)Φ(α) + (J_2² + u2²)Φ(−α) − (J_1 + J_2) a φ(α)`.
 *
 * Near a tie the mean of the limiting current lies below both currents: the smaller of two noisy numbers is biased low.
 *
 * @param first, second currents, mA cm⁻². @param u1, u2 standard uncertainties ≥ 0, mA cm⁻². @param correlation −1…1.
 * @throws DomainError outside the domain.
 */
export function minimumOfTwo(
  first: number,
  u1: number,
  second: number,
  u2: number,
  correlation: number,
): MinimumMoments {
  assertFinite(first, 'first')
  assertFinite(second, 'second')
  assertNotNegative(u1, 'u1')
  assertNotNegative(u2, 'u2')
  assertWithin(correlation, -1, 1, 'correlation')
  const a = Math.sqrt(Math.max(0, u1 * u1 + u2 * u2 - 2 * correlation * u1 * u2))
  if (a <= 1e-12 * Math.max(u1, u2)) {
    const probabilityFirst = first < second ? 1 : first > second ? 0 : 0.5
    return { meanMaCm2: Math.min(first, second), uncertaintyMaCm2: first <= second ? u1 : u2, probabilityFirst }
  }
  const alpha = (second - first) / a
  const p = normalProbabilityBelow(alpha)
  const q = normalProbabilityBelow(-alpha)
  // Moments about the midpoint: subtracting large squares would cost digits.
  const middle = 0.5 * (first + second)
  const d1 = first - middle
  const d2 = second - middle
  const mean = d1 * p + d2 * q - a * normalDensity(alpha)
  const square = (d1 * d1 + u1 * u1) * p + (d2 * d2 + u2 * u2) * q - (d1 + d2) * a * normalDensity(alpha)
  return {
    meanMaCm2: middle + mean,
    uncertaintyMaCm2: Math.sqrt(Math.max(0, square - mean * mean)),
    probabilityFirst: p,
  }
}

function assertCovariance(currents: ArrayLike<number>, covariance: readonly ArrayLike<number>[]): void {
  const count = currents.length
  for (let i = 0; i < count; i++) assertFinite(currents[i]!, `currentsMaCm2[${i}]`)
  if (covariance.length !== count || covariance.some((row) => row.length !== count))
    throw new DomainError('covariance', `covariance must have ${count} rows of ${count} values, one a junction.`)
  for (let i = 0; i < count; i++) {
    assertNotNegative(covariance[i]![i]!, `covariance[${i}][${i}]`)
    for (let j = 0; j < i; j++) {
      const upper = covariance[j]![i]!
      const lower = covariance[i]![j]!
      const bound = Math.sqrt(covariance[i]![i]! * covariance[j]![j]!)
      if (!(Math.abs(upper - lower) <= 1e-9 * bound))
        throw new DomainError('covariance', `covariance[${i}][${j}] = ${lower} differs from [${j}][${i}] = ${upper}.`)
      if (!(Math.abs(lower) <= bound * (1 + 1e-9)))
        throw new DomainError('covariance', `covariance[${i}][${j}] = ${lower} exceeds what the two variances allow.`)
    }
  }
}

function differenceVariance(a: number, b: number, covariance: readonly ArrayLike<number>[]): number {
  const sum = covariance[a]![a]! + covariance[b]![b]!
  const variance = sum - 2 * covariance[a]![b]!
  return variance <= RELATIVE_ZERO * sum ? 0 : variance
}

/** Junctions whose difference is exactly zero, always. */
function tiedGroups(currents: ArrayLike<number>, covariance: readonly ArrayLike<number>[]): number[][] {
  const groups: number[][] = []
  for (let i = 0; i < currents.length; i++) {
    const group = groups.find((g) => currents[g[0]!] === currents[i] && differenceVariance(g[0]!, i, covariance) === 0)
    if (group) group.push(i)
    else groups.push([i])
  }
  return groups
}

function probabilityOfLeast(
  junction: number,
  all: readonly number[],
  currents: ArrayLike<number>,
  covariance: readonly ArrayLike<number>[],
): number {
  const others = all.filter((other) => other !== junction)
  const means = others.map((other) => currents[other]! - currents[junction]!)
  const between = (a: number, b: number): number =>
    covariance[a]![b]! - covariance[a]![junction]! - covariance[junction]![b]! + covariance[junction]![junction]!
  const matrix = others.map((a) =>
    others.map((b) => (a === b ? differenceVariance(a, junction, covariance) : between(a, b))),
  )
  return probabilityAllPositive(means, matrix)
}

/** P(all x_i > 0) for x ~ N(means, covariance). Both arguments are used up. */
function probabilityAllPositive(means: number[], covariance: number[][]): number {
  const { order, factor } = pivotedCholesky(covariance)
  const z = new Array<number>(means.length).fill(0)
  const step = (level: number, tolerance: number): number => {
    if (level === means.length) return 1
    const row = factor[level]!
    let mean = means[order[level]!]!
    for (let k = 0; k < level; k++) mean += row[k]! * z[k]!
    const spread = row[level]!
    if (spread === 0) return mean > 0 ? step(level + 1, tolerance) : 0
    const lower = -mean / spread
    if (level === means.length - 1) return normalProbabilityBelow(-lower)
    const inner = (x: number): number => {
      z[level] = x
      return normalDensity(x) * step(level + 1, tolerance * 0.1)
    }
    const from = Math.max(lower, -FAR)
    // The bulk of the density is split off so that a wide interval cannot hide it from the first nodes.
    return [from, Math.max(from, -3), Math.max(from, 0), Math.max(from, 3), Math.max(from, FAR)].reduce(
      (sum, to, i, cuts) => (i === 0 ? 0 : sum + adaptiveIntegral(inner, cuts[i - 1]!, to, tolerance * 0.25)),
      0,
    )
  }
  return step(0, 1e-8)
}

/** Lower factor of the matrix with rows in the order of the largest remaining variance; zero rows stay zero. */
function pivotedCholesky(matrix: readonly (readonly number[])[]): { order: number[]; factor: number[][] } {
  const size = matrix.length
  const order = Array.from({ length: size }, (_, i) => i)
  const factor = order.map(() => new Array<number>(size).fill(0))
  const largest = Math.max(...matrix.map((row, i) => row[i]!), 0)
  for (let k = 0; k < size; k++) {
    const left = (row: number): number => {
      let rest = matrix[order[row]!]![order[row]!]!
      for (let j = 0; j < k; j++) rest -= factor[row]![j]! ** 2
      return rest
    }
    let best = k
    for (let row = k + 1; row < size; row++) if (left(row) > left(best)) best = row
    ;[order[k], order[best]] = [order[best]!, order[k]!]
    ;[factor[k], factor[best]] = [factor[best]!, factor[k]!]
    const rest = left(k)
    if (rest < -1e-9 * largest)
      throw new DomainError('covariance', 'covariance is not that of real quantities: it has a negative variance.')
    if (rest <= RELATIVE_ZERO * 100 * largest) break
    factor[k]![k] = Math.sqrt(rest)
    for (let row = k + 1; row < size; row++) {
      let value = matrix[order[row]!]![order[k]!]!
      for (let j = 0; j < k; j++) value -= factor[row]![j]! * factor[k]![j]!
      factor[row]![k] = value / factor[k]![k]!
    }
  }
  return { order, factor }
}
