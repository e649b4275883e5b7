import { assertFinite, assertNotNegative, DomainError } from '../errors.js'

/** One input of a linear propagation. */
export interface PropagationInput {
  /** ∂f/∂x at the estimates, unit of the result per unit of the input. */
  readonly sensitivity: number
  /** Standard uncertainty ≥ 0, unit of the input. */
  readonly uncertainty: number
  /** Above zero; left out: Infinity. */
  readonly degreesOfFreedom?: number
}

/** Result of the law of propagation. */
export interface PropagationResult {
  /** Combined standard uncertainty, unit of the result. */
  readonly uncertainty: number
  /** |c_i| u_i of each input, in its order. */
  readonly contributions: readonly number[]
  /**
   * Share of each input in the variance; they add up to 1 (correlation terms are split evenly between the two inputs,
   * so that a share can be negative); all 0 when the variance is 0.
   */
  readonly shares: readonly number[]
  /** Inputs that are uncertain but have no influence to first order, because their sensitivity is zero here. */
  readonly insensitive: readonly number[]
  /** Welch–Satterthwaite, not rounded; Infinity when no input has a finite number. Null with correlated inputs. */
  readonly effectiveDegreesOfFreedom: number | null
}

/**
 * Law of propagation of uncertainty: `u² = Σ_i Σ_j c_i c_j r_ij u_i u_j` (JCGM 100:2008, equation 16), and the effective
 * degrees of freedom `ν = u⁴/Σ((c_i u_i)⁴/ν_i)` for independent inputs (G.2b).
 *
 * @param inputs at least one. @param correlation n × n with ones on the diagonal; left out: independent inputs.
 * @throws DomainError when an input is out of domain, the matrix has another shape, is not symmetric, leaves −1…1, or
 * gives a negative variance. Cost O(n²).
 */
export function propagateLinear(
  inputs: readonly PropagationInput[],
  correlation?: readonly ArrayLike<number>[],
): PropagationResult {
  if (inputs.length === 0) throw new DomainError('inputs', 'inputs is empty; propagation needs at least one input.')
  inputs.forEach(({ sensitivity, uncertainty, degreesOfFreedom }, i) => {
    assertFinite(sensitivity, `inputs[${i}].sensitivity`)
    assertNotNegative(uncertainty, `inputs[${i}].uncertainty`)
    if (degreesOfFreedom !== undefined && !(degreesOfFreedom > 0))
      throw new DomainError(
        `inputs[${i}].degreesOfFreedom`,
        `inputs[${i}].degreesOfFreedom is ${degreesOfFreedom}; it must be above zero.`,
      )
  })
  if (correlation) assertCorrelation(correlation, inputs.length)
  const signed = inputs.map(({ sensitivity, uncertainty }) => sensitivity * uncertainty)
  const rows = signed.map((a, i) =>
    correlation ? signed.reduce((sum, b, j) => sum + a * b * correlation[i]![j]!, 0) : a * a,
  )
  const scale = signed.reduce((sum, a) => sum + a * a, 0)
  const variance = rows.reduce((sum, row) => sum + row, 0)
  if (variance < -1e-9 * scale)
    throw new DomainError('correlation', 'correlation gives a negative variance; no set of real quantities has it.')
  const uncertainty = Math.sqrt(Math.max(0, variance))
  const correlated = correlation?.some((row, i) => signed.some((_, j) => i !== j && row[j] !== 0)) ?? false
  return {
    uncertainty,
    contributions: signed.map(Math.abs),
    shares: rows.map((row) => (variance > 0 ? row / variance : 0)),
    insensitive: inputs.flatMap((input, i) => (input.sensitivity === 0 && input.uncertainty > 0 ? [i] : [])),
    effectiveDegreesOfFreedom: correlated
      ? null
      : welchSatterthwaite(
          signed,
          inputs.map((input) => input.degreesOfFreedom ?? Infinity),
        ),
  }
}

/**
 * Effective degrees of freedom of a sum of independent contributions (JCGM 100:2008, G.2b); not rounded. Infinity when
 * every ν is infinite or nothing contributes. @throws DomainError when the lengths differ.
 */
export function welchSatterthwaite(contributions: readonly number[], degreesOfFreedom: readonly number[]): number {
  if (contributions.length !== degreesOfFreedom.length)
    throw new DomainError('degreesOfFreedom', 'degreesOfFreedom must have one value for each contribution.')
  const variance = contributions.reduce((sum, c) => sum + c * c, 0)
  const spread = contributions.reduce((sum, c, i) => sum + c ** 4 / degreesOfFreedom[i]!, 0)
  return spread > 0 ? variance ** 2 / spread : Infinity
}

/**
 * Covariance of several results of the same inputs: `C = A V Aᵀ` with `A[m][i] = ∂f_m/∂x_i` (JCGM 102:2011, 6.2.1.3).
 *
 * @param jacobian one row a result. @param inputCovariance n × n. @throws DomainError when shapes do not fit.
 */
export function propagateCovariance(
  jacobian: readonly ArrayLike<number>[],
  inputCovariance: readonly ArrayLike<number>[],
): number[][] {
  const count = inputCovariance.length
  if (inputCovariance.some((row) => row.length !== count))
    throw new DomainError('inputCovariance', `inputCovariance must be square; it has ${count} rows.`)
  if (jacobian.some((row) => row.length !== count))
    throw new DomainError('jacobian', `jacobian must have ${count} columns, one for each input.`)
  const half = jacobian.map((row) =>
    inputCovariance.map((_, j) => inputCovariance.reduce((sum, v, i) => sum + row[i]! * v[j]!, 0)),
  )
  return half.map((left) => jacobian.map((right) => left.reduce((sum, value, j) => sum + value * right[j]!, 0)))
}

/** Correlation matrix of a covariance; a quantity without variance is correlated with itself only. */
export function correlationOf(covariance: readonly ArrayLike<number>[]): number[][] {
  return covariance.map((row, i) =>
    covariance.map((_, j) => {
      const scale = Math.sqrt(row[i]! * covariance[j]![j]!)
      return i === j ? 1 : scale > 0 ? Math.max(-1, Math.min(1, row[j]! / scale)) : 0
    }),
  )
}

/**
 * Second-order addition to the variance, `½ Σ_i Σ_j (∂²f/∂x_i∂x_j)² u_i² u_j²` (note of JCGM 100:2008, 5.1.2, without the
 * terms of third derivatives). It matters where first-order sensitivities vanish.
 *
 * @param hessian n × n second derivatives. @param uncertainties n standard uncertainties of independent normal inputs.
 */
export function secondOrderVariance(hessian: readonly ArrayLike<number>[], uncertainties: readonly number[]): number {
  let sum = 0
  uncertainties.forEach((a, i) =>
    uncertainties.forEach((b, j) => {
      sum += 0.5 * (hessian[i]![j]! * a * b) ** 2
    }),
  )
  return sum
}

function assertCorrelation(correlation: readonly ArrayLike<number>[], count: number): void {
  if (correlation.length !== count || correlation.some((row) => row.length !== count))
    throw new DomainError('correlation', `correlation must have ${count} rows of ${count} values, one an input.`)
  for (let i = 0; i < count; i++)
    for (let j = 0; j <= i; j++) {
      const r = correlation[i]![j]!
      if (i === j ? r !== 1 : !(Math.abs(r) <= 1) || r !== correlation[j]![i])
        throw new DomainError(
          'correlation',
          `correlation[${i}][${j}] is ${r}; the matrix needs ones on its diagonal and equal values between −1 and 1 beside it.`,
        )
    }
}
