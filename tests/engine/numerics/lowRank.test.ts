import { describe, expect, it } from 'vitest'
import { dot, lowRankOf, project } from '../../../shared/physics/numerics/lowRank.js'

const rows = 150
const columns = 90

function matrixOf(f: (row: number, column: number) => number): Float64Array {
  return Float64Array.from({ length: rows * columns }, (_, i) => f(Math.floor(i / columns), i % columns))
}

describe('lowRankOf', () => {
  const smooth = matrixOf((r, c) => Math.exp(-(0.2 + r / 60) * (c / 20)) * (1 + Math.sin(c)))

  it('gives the matrix back to rounding from a few directions', () => {
    const found = lowRankOf(smooth, rows, columns, 4e-16, 40)!
    expect(found.rank).toBeLessThan(25)
    for (let r = 0; r < rows; r++)
      for (let c = 0; c < columns; c++) {
        let value = 0
        for (let k = 0; k < found.rank; k++)
          value += found.coefficients[r * found.rank + k]! * found.basis[k * columns + c]!
        expect(Math.abs(value - smooth[r * columns + c]!)).toBeLessThan(1e-13)
      }
  })

  it('keeps dot products with any vector', () => {
    const found = lowRankOf(smooth, rows, columns, 4e-16, 40)!
    const vector = Float64Array.from({ length: columns }, (_, c) => Math.cos(3 * c))
    const short = project(vector, 1, columns, found.basis, found.rank)
    for (let r = 0; r < rows; r += 7)
      expect(dot(found.coefficients, r * found.rank, short, 0, found.rank)).toBeCloseTo(
        dot(smooth, r * columns, vector, 0, columns),
        12,
      )
  })

  it('gives up on rows that have nothing in common', () => {
    expect(
      lowRankOf(
        matrixOf((r, c) => Math.sin(r * r * 0.37 + c * c * 0.11 * r)),
        rows,
        columns,
        4e-16,
        20,
      ),
    ).toBeNull()
  })

  it('gives up on a row that is unlike the rows it looked at', () => {
    const spike = matrixOf((r, c) => (c < 45 ? Math.exp((-r * c) / 4000) : r === 77 ? 1 : 0))
    expect(lowRankOf(spike, rows, columns, 4e-16, 40)).toBeNull()
  })
})
