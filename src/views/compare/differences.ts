import type { LineSeries } from '../../../shared/charts/lineChart.geometry.js'
import type { DeviceCurves } from '../../../shared/contract/matching.js'
import { makeCurve, valueAt } from '../../../shared/physics/curve.js'

type JunctionCurves = DeviceCurves['junctions']

/** EQE of each junction less that of the base device's junction at the same place, in percentage points, where both are known. */
export function differenceSeries(
  junctions: JunctionCurves,
  base: JunctionCurves,
  label: string,
  dash: string,
): LineSeries[] {
  return junctions.flatMap((junction) => {
    const other = base.find((one) => one.position === junction.position)
    if (!other) return []
    const reference = makeCurve(other.curve.wavelengthNm, other.curve.values)
    const x: number[] = []
    const y: number[] = []
    junction.curve.wavelengthNm.forEach((nm, i) => {
      const there = valueAt(reference, nm, NaN)
      if (!Number.isFinite(there)) return
      x.push(nm)
      y.push(100 * (junction.curve.values[i]! - there))
    })
    return [
      {
        id: `difference-${label}-${junction.position}`,
        label: `${junction.position} ${label}`,
        x,
        y,
        unit: 'points',
        digits: 2,
        paint: { kind: 'junction' as const, position: junction.position },
        dash,
        labelAt: 'none' as const,
      },
    ]
  })
}
