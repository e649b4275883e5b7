import type { Curve } from '../curve.js'
import { currentWeights } from '../uncertainty/currentWeights.js'

/**
 * Wavelengths on which one junction's EQE is kept: its scan, or what lies beyond the scan's long end, where nothing was
 * measured and only a lowered gap adds something.
 */
export interface Segment {
  readonly junction: number
  readonly isBeyond: boolean
  readonly wavelengthNm: Float64Array
  /** Measured EQE; zero beyond the scan. */
  readonly eqe: Float64Array
  /** `J = Σ w EQE`, mA cm⁻², exact for piecewise-linear EQE and E·λ. */
  readonly weights: Float64Array
}

/** What the optical model says of the measured device on a segment, and what follows for the anchoring. */
export interface SegmentBase {
  readonly absorptance: Float64Array
  /** C = EQE/A, continued from the nearest well-defined value where A is too small; not below zero. */
  readonly collection: Float64Array
  /** SMALL where A is too small to divide by, OVERFULL where EQE is above A, so that the model absorbs too little. */
  readonly isWeak: Uint8Array
}

export const SMALL = 1
export const OVERFULL = 2

const BEYOND_NM = 300
const BEYOND_STEP_NM = 5

/**
 * The segments of a device: one scan a junction, then what lies beyond each as far as the spectrum goes.
 * @param reachNm how far the materials are known for each junction, nm.
 */
export function makeSegments(eqe: readonly Curve[], spectrum: Curve, reachNm: readonly number[]): Segment[] {
  const scans = eqe.map((curve, junction) => ({
    junction,
    isBeyond: false,
    wavelengthNm: curve.wavelengthNm,
    eqe: curve.values,
    weights: currentWeights(curve.wavelengthNm, spectrum),
  }))
  const sunEnd = spectrum.wavelengthNm[spectrum.wavelengthNm.length - 1]!
  const beyond = eqe.flatMap((curve, junction) => {
    const from = curve.wavelengthNm[curve.wavelengthNm.length - 1]!
    const steps = Math.floor((Math.min(from + BEYOND_NM, sunEnd, reachNm[junction]!) - from) / BEYOND_STEP_NM)
    if (steps < 1) return []
    const wavelengthNm = Float64Array.from({ length: steps + 1 }, (_, i) => from + i * BEYOND_STEP_NM)
    const weights = currentWeights(wavelengthNm, spectrum)
    return [{ junction, isBeyond: true, wavelengthNm, eqe: new Float64Array(steps + 1), weights }]
  })
  return [...scans, ...beyond]
}

/**
 * Collection efficiency of a scan. A point is well defined when the junction absorbs at least `leastOwnShare` of the light
 * that reaches it and `leastAbsorptance` of all, and the EQE is not above the absorptance. Others take the last such value on the short-wave side, or the first one
 * on the long-wave side where there is none before.
 */
export function anchorScan(
  segment: Segment,
  absorptance: Float64Array,
  ownShare: Float64Array,
  leastOwnShare: number,
  leastAbsorptance: number,
): SegmentBase {
  const points = absorptance.length
  const collection = new Float64Array(points)
  const isWeak = new Uint8Array(points)
  let first = -1
  let last = -1
  for (let i = 0; i < points; i++) {
    const isSmall = !(ownShare[i]! >= leastOwnShare && absorptance[i]! >= leastAbsorptance)
    if (!isSmall && segment.eqe[i]! <= absorptance[i]!) {
      collection[i] = Math.max(0, segment.eqe[i]! / absorptance[i]!)
      if (first < 0) first = i
      last = i
    } else {
      isWeak[i] = isSmall ? SMALL : OVERFULL
      if (last >= 0) collection[i] = collection[last]!
    }
  }
  if (first > 0) collection.fill(collection[first]!, 0, first)
  return { absorptance, collection, isWeak }
}

/** What lies beyond a scan carries on with the scan's last collection efficiency. */
export function anchorBeyond(absorptance: Float64Array, scan: SegmentBase): SegmentBase {
  const last = scan.collection[scan.collection.length - 1]!
  return {
    absorptance,
    collection: new Float64Array(absorptance.length).fill(last),
    isWeak: new Uint8Array(absorptance.length).fill(SMALL),
  }
}

/**
 * EQE' of one segment: `EQE A'/A`, or, where A is too small to divide by and A' is larger, `EQE + C (A' − A)`, which joins
 * without a step and is EQE itself for A' = A. Where the EQE is above A and the junction itself gains, it is the larger of
 * `EQE t` and `C A'`, t the change of what arrives.
 * @param ratio A'/A. @param absorptance A'. @param through t. @param eqe and @param continued are filled: EQE' and the part of it that was
 * continued.
 */
export function anchor(
  segment: Segment,
  base: SegmentBase,
  ratio: Float64Array,
  absorptance: Float64Array,
  through: Float64Array,
  eqe: Float64Array,
  continued: Float64Array,
): void {
  for (let i = 0; i < eqe.length; i++) {
    const arriving = base.isWeak[i] === OVERFULL ? through[i]! : 1
    const gained = base.isWeak[i] ? absorptance[i]! - base.absorptance[i]! * arriving : 0
    if (gained > 0) {
      const part =
        base.isWeak[i] === OVERFULL
          ? Math.max(0, base.collection[i]! * absorptance[i]! - segment.eqe[i]! * arriving)
          : base.collection[i]! * gained
      continued[i] = part
      eqe[i] = segment.eqe[i]! * arriving + part
    } else {
      continued[i] = 0
      eqe[i] = segment.eqe[i]! * ratio[i]!
    }
  }
}
