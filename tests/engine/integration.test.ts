import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { makeCurve, type Curve } from '../../shared/physics/curve.js'
import { cumulativeProduct, integrateProduct } from '../../shared/physics/integration.js'

/** A curve on points of its own between `from` and `to`, drawn by fast-check. */
const curves = (from: number, to: number): fc.Arbitrary<Curve> =>
  fc.uniqueArray(fc.double({ min: from, max: to, noNaN: true }), { minLength: 2, maxLength: 40 }).chain((x) =>
    fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: x.length, maxLength: x.length }).map((y) =>
      makeCurve(
        [...x].sort((p, q) => p - q),
        y,
      ),
    ),
  )

/** The size that rounding is measured against: the integral of |a||b| cannot exceed it. */
const sizeOf = (a: Curve): number => a.wavelengthNm.at(-1)! - a.wavelengthNm[0]!

describe('integrateProduct', () => {
  it('is exact for straight lines: ∫₀…₁₀ x (2 + 3x) dx, shifted to 100', () => {
    const a = makeCurve([100, 110], [0, 10])
    const b = makeCurve([100, 103, 110], [2, 11, 32])
    expect(integrateProduct(a, b)).toBeCloseTo(100 + 1000, 10)
  })

  it('follows both bends: two tents on different points', () => {
    // a = |x−300| tent of height 1 over 299…301, b = tent over 299.5…301.5 with its top at 300.5.
    const a = makeCurve([299, 300, 301], [0, 1, 0])
    const b = makeCurve([299.5, 300.5, 301.5], [0, 1, 0])
    // ∫ by hand: 299.5–300 of (½+u)u is 5/48, by symmetry of the product about 300.25 the same again at the far end;
    // between, ∫ (1−u)(½+u) over 0…½ is 13/48.
    expect(integrateProduct(a, b)).toBeCloseTo(5 / 48 + 13 / 48 + 5 / 48, 12)
  })

  it('counts each curve as zero outside its range', () => {
    const a = makeCurve([300, 500], [1, 1])
    expect(integrateProduct(a, makeCurve([400, 900], [2, 2]))).toBeCloseTo(200, 12)
    expect(integrateProduct(a, makeCurve([500, 900], [2, 2]))).toBe(0)
    expect(integrateProduct(a, makeCurve([600, 900], [2, 2]))).toBe(0)
  })

  it('keeps to the limits it is given, and to the overlap where they lie outside', () => {
    const a = makeCurve([300, 500], [1, 1])
    expect(integrateProduct(a, a, 310.5, 320)).toBeCloseTo(9.5, 12)
    expect(integrateProduct(a, a, 0, 310)).toBeCloseTo(10, 12)
    expect(integrateProduct(a, a, 490)).toBeCloseTo(10, 12)
    expect(integrateProduct(a, a, 320, 320)).toBe(0)
    expect(integrateProduct(a, a, 330, 320)).toBe(0)
  })

  it('passes whole intervals of either curve, and ends within one', () => {
    // ∫ of x over 0…6 against a flat 2, shifted to 100: whichever curve has the points, and with limits between them.
    const rising = makeCurve([100, 106], [0, 6])
    const flat = makeCurve([99, 101, 101.5, 103, 104, 105, 107], [2, 2, 2, 2, 2, 2, 2])
    const risingFinely = makeCurve([100, 100.5, 102, 103, 103.5, 104, 106], [0, 0.5, 2, 3, 3.5, 4, 6])
    const flatRoughly = makeCurve([99, 103, 107], [2, 2, 2])
    for (const [a, b] of [
      [rising, flat],
      [risingFinely, flatRoughly],
      [risingFinely, flat],
    ] as const) {
      expect(integrateProduct(a, b)).toBeCloseTo(36, 12)
      expect(integrateProduct(b, a)).toBeCloseTo(36, 12)
      expect(integrateProduct(a, b, 101.2, 104)).toBeCloseTo(4 ** 2 - 1.2 ** 2, 12)
      expect(integrateProduct(b, a, 103, 104.7)).toBeCloseTo(4.7 ** 2 - 3 ** 2, 12)
    }
  })

  it('takes a step as narrow as numbers allow', () => {
    const edge = 700.3
    const step = makeCurve([300, edge, edge + 2e-13, 900], [1, 1, 0, 0])
    expect(integrateProduct(step, makeCurve([200, 450.7, 1000], [1, 1, 1]))).toBeCloseTo(400.3, 9)
  })

  it('does not change when a curve gains points on its own lines', () => {
    fc.assert(
      fc.property(curves(300, 900), curves(250, 1000), (a, b) => {
        const middles = Array.from(a.wavelengthNm.slice(1), (x, i) => (x + a.wavelengthNm[i]!) / 2)
        const values = Array.from(a.values.slice(1), (y, i) => (y + a.values[i]!) / 2)
        const points = [
          ...Array.from(a.wavelengthNm, (x, i): [number, number] => [x, a.values[i]!]),
          ...middles.map((x, i): [number, number] => [x, values[i]!]),
        ].sort((p, q) => p[0] - q[0])
        const distinct = points.filter(([x], i) => i === 0 || x > points[i - 1]![0])
        const finer = makeCurve(
          distinct.map(([x]) => x),
          distinct.map(([, y]) => y),
        )
        expect(Math.abs(integrateProduct(finer, b) - integrateProduct(a, b))).toBeLessThan(1e-11 * sizeOf(b))
      }),
      { seed: 21 },
    )
  })

  it('is symmetric, linear in each curve and additive over bands', () => {
    fc.assert(
      fc.property(
        curves(300, 900),
        curves(250, 1000),
        fc.double({ min: -5, max: 5, noNaN: true }),
        fc.double({ min: 250, max: 1000, noNaN: true }),
        (a, b, factor, cutNm) => {
          const whole = integrateProduct(a, b)
          const tolerance = 1e-12 * sizeOf(b)
          const scaled: Curve = { ...a, values: a.values.map((y) => factor * y) }
          expect(Math.abs(integrateProduct(b, a) - whole)).toBeLessThan(tolerance)
          expect(Math.abs(integrateProduct(scaled, b) - factor * whole)).toBeLessThan(5 * tolerance)
          const parts = integrateProduct(a, b, -Infinity, cutNm) + integrateProduct(a, b, cutNm, Infinity)
          expect(Math.abs(parts - whole)).toBeLessThan(tolerance)
        },
      ),
      { seed: 22 },
    )
  })
})

describe('cumulativeProduct', () => {
  it('has every point of both grids, and ends at the integral', () => {
    const a = makeCurve([300, 310, 330], [0.2, 0.4, 0.1])
    const b = makeCurve([305, 310, 315, 400], [1, 2, 1, 1])
    const running = cumulativeProduct(a, b)
    expect(Array.from(running.wavelengthNm)).toEqual([305, 310, 315, 330])
    expect(running.values[0]).toBe(0)
    expect(running.values.at(-1)).toBe(integrateProduct(a, b))
    expect(running.values[2]).toBeCloseTo(integrateProduct(a, b, 305, 315), 14)
  })

  it('is flat at zero over the first curve where nothing overlaps', () => {
    const none = cumulativeProduct(makeCurve([300, 400], [1, 1]), makeCurve([500, 600], [1, 1]))
    expect([Array.from(none.wavelengthNm), Array.from(none.values)]).toEqual([
      [300, 400],
      [0, 0],
    ])
  })

  it('agrees with the integral up to each of its points', () => {
    fc.assert(
      fc.property(curves(300, 900), curves(250, 1000), (a, b) => {
        const { wavelengthNm, values } = cumulativeProduct(a, b)
        wavelengthNm.forEach((nm, i) => {
          expect(Math.abs(values[i]! - integrateProduct(a, b, -Infinity, nm))).toBeLessThan(1e-12 * sizeOf(b))
        })
      }),
      { seed: 23, numRuns: 40 },
    )
  })
})
