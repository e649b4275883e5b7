import { describe, expect, it } from 'vitest'
import { findMonotoneRoot, findRoot } from '../../../shared/physics/numerics/root.js'

describe('findRoot', () => {
  it.each([
    ['cubic', (x: number) => x ** 3 - 2, 0, 3, Math.cbrt(2)],
    ['falling exponential', (x: number) => Math.exp(-x) - x, 0, 1, 0.5671432904097838],
    ['flat around its root', (x: number) => (x - 0.3) ** 9, -1, 2, 0.3],
    ['step', (x: number) => (x < 0.7 ? -1 : 1), 0, 1, 0.7],
    ['infinite on one side', (x: number) => (x > 2 ? Infinity : x - 1), 0, 10, 1],
  ])('%s', (_, f, low, high, expected) => {
    expect(Math.abs(findRoot(f, low, high) - expected)).toBeLessThan(2e-6)
  })

  it('never asks for a value outside the bracket', () => {
    const asked: number[] = []
    const f = (x: number): number => {
      asked.push(x)
      return Math.atan(1e6 * (x - 0.123456))
    }
    expect(findRoot(f, 0, 1)).toBeCloseTo(0.123456, 12)
    expect(Math.min(...asked)).toBe(0)
    expect(Math.max(...asked)).toBe(1)
  })

  it('returns an end that is itself the root', () => {
    expect(findRoot((x) => x, 0, 1)).toBe(0)
    expect(findRoot((x) => x - 1, 0, 1)).toBe(1)
  })

  it('says what is wrong with a bracket', () => {
    expect(() => findRoot((x) => x, 1, 2)).toThrow(/must change sign/)
    expect(() => findRoot((x) => x, 2, 1)).toThrow(/high − low/)
    expect(() => findRoot((x) => (x > 0.5 ? NaN : -1), 0, 1)).toThrow(/not a number/)
  })
})

describe('findMonotoneRoot', () => {
  it('finds the voltage of a diode from a poor start without leaving the bracket', () => {
    const asked: number[] = []
    const f = (v: number): readonly [number, number] => {
      asked.push(v)
      return [1e-12 * Math.expm1(v / 0.0257) - 20, (1e-12 / 0.0257) * Math.exp(v / 0.0257)]
    }
    expect(findMonotoneRoot(f, 0, 2, 0)).toBeCloseTo(0.0257 * Math.log(20 / 1e-12 + 1), 12)
    expect(asked.every((v) => v >= 0 && v <= 2)).toBe(true)
  })

  it('works for a falling function and refuses a bracket without a root', () => {
    expect(findMonotoneRoot((x) => [2 - x, -1], 0, 5)).toBeCloseTo(2, 14)
    expect(() => findMonotoneRoot((x) => [x, 1], 1, 5)).toThrow(/must change sign/)
  })
})
