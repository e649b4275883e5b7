import { rangeNm, valueAt, type Curve } from '../curve.js'
import { longWaveEdgeNm } from '../measurement/exclusiveBand.js'
import { pointNoise } from '../measurement/pointNoise.js'
import { nonNegativeLeastSquares } from '../numerics/nonNegativeLeastSquares.js'

export interface SecondOrderShare {
  /** s in EQE_app(λ) = s EQE(λ/2) + Σ w_j EQE_j(λ), fitted beyond the junction's own edge. */
  readonly share: number
  readonly uncertainty: number
  readonly bandNm: readonly [number, number]
}

const BEYOND_EDGE = 1.08
const LEAST_POINTS = 6

/**
 * Fits, by non-negative least squares beyond the own edge, how much of the response at λ follows the response at λ/2,
 * beside what leaks in from the other junctions. Points where a recorded order-sorting filter stops λ/2 are left out.
 * @returns null when fewer than six points are left.
 */
export function secondOrderShare(
  scan: Curve,
  others: readonly Curve[],
  filterChangesNm: readonly number[],
): SecondOrderShare | null {
  const from = BEYOND_EDGE * longWaveEdgeNm(scan)
  const [first] = rangeNm(scan)
  const points: number[] = []
  scan.wavelengthNm.forEach((nm, i) => {
    const isSorted = filterChangesNm.some((f) => f <= nm && f > nm / 2)
    if (nm >= from && nm / 2 >= first && !isSorted) points.push(i)
  })
  if (points.length < LEAST_POINTS) return null
  const columns = [(nm: number) => valueAt(scan, nm / 2), ...others.map((curve) => (nm: number) => valueAt(curve, nm))]
  const rows = points.map((i) => columns.map((column) => column(scan.wavelengthNm[i]!)))
  const measured = points.map((i) => scan.values[i]!)
  const { x, residual } = nonNegativeLeastSquares(rows, measured)
  const noise = Math.max(pointNoise(scan), residual / Math.sqrt(points.length))
  return {
    share: x[0]!,
    uncertainty: noise / Math.sqrt(independentPart(rows, x)),
    bandNm: [scan.wavelengthNm[points[0]!]!, scan.wavelengthNm[points.at(-1)!]!],
  }
}

/** Squared length of the first column less its part along the other columns that the fit uses. */
function independentPart(rows: readonly number[][], x: readonly number[]): number {
  const used = x.flatMap((value, j) => (j > 0 && value > 0 ? [j] : []))
  const first = rows.map((row) => row[0]!)
  const squared = (values: readonly number[]): number => values.reduce((sum, value) => sum + value * value, 0)
  if (used.length === 0) return Math.max(squared(first), 1e-12)
  const free = nonNegativeLeastSquares(
    rows.map((row) => used.flatMap((j) => [row[j]!, -row[j]!])),
    first,
  )
  return Math.max(free.residual ** 2, 1e-12)
}
