import { describe, expect, it } from 'vitest'
import { minimiseInBounds } from '../../../shared/physics/numerics/boundedSearch.js'
import { minimiseOnInterval } from '../../../shared/physics/numerics/minimise.js'

describe('minimiseOnInterval', () => {
  it('finds a smooth minimum, a kink, and an end', () => {
    expect(minimiseOnInterval((x) => (x - 0.3) ** 2, -1, 2).x).toBeCloseTo(0.3, 7)
    expect(minimiseOnInterval((x) => Math.abs(x - Math.PI), 0, 10).x).toBeCloseTo(Math.PI, 7)
    expect(minimiseOnInterval((x) => x, 2, 5).x).toBe(2)
    expect(minimiseOnInterval((x) => -x, 2, 5).x).toBe(5)
  })

  it('is not caught by the nearer, higher valley', () => {
    const f = (x: number): number => Math.cos(3 * x) + 0.1 * x
    expect(minimiseOnInterval(f, -6, 6).x).toBeCloseTo(-5.247, 3)
  })

  it('names bad bounds and bad values', () => {
    expect(() => minimiseOnInterval((x) => x, 1, 1)).toThrow(/high is 1/)
    expect(() => minimiseOnInterval(() => Number.NaN, 0, 1)).toThrow(/finite/)
  })
})

describe('minimiseInBounds', () => {
  it('finds the bottom of a curved valley', () => {
    const f = ([x, y]: readonly number[]): number => (1 - x!) ** 2 + 100 * (y! - x! * x!) ** 2
    const found = minimiseInBounds(f, [
      { low: -2, high: 2 },
      { low: -1, high: 3 },
    ])
    expect(found.point[0]).toBeCloseTo(1, 5)
    expect(found.point[1]).toBeCloseTo(1, 5)
  })

  it('climbs along a ridge, where the smaller of two slopes counts', () => {
    const f = ([x, y]: readonly number[]): number => -Math.min(x! + 0.1 * y!, 2 - x! + 0.15 * y!)
    const found = minimiseInBounds(f, [
      { low: 0, high: 2 },
      { low: 0, high: 1 },
    ])
    expect(found.point[1]).toBeCloseTo(1, 7)
    expect(found.value).toBeCloseTo(-1.125, 8)
  })

  it('keeps to constraints, tells its path, and repeats itself to the last bit', () => {
    const f = ([x, y]: readonly number[]): number => (x! + y! > 1 ? Infinity : -(x! * y!))
    const bounds = [
      { low: 0, high: 1 },
      { low: 0, high: 1 },
    ]
    const found = minimiseInBounds(f, bounds)
    expect(found.value).toBeCloseTo(-0.25, 6)
    expect(found.path.at(-1)!.point).toEqual(found.point)
    for (let i = 1; i < found.path.length; i++) expect(found.path[i]!.value).toBeLessThan(found.path[i - 1]!.value)
    expect(minimiseInBounds(f, bounds)).toEqual(found)
  })

  it('says so when nothing is allowed, and refuses a start outside', () => {
    expect(() => minimiseInBounds(() => Infinity, [{ low: 0, high: 1 }])).toThrow(/constraints/)
    expect(() => minimiseInBounds(([x]) => x!, [{ low: 0, high: 1 }], { start: [2] })).toThrow(/start\[0\] is 2/)
  })
})
