import { describe, expect, it } from 'vitest'
import { seededRandom } from '../../../shared/physics/numerics/random.js'

describe('seededRandom', () => {
  it('the same seed gives the same numbers, another seed others', () => {
    const draw = (seed: number): number[] => {
      const random = seededRandom(seed)
      return Array.from({ length: 20 }, () => random.uniform())
    }
    expect(draw(5)).toEqual(draw(5))
    expect(draw(5)).not.toEqual(draw(6))
  })

  it('uniform numbers fill [0, 1) evenly', () => {
    const random = seededRandom(1)
    const counts = new Array<number>(10).fill(0)
    for (let i = 0; i < 20_000; i++) counts[Math.floor(10 * random.uniform())]!++
    const chiSquared = counts.reduce((sum, n) => sum + (n - 2000) ** 2 / 2000, 0)
    expect(chiSquared).toBeLessThan(27.9)
  })

  it('normal numbers have mean 0, variance 1, kurtosis 3', () => {
    const random = seededRandom(2)
    const x = Array.from({ length: 40_000 }, () => random.normal())
    const moment = (power: number): number => x.reduce((sum, value) => sum + value ** power, 0) / x.length
    expect(Math.abs(moment(1))).toBeLessThan(0.02)
    expect(Math.abs(moment(2) - 1)).toBeLessThan(0.03)
    expect(Math.abs(moment(4) - 3)).toBeLessThan(0.2)
  })

  it('between and below stay inside', () => {
    const random = seededRandom(4)
    for (let i = 0; i < 1000; i++) {
      const x = random.between(-2, 3)
      expect(x).toBeGreaterThanOrEqual(-2)
      expect(x).toBeLessThan(3)
      expect([0, 1, 2]).toContain(random.below(3))
    }
  })

  it.each([-1, 1.5, NaN, 2 ** 32])('refuses the seed %f', (seed) => {
    expect(() => seededRandom(seed)).toThrow(/whole number/)
  })
})
