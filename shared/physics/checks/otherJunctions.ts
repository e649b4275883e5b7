import type { Curve } from '../curve.js'
import type { ScanInContext } from './check.js'
import { junctionNames } from './wording.js'

export interface OtherJunction {
  readonly index: number
  readonly scan: Curve
}

/** The scans of all junctions but the one under test, or the sentence that says which are missing. */
export function otherJunctions(context: ScanInContext): readonly OtherJunction[] | { readonly missing: string } {
  const missing = indicesOfOthers(context).filter((i) => !context.junctions[i]!.scan)
  if (missing.length > 0) return { missing: `no scan of ${junctionNames(missing)}` }
  return indicesOfOthers(context).map((index) => ({ index, scan: context.junctions[index]!.scan! }))
}

/** EQE of all junctions in order, the scan under test at its own place; only once `otherJunctions` found them all. */
export function allScans(context: ScanInContext, others: readonly OtherJunction[]): Curve[] {
  const scans = others.map((other) => other.scan)
  scans.splice(context.junctionIndex, 0, context.scan)
  return scans
}

export function isMissing(
  found: readonly OtherJunction[] | { readonly missing: string },
): found is { readonly missing: string } {
  return 'missing' in found
}

function indicesOfOthers(context: ScanInContext): number[] {
  return context.junctions.flatMap((_, i) => (i === context.junctionIndex ? [] : [i]))
}
