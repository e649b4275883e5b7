import { DomainError } from '../errors.js'
import type { ComponentKind } from './budget.js'
import { rootSumOfSquares, shiftedCurrent } from './errorSources.js'
import type { DeviceErrors, ErrorSource, OmittedComponent } from './errorSources.js'
import { limitingProbabilities, limitingVerdict } from './limitingProbability.js'
import type { LimitingVerdict } from './limitingProbability.js'
import { correlationOf, welchSatterthwaite } from './linearPropagation.js'
import { coverageFactor } from './normalDistribution.js'

/** Coverage factor of every expanded uncertainty U shown (about 95 %). */
export const EXPANSION_K = 2

/** A current with its uncertainty. */
export interface CurrentUncertainty {
  readonly currentMaCm2: number
  /** u, k = 1. */
  readonly uncertaintyMaCm2: number
  /** U = 2 u. */
  readonly expandedMaCm2: number
  /** Welch–Satterthwaite; Infinity when no component states a finite number. */
  readonly effectiveDegreesOfFreedom: number
  /** The factor that covers 95 % at those degrees of freedom; 1.96 for infinitely many. */
  readonly coverageFactor95: number
}

/** `(J_higher − J_lower)/J_lower` of two junctions, in percent, with its uncertainty. */
export interface MismatchUncertainty {
  /** Junction with the higher estimate, 1 = sunward; of two equal ones the sunward one. */
  readonly higher: number
  readonly lower: number
  readonly mismatchPercent: number
  readonly uncertaintyPercent: number
  readonly expandedPercent: number
  /**
   * False when the difference is below 2 u: which of the two is higher is then not known, and an interval from
   * mismatchPercent ± U would reach below zero; the Monte Carlo interval says what holds.
   */
  readonly orderCertain: boolean
}

/** What one component of the budget adds, over all the errors that it stands for. */
export interface ComponentContribution {
  readonly componentId: string
  readonly kind: ComponentKind
  /** Standard uncertainty of each current from this component alone. */
  readonly uncertaintyMaCm2: readonly number[]
  /** Its share of each current's variance, 0…1. */
  readonly shares: readonly number[]
  /** The same for the mismatch of the stack; 0 for a single junction. */
  readonly mismatchUncertaintyPercent: number
  readonly mismatchShare: number
}

/** Everything the law of propagation says of a device. */
export interface DeviceUncertainty {
  readonly currents: readonly CurrentUncertainty[]
  /** (mA cm⁻²)². */
  readonly covariance: readonly (readonly number[])[]
  readonly correlation: readonly (readonly number[])[]
  /** Highest against lowest junction; null for a single junction. */
  readonly mismatch: MismatchUncertainty | null
  /** Every pair, in the order 1-2, 1-3, 2-3, … */
  readonly pairs: readonly MismatchUncertainty[]
  readonly components: readonly ComponentContribution[]
  readonly limitingProbability: readonly number[]
  readonly verdict: LimitingVerdict
  readonly omitted: readonly OmittedComponent[]
}

/**
 * Law of propagation (JCGM 100:2008, 5.1 and 5.2) for the currents of a device: `C_ij = Σ_s c_si c_sj` over the independent
 * errors s, where c_si is what one standard deviation of s does to J_i. A relative error gives `u J_i`; point noise
 * `√Σ(w_k u_k)²`; a wavelength offset `½(J(+u) − J(−u))`, the curve really moved (5.1.3, note 2). The mismatch
 * `m = J_a/J_b − 1` takes `∂m/∂J_a = 1/J_b`, `∂m/∂J_b = −J_a/J_b²`, a and b being the highest and the lowest estimate; of
 * several equally mismatched pairs the one with the largest uncertainty is taken.
 *
 * Limiting probabilities are those of jointly normal currents.
 *
 * @throws DomainError from `limitingProbabilities` only. Cost O(sources · junctions² + shifts · (points + spectrum)).
 */
export function propagateDevice(errors: DeviceErrors): DeviceUncertainty {
  const effects = errors.sources.map((source) => standardEffects(errors, source))
  const count = errors.currentsMaCm2.length
  const covariance = Array.from({ length: count }, (_, i) =>
    Array.from({ length: count }, (_, j) => effects.reduce((sum, effect) => sum + effect[i]! * effect[j]!, 0)),
  )
  const pairs = pairMismatches(errors.currentsMaCm2, effects)
  const mismatch = widestPair(pairs)
  const limitingProbability = limitingProbabilities(errors.currentsMaCm2, covariance)
  return {
    currents: errors.currentsMaCm2.map((currentMaCm2, i) =>
      currentUncertainty(
        currentMaCm2,
        effects.map((effect) => effect[i]!),
        errors.sources,
      ),
    ),
    covariance,
    correlation: correlationOf(covariance),
    mismatch,
    pairs,
    components: componentContributions(errors, effects, mismatch),
    limitingProbability,
    verdict: limitingVerdict(limitingProbability),
    omitted: errors.omitted,
  }
}

/**
 * The pair whose mismatch stands for the stack: highest against lowest estimate; of equal ones the one whose mismatch
 * is least certain. Null for a single junction.
 */
export function widestPair(pairs: readonly MismatchUncertainty[]): MismatchUncertainty | null {
  return pairs.reduce<MismatchUncertainty | null>((best, pair) => {
    if (best === null || pair.mismatchPercent > best.mismatchPercent) return pair
    return pair.mismatchPercent === best.mismatchPercent && pair.uncertaintyPercent > best.uncertaintyPercent
      ? pair
      : best
  }, null)
}

/** Mismatch of every pair of junctions from the effects of the independent errors (one row an error). */
export function pairMismatches(
  currentsMaCm2: readonly number[],
  effects: readonly (readonly number[])[],
): MismatchUncertainty[] {
  if (currentsMaCm2.some((current) => !(current > 0)))
    throw new DomainError('currentsMaCm2', 'currentsMaCm2 must all be above zero to be compared as a ratio.')
  const pairs: MismatchUncertainty[] = []
  for (let i = 0; i < currentsMaCm2.length; i++)
    for (let j = i + 1; j < currentsMaCm2.length; j++) {
      const [higher, lower] = currentsMaCm2[j]! > currentsMaCm2[i]! ? [j, i] : [i, j]
      const mismatchPercent = (100 * (currentsMaCm2[higher]! - currentsMaCm2[lower]!)) / currentsMaCm2[lower]!
      const uncertaintyPercent = rootSumOfSquares(
        effects.map((effect) => mismatchEffect(currentsMaCm2, effect, higher, lower)),
      )
      pairs.push({
        higher: higher + 1,
        lower: lower + 1,
        mismatchPercent,
        uncertaintyPercent,
        expandedPercent: EXPANSION_K * uncertaintyPercent,
        orderCertain: mismatchPercent > EXPANSION_K * uncertaintyPercent,
      })
    }
  return pairs
}

/** What one standard deviation of an error does to each current, mA cm⁻², signed. */
export function standardEffects(errors: DeviceErrors, source: ErrorSource): number[] {
  return source.effects.map((effect, i) => {
    if (effect === null) return 0
    switch (effect.type) {
      case 'scale':
        return effect.relative * errors.currentsMaCm2[i]!
      case 'shape':
        return effect.currentMaCm2
      case 'points':
        return rootSumOfSquares(effect.pointsMaCm2)
      case 'shift':
        return 0.5 * (shiftedCurrent(errors, i, effect.nm) - shiftedCurrent(errors, i, -effect.nm))
    }
  })
}

function mismatchEffect(currents: readonly number[], effect: readonly number[], higher: number, lower: number): number {
  const ratio = currents[higher]! / currents[lower]!
  return (100 * (effect[higher]! - ratio * effect[lower]!)) / currents[lower]!
}

function currentUncertainty(
  currentMaCm2: number,
  contributions: readonly number[],
  sources: readonly ErrorSource[],
): CurrentUncertainty {
  const uncertaintyMaCm2 = rootSumOfSquares(contributions)
  const effectiveDegreesOfFreedom = welchSatterthwaite(
    contributions,
    sources.map((source) => source.degreesOfFreedom),
  )
  return {
    currentMaCm2,
    uncertaintyMaCm2,
    expandedMaCm2: EXPANSION_K * uncertaintyMaCm2,
    effectiveDegreesOfFreedom,
    coverageFactor95: coverageFactor(0.95, effectiveDegreesOfFreedom),
  }
}

function componentContributions(
  errors: DeviceErrors,
  effects: readonly (readonly number[])[],
  mismatch: MismatchUncertainty | null,
): ComponentContribution[] {
  const totals = errors.currentsMaCm2.map((_, i) => rootSumOfSquares(effects.map((effect) => effect[i]!)))
  const share = (part: number, total: number): number => (total > 0 ? (part / total) ** 2 : 0)
  const ids = [...new Set(errors.sources.map((source) => source.componentId))]
  return ids.map((componentId) => {
    const own = effects.filter((_, s) => errors.sources[s]!.componentId === componentId)
    const uncertaintyMaCm2 = totals.map((_, i) => rootSumOfSquares(own.map((effect) => effect[i]!)))
    const mismatchUncertaintyPercent = mismatch
      ? rootSumOfSquares(
          own.map((effect) => mismatchEffect(errors.currentsMaCm2, effect, mismatch.higher - 1, mismatch.lower - 1)),
        )
      : 0
    return {
      componentId,
      kind: errors.sources.find((source) => source.componentId === componentId)!.kind,
      uncertaintyMaCm2,
      shares: uncertaintyMaCm2.map((u, i) => share(u, totals[i]!)),
      mismatchUncertaintyPercent,
      mismatchShare: mismatch ? share(mismatchUncertaintyPercent, mismatch.uncertaintyPercent) : 0,
    }
  })
}
