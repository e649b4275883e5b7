/** A matrix as the product of few: `rows × columns ≈ coefficients (rows × rank) · basis (rank × columns)`. */
export interface LowRank {
  readonly rank: number
  readonly coefficients: Float64Array
  readonly basis: Float64Array
}

/**
 * Factors a matrix whose rows are nearly dependent (values of a smooth function along a parameter) by Gram–Schmidt with the
 * largest remaining row first. It stops when every remaining row is shorter than `tolerance` times the longest given one,
 * which bounds the error of any dot product with a row; or gives up at `highestRank`.
 * Source: G. H. Golub, C. F. Van Loan, Matrix Computations, §5.4 (rank-revealing orthogonalisation).
 * @param matrix row by row; not changed. @returns null when `highestRank` is not enough.
 * Cost O(rows × columns × rank).
 */
export function lowRankOf(
  matrix: Float64Array,
  rows: number,
  columns: number,
  tolerance: number,
  highestRank: number,
): LowRank | null {
  const rest = matrix.slice()
  const squares = new Float64Array(rows)
  for (let r = 0; r < rows; r++) squares[r] = dot(rest, r * columns, rest, r * columns, columns)
  const least = tolerance * tolerance * squares.reduce((a, b) => Math.max(a, b), 0)
  const basis: Float64Array[] = []
  const coefficients: Float64Array[] = []
  for (;;) {
    let pivot = 0
    for (let r = 1; r < rows; r++) if (squares[r]! > squares[pivot]!) pivot = r
    if (!(squares[pivot]! > least)) break
    if (basis.length === highestRank) return null
    const scale = 1 / Math.sqrt(squares[pivot]!)
    const direction = rest.slice(pivot * columns, (pivot + 1) * columns)
    for (let c = 0; c < columns; c++) direction[c]! *= scale
    const along = new Float64Array(rows)
    for (let r = 0; r < rows; r++) {
      const start = r * columns
      const factor = dot(rest, start, direction, 0, columns)
      along[r] = factor
      let square = 0
      for (let c = 0; c < columns; c++) {
        const left = rest[start + c]! - factor * direction[c]!
        rest[start + c] = left
        square += left * left
      }
      squares[r] = square
    }
    basis.push(direction)
    coefficients.push(along)
  }
  const rank = basis.length
  const packed = new Float64Array(rows * rank)
  for (let r = 0; r < rows; r++) for (let k = 0; k < rank; k++) packed[r * rank + k] = coefficients[k]![r]!
  const directions = new Float64Array(rank * columns)
  basis.forEach((direction, k) => directions.set(direction, k * columns))
  return { rank, coefficients: packed, basis: directions }
}

/** `Σ a[i] b[i]` of two stretches, in four sums so that additions overlap. */
export function dot(a: Float64Array, fromA: number, b: Float64Array, fromB: number, length: number): number {
  let s0 = 0
  let s1 = 0
  let s2 = 0
  let s3 = 0
  let i = 0
  for (; i + 3 < length; i += 4) {
    s0 += a[fromA + i]! * b[fromB + i]!
    s1 += a[fromA + i + 1]! * b[fromB + i + 1]!
    s2 += a[fromA + i + 2]! * b[fromB + i + 2]!
    s3 += a[fromA + i + 3]! * b[fromB + i + 3]!
  }
  for (; i < length; i++) s0 += a[fromA + i]! * b[fromB + i]!
  return s0 + s1 + (s2 + s3)
}
