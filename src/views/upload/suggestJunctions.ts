import type { Device } from '../../../shared/contract/devices.js'
import type { CurveData } from '../../../shared/contract/primitives.js'

/**
 * Which junction each EQE curve most likely belongs to. A curve whose file or column names the junction goes there;
 * the rest are taken in the order of the light they use (shorter waves to the sunward side) for the junctions left.
 */
export interface NamedCurve {
  key: string
  /** File name and column label together. */
  name: string
  curve: CurveData
}

export function suggestJunctions(
  curves: readonly NamedCurve[],
  device: Device,
  /** Junctions that other curves of this upload were given already. */
  taken: ReadonlySet<string> = new Set(),
): Map<string, string> {
  const suggestion = new Map<string, string>()
  const free = new Set(device.junctions.map((junction) => junction.id).filter((id) => !taken.has(id)))
  for (const curve of curves) {
    const named = device.junctions.filter((junction) => namesJunction(curve.name, junction.label, junction.position))
    if (named.length !== 1) continue
    suggestion.set(curve.key, named[0]!.id)
    free.delete(named[0]!.id)
  }
  const rest = curves.filter((curve) => !suggestion.has(curve.key))
  const junctions = device.junctions.filter((junction) => free.has(junction.id))
  if (rest.length === 1 && junctions.length > 1) {
    const only = closestByGap(rest[0]!.curve, junctions)
    if (only) suggestion.set(rest[0]!.key, only)
    return suggestion
  }
  const ordered = [...rest].sort((a, b) => meanWavelengthNm(a.curve) - meanWavelengthNm(b.curve))
  ordered.forEach((curve, i) => {
    const junction = junctions[i]
    if (junction) suggestion.set(curve.key, junction.id)
  })
  return suggestion
}

function namesJunction(name: string, label: string, position: number): boolean {
  const words = name.toLowerCase().split(/[^\p{L}\p{N}]+/u)
  const wanted = label
    .toLowerCase()
    .split(/[^\p{L}\p{N}]+/u)
    .filter((word) => word.length > 1 && word !== 'cell')
  return wanted.some((word) => words.includes(word)) || words.includes(`j${position}`)
}

/** With a single curve: the junction whose nominal gap is nearest to where the curve falls to half of its maximum. */
function closestByGap(curve: CurveData, junctions: Device['junctions']): string | null {
  const maximum = Math.max(...curve.values)
  const last = curve.values.findLastIndex((value) => value >= maximum / 2)
  const edgeEv = 1239.842 / curve.wavelengthNm[Math.max(last, 0)]!
  const withGap = junctions.filter((junction) => junction.nominalGapEv !== null)
  if (withGap.length !== junctions.length) return null
  return withGap.reduce((best, junction) =>
    Math.abs(junction.nominalGapEv! - edgeEv) < Math.abs(best.nominalGapEv! - edgeEv) ? junction : best,
  ).id
}

function meanWavelengthNm(curve: CurveData): number {
  let weight = 0
  let sum = 0
  for (let i = 1; i < curve.values.length; i++) {
    const width = curve.wavelengthNm[i]! - curve.wavelengthNm[i - 1]!
    const mean = Math.max(0, (curve.values[i]! + curve.values[i - 1]!) / 2)
    weight += mean * width
    sum += (mean * width * (curve.wavelengthNm[i]! + curve.wavelengthNm[i - 1]!)) / 2
  }
  return weight > 0 ? sum / weight : Infinity
}
