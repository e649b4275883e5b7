import type { Curve } from '../curve.js'
import { shortCircuitCurrentDensity } from '../currents.js'
import { assertPositive, DomainError } from '../errors.js'
import type { Spectrum } from '../spectrum.js'

/** A scan of a series of one junction, with what was varied: bias irradiance (W m⁻²) or bias voltage (V). */
export interface BiasSeriesScan {
  readonly scan: Curve
  readonly level: number
}

export interface BiasSeriesStep {
  /** Place in the input. */
  readonly index: number
  readonly level: number
  readonly currentMaCm2: number
  /** Relative change of J_sc from the level below; null at the lowest. */
  readonly changeFromBelow: number | null
  readonly isOnPlateau: boolean
}

export interface BiasSeries {
  /** Ordered by level. */
  readonly steps: BiasSeriesStep[]
  /** Levels at both ends of the plateau; null when J_sc moves at every step. */
  readonly plateau: { readonly fromLevel: number; readonly toLevel: number; readonly currentMaCm2: number } | null
  /** Place in the input of the scan to use: the one in the middle of the plateau. Null without a plateau. */
  readonly proposedIndex: number | null
}

/**
 * J_sc of a junction against bias intensity or voltage, the plateau, and the scan to use. The plateau is the longest run
 * of neighbouring levels between which J_sc changes by no more than `largestChange`; of two as long, the flatter.
 * The proposed scan is the lower middle one: inside the plateau, and with the least light (least heat and coupling).
 * @param largestChange relative change a step, default 0.005.
 * @throws DomainError for fewer than two scans, two scans at one level, or a scan without current.
 * Cost: one integral a scan.
 */
export function analyseBiasSeries(
  scans: readonly BiasSeriesScan[],
  spectrum: Spectrum,
  largestChange = 0.005,
): BiasSeries {
  assertPositive(largestChange, 'largestChange')
  if (scans.length < 2)
    throw new DomainError('scans', `A bias series needs two scans or more; there are ${scans.length}.`)
  const ordered = scans
    .map(({ scan, level }, index) => ({ index, level, current: shortCircuitCurrentDensity(scan, spectrum) }))
    .sort((a, b) => a.level - b.level)
  ordered.forEach((step, i) => {
    if (!Number.isFinite(step.level))
      throw new DomainError(`scans[${step.index}].level`, `scans[${step.index}] has no level; a number is needed.`)
    if (!(step.current > 0))
      throw new DomainError(`scans[${step.index}].scan`, `scans[${step.index}] gives no current above zero.`)
    if (i > 0 && step.level === ordered[i - 1]!.level)
      throw new DomainError(
        `scans[${step.index}].level`,
        `scans[${ordered[i - 1]!.index}] and scans[${step.index}] are both at ${step.level}; each level is taken once.`,
      )
  })
  const changes = ordered.map((step, i) => (i === 0 ? null : step.current / ordered[i - 1]!.current - 1))
  const run = longestFlatRun(changes, largestChange)
  const steps = ordered.map((step, i) => ({
    index: step.index,
    level: step.level,
    currentMaCm2: step.current,
    changeFromBelow: changes[i]!,
    isOnPlateau: run !== null && i >= run.from && i <= run.to,
  }))
  if (!run) return { steps, plateau: null, proposedIndex: null }
  const members = steps.slice(run.from, run.to + 1)
  return {
    steps,
    plateau: {
      fromLevel: members[0]!.level,
      toLevel: members.at(-1)!.level,
      currentMaCm2: members.reduce((sum, m) => sum + m.currentMaCm2, 0) / members.length,
    },
    proposedIndex: members[(members.length - 1) >> 1]!.index,
  }
}

function longestFlatRun(
  changes: readonly (number | null)[],
  largestChange: number,
): { readonly from: number; readonly to: number } | null {
  let best: { from: number; to: number; roughness: number } | null = null
  for (let from = 0; from < changes.length; from++) {
    let roughness = 0
    for (let to = from + 1; to < changes.length && Math.abs(changes[to]!) <= largestChange; to++) {
      roughness = Math.max(roughness, Math.abs(changes[to]!))
      const isBetter =
        !best || to - from > best.to - best.from || (to - from === best.to - best.from && roughness < best.roughness)
      if (isBetter) best = { from, to, roughness }
    }
  }
  return best
}
