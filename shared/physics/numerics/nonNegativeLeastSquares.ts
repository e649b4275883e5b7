import { DomainError } from '../errors.js'
import { solveLinear } from './linearSolve.js'

export interface NonNegativeSolution {
  readonly x: number[]
  /** Euclidean length of A x − b, in the unit of b. */
  readonly residual: number
  /** Columns whose x is above zero. */
  readonly active: number[]
}

/**
 * The x ≥ 0 that makes |A x − b| least: the active-set method of Lawson and Hanson on the normal equations of the
 * columns scaled to unit length.
 * Source: C. L. Lawson, R. J. Hanson, Solving Least Squares Problems (1974), chapter 23.
 * @param matrix m rows of n numbers. @param right m numbers.
 * @throws DomainError when the matrix has no row or no column, shapes differ or a number is not finite.
 * Cost: m n² once, then about n solves of at most n unknowns. For the few columns of this trade.
 */
export function nonNegativeLeastSquares(
  matrix: readonly (readonly number[])[],
  right: readonly number[],
): NonNegativeSolution {
  const m = matrix.length
  const n = matrix[0]?.length ?? 0
  if (m === 0 || n === 0) throw new DomainError('matrix', 'matrix is empty; it needs at least one row and one column.')
  if (right.length !== m) throw new DomainError('right', `right has ${right.length} numbers; the matrix has ${m} rows.`)
  matrix.forEach((row, i) => {
    if (row.length !== n) throw new DomainError('matrix', `matrix row ${i} has ${row.length} numbers, the first ${n}.`)
    if (!row.every(Number.isFinite) || !Number.isFinite(right[i]!))
      throw new DomainError('matrix', `Row ${i} has a number that is not finite.`)
  })
  const length = Array.from({ length: n }, (_, j) => Math.sqrt(matrix.reduce((sum, row) => sum + row[j]! ** 2, 0)) || 1)
  const scaled = matrix.map((row) => row.map((value, j) => value / length[j]!))
  const gram = Array.from({ length: n }, (_, j) =>
    Array.from({ length: n }, (_, k) => scaled.reduce((sum, row) => sum + row[j]! * row[k]!, 0)),
  )
  const projected = Array.from({ length: n }, (_, j) => scaled.reduce((sum, row, i) => sum + row[j]! * right[i]!, 0))
  const size = Math.sqrt(right.reduce((sum, b) => sum + b * b, 0))
  const z = solveActiveSet(gram, projected, 1e-14 * (size || 1))
  const x = z.map((value, j) => value / length[j]!)
  const residual = Math.sqrt(
    matrix.reduce((sum, row, i) => sum + (row.reduce((dot, a, j) => dot + a * x[j]!, 0) - right[i]!) ** 2, 0),
  )
  return { x, residual, active: x.flatMap((value, j) => (value > 0 ? [j] : [])) }
}

function solveActiveSet(gram: number[][], projected: number[], tolerance: number): number[] {
  const n = projected.length
  const z = new Array<number>(n).fill(0)
  const isFree = new Array<boolean>(n).fill(false)
  const excluded = new Array<boolean>(n).fill(false)
  for (let round = 0; round < 30 * n; round++) {
    const gradient = projected.map((p, j) => p - gram[j]!.reduce((sum, g, k) => sum + g * z[k]!, 0))
    let entering = -1
    for (let j = 0; j < n; j++)
      if (
        !isFree[j] &&
        !excluded[j] &&
        gradient[j]! > tolerance &&
        (entering < 0 || gradient[j]! > gradient[entering]!)
      )
        entering = j
    if (entering < 0) return z
    isFree[entering] = true
    for (let inner = 0; inner <= 3 * n; inner++) {
      const free = isFree.flatMap((value, j) => (value ? [j] : []))
      const trial = solveFree(gram, projected, free)
      if (!trial) {
        // The column follows from those already free: it adds nothing.
        isFree[entering] = false
        excluded[entering] = true
        break
      }
      if (trial.every((value) => value > 0)) {
        free.forEach((j, i) => (z[j] = trial[i]!))
        excluded.fill(false)
        break
      }
      let share = 1
      free.forEach((j, i) => {
        if (trial[i]! <= 0) share = Math.min(share, z[j]! / (z[j]! - trial[i]! || 1))
      })
      free.forEach((j, i) => {
        z[j] = z[j]! + share * (trial[i]! - z[j]!)
        if (z[j]! <= 1e-15 * (1 + Math.abs(trial[i]!)) && trial[i]! <= 0) {
          z[j] = 0
          isFree[j] = false
          if (j === entering) excluded[j] = true
        }
      })
    }
  }
  return z
}

function solveFree(gram: number[][], projected: number[], free: number[]): number[] | null {
  // Columns closer than 1e-12 to dependent are refused: Cholesky of the scaled normal matrix tells.
  const k = free.length
  const factor = Array.from({ length: k }, () => new Array<number>(k).fill(0))
  for (let i = 0; i < k; i++)
    for (let j = 0; j <= i; j++) {
      let sum = gram[free[i]!]![free[j]!]!
      for (let l = 0; l < j; l++) sum -= factor[i]![l]! * factor[j]![l]!
      if (i !== j) factor[i]![j] = sum / factor[j]![j]!
      else if (sum > 1e-12) factor[i]![i] = Math.sqrt(sum)
      else return null
    }
  return solveLinear(
    free.map((i) => free.map((j) => gram[i]![j]!)),
    free.map((i) => projected[i]!),
  )
}
