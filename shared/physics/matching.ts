import { assertFinite, DomainError } from './errors.js'

/** How junctions are wired: in series they share one current; independent ones (four terminals) do not. */
export type Wiring = 'series' | 'independent'

export interface JunctionExcess {
  /** Above the limiting junction, mA/cm². */
  readonly excessMaCm2: number
  /** The same in % of the limiting current. */
  readonly excessPercent: number
}

export interface PairMismatch {
  /** Junction with the larger current, 1 = sunward. On a tie the sunward one. */
  readonly higher: number
  readonly lower: number
  readonly differenceMaCm2: number
  /** Difference in % of the smaller current. */
  readonly mismatchPercent: number
}

export interface SeriesMatching {
  readonly wiring: 'series'
  /** Junction with the smallest current, 1 = sunward; null on an exact tie, which is no junction's fault. */
  readonly limitingJunction: number | null
  /** Every junction with the smallest current. */
  readonly limitingJunctions: number[]
  readonly jLimMaCm2: number
  readonly junctions: JunctionExcess[]
  /** `(J_max − J_min)/J_min`, %. */
  readonly mismatchPercent: number
  readonly pairs: PairMismatch[]
  /** Common current if the same total could be split evenly, `Σ J_i / n`, mA/cm². */
  readonly jMatchedMaCm2: number
  /** `J_matched − J_lim`, mA/cm². */
  readonly gainOpenMaCm2: number
}

export interface IndependentCurrents {
  readonly wiring: 'independent'
  readonly reason: string
}

/**
 * Matching of a stack from its junctions' current densities. In series the smallest current limits; the real stack's
 * current differs from it where the limiting junction leaks (see the series J–V).
 *
 * @param currentsMaCm2 mA/cm², from the sunward side, above zero, at least two for a series stack.
 * @throws DomainError for fewer than two junctions, or a current that is not above zero.
 */
export function matching(currentsMaCm2: readonly number[], wiring: 'series'): SeriesMatching
export function matching(currentsMaCm2: readonly number[], wiring: Wiring): SeriesMatching | IndependentCurrents
export function matching(currentsMaCm2: readonly number[], wiring: Wiring): SeriesMatching | IndependentCurrents {
  currentsMaCm2.forEach((current, i) => {
    assertFinite(current, `currentsMaCm2[${i}]`)
    if (!(current > 0))
      throw new DomainError(
        'currentsMaCm2',
        `The current of junction ${i + 1} is ${current} mA/cm²; matching needs currents above zero.`,
      )
  })
  if (wiring === 'independent')
    return {
      wiring,
      reason: 'Each junction has terminals of its own and carries its own current: no matching applies.',
    }
  if (currentsMaCm2.length < 2)
    throw new DomainError('currentsMaCm2', `A series stack has at least two junctions, not ${currentsMaCm2.length}.`)
  const lowest = Math.min(...currentsMaCm2)
  const highest = Math.max(...currentsMaCm2)
  const limitingJunctions = currentsMaCm2.flatMap((current, i) => (current === lowest ? [i + 1] : []))
  const jMatchedMaCm2 = currentsMaCm2.reduce((sum, current) => sum + current, 0) / currentsMaCm2.length
  return {
    wiring,
    limitingJunction: limitingJunctions.length === 1 ? limitingJunctions[0]! : null,
    limitingJunctions,
    jLimMaCm2: lowest,
    junctions: currentsMaCm2.map((current) => ({
      excessMaCm2: current - lowest,
      excessPercent: (100 * (current - lowest)) / lowest,
    })),
    mismatchPercent: (100 * (highest - lowest)) / lowest,
    pairs: pairsOf(currentsMaCm2),
    jMatchedMaCm2,
    gainOpenMaCm2: Math.max(0, jMatchedMaCm2 - lowest),
  }
}

function pairsOf(currents: readonly number[]): PairMismatch[] {
  return currents.flatMap((a, i) =>
    currents.slice(i + 1).map((b, k) => {
      const j = i + 1 + k
      const [higher, lower] = a >= b ? [i, j] : [j, i]
      const differenceMaCm2 = currents[higher]! - currents[lower]!
      return {
        higher: higher + 1,
        lower: lower + 1,
        differenceMaCm2,
        mismatchPercent: (100 * differenceMaCm2) / currents[lower]!,
      }
    }),
  )
}
