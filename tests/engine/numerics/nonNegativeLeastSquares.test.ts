import { describe, expect, it } from 'vitest'
import { nonNegativeLeastSquares } from '../../../shared/physics/numerics/nonNegativeLeastSquares.js'
import { seededRandom } from '../../../shared/physics/numerics/random.js'

describe('nonNegativeLeastSquares', () => {
  it('gives the plain solution when that is not negative', () => {
    const matrix = [
      [1, 0],
      [1, 1],
      [1, 2],
    ]
    const { x, residual } = nonNegativeLeastSquares(matrix, [1, 3, 5])
    expect(x[0]).toBeCloseTo(1, 12)
    expect(x[1]).toBeCloseTo(2, 12)
    expect(residual).toBeLessThan(1e-12)
  })

  it('holds at zero what would be negative', () => {
    const { x, active } = nonNegativeLeastSquares(
      [
        [1, 1],
        [1, 2],
      ],
      [2, 1],
    )
    expect(x).toEqual([1.5, 0])
    expect(active).toEqual([0])
  })

  it('meets the Kuhn–Tucker conditions on random systems', () => {
    const random = seededRandom(11)
    for (let trial = 0; trial < 100; trial++) {
      const matrix = Array.from({ length: 9 }, () => Array.from({ length: 4 }, () => random.normal()))
      const right = Array.from({ length: 9 }, () => random.normal())
      const { x } = nonNegativeLeastSquares(matrix, right)
      const rest = matrix.map((row, i) => right[i]! - row.reduce((sum, a, j) => sum + a * x[j]!, 0))
      x.forEach((value, j) => {
        const gradient = matrix.reduce((sum, row, i) => sum + row[j]! * rest[i]!, 0)
        expect(value).toBeGreaterThanOrEqual(0)
        if (value > 0) expect(Math.abs(gradient)).toBeLessThan(1e-9)
        else expect(gradient).toBeLessThan(1e-9)
      })
    }
  })

  it('two equal columns and a column of zeros do no harm', () => {
    const { residual, x } = nonNegativeLeastSquares(
      [
        [1, 1, 0],
        [2, 2, 0],
      ],
      [3, 6],
    )
    expect(residual).toBeLessThan(1e-9)
    expect(x[0]! + x[1]!).toBeCloseTo(3, 9)
    expect(x[2]).toBe(0)
  })

  it('refuses empty, uneven or not finite input', () => {
    expect(() => nonNegativeLeastSquares([], [])).toThrow(/empty/)
    expect(() => nonNegativeLeastSquares([[1]], [1, 2])).toThrow(/2 numbers/)
    expect(() => nonNegativeLeastSquares([[NaN]], [1])).toThrow(/not finite/)
  })
})
