/** What a stack in series is judged by; junctions count from 1. */
export interface SeriesFigures {
  /** Junctions with the least current: one, or several that tie exactly. */
  readonly limitingJunctions: readonly number[]
  readonly limitingCurrentMaCm2: number
  /** (J_max − J_min)/J_min; Infinity where nothing flows. */
  readonly mismatch: number
  /** The common current of an even split, Σ J/n, mA cm⁻². */
  readonly matchedCurrentMaCm2: number
  /** Matched minus limiting current, mA cm⁻². */
  readonly gainStillOpenMaCm2: number
}

/** (J_max − J_min)/J_min of a stack; 0 for none but zero currents, Infinity where only the least is zero. */
export function mismatchOf(currents: ArrayLike<number>): number {
  let least = Infinity
  let most = -Infinity
  for (let i = 0; i < currents.length; i++) {
    least = Math.min(least, currents[i]!)
    most = Math.max(most, currents[i]!)
  }
  return most === least ? 0 : least > 0 ? (most - least) / least : Infinity
}

/** The least of some currents. */
export function leastOf(currents: ArrayLike<number>): number {
  let least = Infinity
  for (let i = 0; i < currents.length; i++) least = Math.min(least, currents[i]!)
  return least
}

/** Limiting junction, mismatch and gain still open. Cost O(junctions). */
export function seriesFigures(currents: ArrayLike<number>): SeriesFigures {
  const limitingCurrentMaCm2 = leastOf(currents)
  const limitingJunctions: number[] = []
  let sum = 0
  for (let i = 0; i < currents.length; i++) {
    sum += currents[i]!
    if (currents[i] === limitingCurrentMaCm2) limitingJunctions.push(i + 1)
  }
  const matchedCurrentMaCm2 = sum / currents.length
  return {
    limitingJunctions,
    limitingCurrentMaCm2,
    mismatch: mismatchOf(currents),
    matchedCurrentMaCm2,
    gainStillOpenMaCm2: matchedCurrentMaCm2 - limitingCurrentMaCm2,
  }
}
