import { DomainError } from '../errors.js'

/**
 * Solves A x = b for a small dense square matrix by elimination with partial pivoting after each row has been divided
 * by its largest element. The arguments are not changed.
 * Source: G. H. Golub, C. F. Van Loan, Matrix Computations (4th ed.), section 3.4.
 * @param matrix n rows of n numbers. @param right n numbers.
 * @throws DomainError when the shapes differ, a number is not finite, or the matrix is singular to rounding.
 * Cost: n³/3.
 */
export function solveLinear(matrix: readonly (readonly number[])[], right: readonly number[]): number[] {
  const n = matrix.length
  if (right.length !== n) throw new DomainError('right', `right has ${right.length} numbers; the matrix has ${n} rows.`)
  const rows = matrix.map((row, i) => {
    if (row.length !== n)
      throw new DomainError('matrix', `matrix row ${i} has ${row.length} numbers; a square matrix of ${n} is needed.`)
    const scale = row.reduce((largest, x) => Math.max(largest, Math.abs(x)), 0)
    const full = [...row, right[i]!]
    if (!full.every(Number.isFinite)) throw new DomainError('matrix', `Row ${i} has a number that is not finite.`)
    if (scale === 0) throw singular()
    return full.map((x) => x / scale)
  })
  for (let k = 0; k < n; k++) {
    let pivot = k
    for (let i = k + 1; i < n; i++) if (Math.abs(rows[i]![k]!) > Math.abs(rows[pivot]![k]!)) pivot = i
    if (!(Math.abs(rows[pivot]![k]!) > 1e-300)) throw singular()
    ;[rows[k], rows[pivot]] = [rows[pivot]!, rows[k]!]
    const top = rows[k]!
    for (let i = k + 1; i < n; i++) {
      const row = rows[i]!
      const factor = row[k]! / top[k]!
      if (factor !== 0) for (let j = k; j <= n; j++) row[j] = row[j]! - factor * top[j]!
    }
  }
  const x = new Array<number>(n).fill(0)
  for (let i = n - 1; i >= 0; i--) {
    const row = rows[i]!
    let sum = row[n]!
    for (let j = i + 1; j < n; j++) sum -= row[j]! * x[j]!
    x[i] = sum / row[i]!
    if (!Number.isFinite(x[i])) throw singular()
  }
  return x
}

function singular(): DomainError {
  return new DomainError('matrix', 'The matrix is singular: at least one row follows from the others.')
}
