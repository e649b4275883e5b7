import { describe, expect, it } from 'vitest'
import { solveLinear } from '../../../shared/physics/numerics/linearSolve.js'
import { seededRandom } from '../../../shared/physics/numerics/random.js'

describe('solveLinear', () => {
  it('needs a row exchange and does it', () => {
    expect(
      solveLinear(
        [
          [0, 2],
          [3, 1],
        ],
        [4, 5],
      ),
    ).toEqual([1, 2])
  })

  it('copes with rows of very different size', () => {
    const [x, y] = solveLinear(
      [
        [1e-12, 1e-12],
        [1, -1],
      ],
      [3e-12, 1],
    )
    expect(x).toBeCloseTo(2, 12)
    expect(y).toBeCloseTo(1, 12)
  })

  it('random systems of five: A x gives b back', () => {
    const random = seededRandom(3)
    for (let trial = 0; trial < 50; trial++) {
      const matrix = Array.from({ length: 5 }, () => Array.from({ length: 5 }, () => random.normal()))
      const right = Array.from({ length: 5 }, () => random.normal())
      const x = solveLinear(matrix, right)
      matrix.forEach((row, i) => expect(row.reduce((sum, a, j) => sum + a * x[j]!, 0)).toBeCloseTo(right[i]!, 9))
    }
  })

  it('says that a matrix is singular, not square or not finite', () => {
    expect(() =>
      solveLinear(
        [
          [1, 2],
          [2, 4],
        ],
        [1, 2],
      ),
    ).toThrow(/singular/)
    expect(() => solveLinear([[1, 2]], [1])).toThrow(/square/)
    expect(() => solveLinear([[NaN]], [1])).toThrow(/not finite/)
    expect(() => solveLinear([[1]], [1, 2])).toThrow(/2 numbers/)
  })
})
