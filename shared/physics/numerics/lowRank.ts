/** A matrix as the product of few: `rows × columns ≈ coefficients (rows × rank) · basis (rank × columns)`. */
export interface LowRank {
  readonly rank: number
  readonly coefficients: Float64Array
  readonly basis: Float64Array
}

/** Rows that the directions are first sought among, and rows between them on which the result is proved. */
const SAMPLED_ROWS = 28

/**
 * Factors a matrix whose rows are values of a smooth function along a parameter, and so nearly dependent. Directions are
 * sought among rows spread over the matrix (close together at its ends, as Chebyshev's points are) by Gram–Schmidt, the
 * largest remaining row first, until every one of them is shorter than `tolerance` times the longest row. Rows between them
 * must then be met as well, to ten times that, and every row to 1e-7, or the matrix counts as not smooth. Meant for rows that
 * are known to be values of an analytic function.
 * Source: G. H. Golub, C. F. Van Loan, Matrix Computations, §5.4 (orthogonalisation with pivots).
 * @param matrix row by row; not changed. @returns null when `highestRank` directions are not enough.
 * Cost O(rows × columns × rank), all of it dot products.
 */
export function lowRankOf(
  matrix: Float64Array,
  rows: number,
  columns: number,
  tolerance: number,
  highestRank: number,
): LowRank | null {
  let longest = 0
  const squares = new Float64Array(rows)
  for (let r = 0; r < rows; r++) {
    squares[r] = dot(matrix, r * columns, matrix, r * columns, columns)
    longest = Math.max(longest, squares[r]!)
  }
  const least = tolerance * tolerance * longest
  const basis = directionsOf(matrix, chosenRows(rows, 0), columns, least, highestRank)
  if (!basis) return null
  const rank = basis.length / columns
  for (const row of chosenRows(rows, 0.5)) {
    const rest = matrix.slice(row * columns, (row + 1) * columns)
    for (let k = 0; k < rank; k++) takeOff(rest, 0, basis, k * columns, columns)
    if (dot(rest, 0, rest, 0, columns) > 100 * least) return null
  }
  const coefficients = project(matrix, rows, columns, basis, rank)
  for (let r = 0; r < rows; r++) {
    // What the directions hold of a row: this sees only the larger half of the digits, but of every row.
    const held = dot(coefficients, r * rank, coefficients, r * rank, rank)
    if (squares[r]! - held > 1e-14 * longest) return null
  }
  return { rank, coefficients, basis }
}

/** Every row of a matrix along every direction of a basis: rows × rank. Cost O(rows × columns × rank). */
export function project(
  matrix: Float64Array,
  rows: number,
  columns: number,
  basis: Float64Array,
  rank: number,
): Float64Array {
  const projected = new Float64Array(rows * rank)
  for (let r = 0; r < rows; r++)
    for (let k = 0; k < rank; k++) projected[r * rank + k] = dot(matrix, r * columns, basis, k * columns, columns)
  return projected
}

/** Row numbers at Chebyshev's points, or with `offset` 0.5 between them; each once. */
function chosenRows(rows: number, offset: number): number[] {
  const last = rows - 1
  const chosen = new Set<number>()
  for (let i = 0; i + offset <= SAMPLED_ROWS; i++)
    chosen.add(Math.round(0.5 * last * (1 - Math.cos((Math.PI * (i + offset)) / SAMPLED_ROWS))))
  return [...chosen]
}

function directionsOf(
  matrix: Float64Array,
  rows: readonly number[],
  columns: number,
  least: number,
  highestRank: number,
): Float64Array | null {
  const rest = rows.map((row) => matrix.slice(row * columns, (row + 1) * columns))
  const basis = new Float64Array(Math.min(rows.length, highestRank) * columns)
  for (let rank = 0; ; rank++) {
    let pivot = 0
    let longest = -1
    rest.forEach((row, r) => {
      const square = dot(row, 0, row, 0, columns)
      if (square > longest) {
        longest = square
        pivot = r
      }
    })
    if (!(longest > least)) return basis.subarray(0, rank * columns)
    if (rank * columns === basis.length) return null
    const direction = rest[pivot]!
    // A remainder of rounding size may lean on the directions before it: taken off once more it stands upright.
    for (let k = 0; k < rank; k++) takeOff(direction, 0, basis, k * columns, columns)
    const scale = 1 / Math.sqrt(dot(direction, 0, direction, 0, columns))
    for (let c = 0; c < columns; c++) basis[rank * columns + c] = direction[c]! * scale
    for (const row of rest) takeOff(row, 0, basis, rank * columns, columns)
  }
}

/** Takes from a row its part along a direction of length one. */
function takeOff(row: Float64Array, from: number, basis: Float64Array, direction: number, columns: number): void {
  const factor = dot(row, from, basis, direction, columns)
  for (let c = 0; c < columns; c++) row[from + c]! -= factor * basis[direction + c]!
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
