import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../shared/physics/errors.js'
import { adaptiveIntegral } from '../../../shared/physics/uncertainty/adaptiveIntegral.js'
import {
  limitingProbabilities,
  limitingVerdict,
  minimumOfTwo,
  normalProbabilityBelow,
} from '../../../shared/physics/uncertainty/index.js'
import { StandardDraws } from '../../../shared/physics/uncertainty/standardDraws.js'

const independent = (u: readonly number[]): number[][] => u.map((a, i) => u.map((_, j) => (i === j ? a * a : 0)))

describe('normal distribution', () => {
  it.each([
    [-8, 6.22096057427174e-16],
    [-3.5, 0.00023262907903552502],
    [-1, 0.15865525393145707],
    [0.3, 0.6179114221889526],
    [2.9, 0.998134186699616],
    [3.1, 0.9990323967867817],
  ])('Φ(%d) is that of scipy.stats.norm to 12 digits', (z, expected) => {
    expect(Math.abs(normalProbabilityBelow(z) / expected - 1)).toBeLessThan(1e-12)
  })

  it('is 0 and 1 far out and one half in the middle', () => {
    expect([normalProbabilityBelow(-Infinity), normalProbabilityBelow(0), normalProbabilityBelow(50)]).toEqual([
      0, 0.5, 1,
    ])
  })
})

describe('adaptive integral', () => {
  it('integrates a polynomial of degree 20 to rounding: the nodes and weights are right', () => {
    expect(adaptiveIntegral((x) => x ** 20, -1, 1, 1)).toBeCloseTo(2 / 21, 14)
    expect(adaptiveIntegral(() => 1, 0, 3, 1)).toBeCloseTo(3, 14)
  })

  it('finds a step', () => {
    expect(adaptiveIntegral((x) => (x > 0.3712 ? 1 : 0), 0, 1, 1e-9)).toBeCloseTo(1 - 0.3712, 7)
  })
})

describe('probability that each junction limits', () => {
  it('is one half for two equal independent junctions', () => {
    expect(limitingProbabilities([19.5, 19.5], independent([0.3, 0.3]))).toEqual([0.5, 0.5])
  })

  it('is 0.9977 at 19.5 and 20.7 with u = 0.3 each', () => {
    expect(limitingProbabilities([19.5, 20.7], independent([0.3, 0.3]))[0]).toBeCloseTo(0.9977, 4)
  })

  it('follows the normal distribution of the difference, correlation included', () => {
    const [p] = limitingProbabilities(
      [18.2, 18.4],
      [
        [0.04, 0.03],
        [0.03, 0.05],
      ],
    )
    expect(p).toBeCloseTo(normalProbabilityBelow(0.2 / Math.sqrt(0.04 + 0.05 - 0.06)), 12)
  })

  it('is that of scipy.stats.multivariate_normal for three and four junctions', () => {
    const three = limitingProbabilities(
      [16, 16.2, 16.3],
      [
        [0.04, 0.02, 0.01],
        [0.02, 0.06, 0.015],
        [0.01, 0.015, 0.05],
      ],
    )
    ;[0.71849884, 0.1822938, 0.09920736].forEach((p, i) => expect(Math.abs(three[i]! - p)).toBeLessThan(2e-7))
    const variances = [0.02, 0.03, 0.01, 0.05]
    const four = limitingProbabilities(
      [12, 12.1, 12.05, 12.3],
      variances.map((v, i) => variances.map((_, j) => 0.01 + (i === j ? v : 0))),
    )
    ;[0.462011, 0.223064, 0.250592, 0.064333].forEach((p, i) => expect(Math.abs(four[i]! - p)).toBeLessThan(2e-6))
  })

  it('is a third for three, a quarter for four equal independent junctions', () => {
    limitingProbabilities([15, 15, 15], independent([0.2, 0.2, 0.2])).forEach((p) => expect(p).toBeCloseTo(1 / 3, 9))
    limitingProbabilities([9, 9, 9, 9], independent([0.2, 0.2, 0.2, 0.2])).forEach((p) =>
      expect(p).toBeCloseTo(0.25, 8),
    )
  })

  it('agrees with seeded draws of three correlated currents', () => {
    const mean = [16, 16.1, 16.05]
    const factor = [
      [0.2, 0, 0],
      [0.1, 0.15, 0],
      [0.05, -0.05, 0.1],
    ]
    const covariance = factor.map((a) => factor.map((b) => a.reduce((sum, value, k) => sum + value * b[k]!, 0)))
    const draws = 100_000
    const z = new Float64Array(3 * draws)
    new StandardDraws(5, 'three junctions').fillNormal(z, z.length)
    const counts = [0, 0, 0]
    for (let d = 0; d < draws; d++) {
      const j = mean.map((m, i) => m + factor[i]!.reduce((sum, f, k) => sum + f * z[3 * d + k]!, 0))
      counts[j.indexOf(Math.min(...j))]!++
    }
    const exact = limitingProbabilities(mean, covariance)
    exact.forEach((p, i) => expect(Math.abs(p - counts[i]! / draws)).toBeLessThan(0.006)) // 4 σ of the count
  })

  it('splits an exact tie evenly when the tied junctions share every error, and when nothing is uncertain', () => {
    const shared = [1, 1, 1].map(() => [0.04, 0.04, 0.04])
    expect(limitingProbabilities([15, 15, 16], shared)).toEqual([0.5, 0.5, 0])
    expect(limitingProbabilities([15, 15], independent([0, 0]))).toEqual([0.5, 0.5])
    expect(limitingProbabilities([15, 14, 16], independent([0, 0, 0]))).toEqual([0, 1, 0])
    expect(limitingProbabilities([15], [[0.1]])).toEqual([1])
  })

  it('handles fully correlated relative errors of three junctions: the order cannot change', () => {
    const j = [15, 15.01, 15.5]
    const p = limitingProbabilities(
      j,
      j.map((a) => j.map((b) => 1e-4 * a * b)),
    )
    expect(p[0]).toBeCloseTo(1, 6)
  })

  it('adds up to one, follows the junctions when they are renumbered, and falls as a current rises', () => {
    const triple = fc.array(fc.double({ min: 14, max: 15, noNaN: true }), { minLength: 3, maxLength: 3 })
    const spread = fc.array(fc.double({ min: 0.05, max: 0.5, noNaN: true }), { minLength: 3, maxLength: 3 })
    fc.assert(
      fc.property(triple, spread, (j, u) => {
        const p = limitingProbabilities(j, independent(u))
        expect(p[0]! + p[1]! + p[2]!).toBeCloseTo(1, 12)
        const turned = limitingProbabilities([j[2]!, j[0]!, j[1]!], independent([u[2]!, u[0]!, u[1]!]))
        expect(Math.abs(turned[1]! - p[0]!)).toBeLessThan(1e-7)
        const raised = limitingProbabilities([j[0]! + 0.1, j[1]!, j[2]!], independent(u))
        expect(raised[0]).toBeLessThan(p[0]! + 1e-7)
      }),
      { seed: 3, numRuns: 15 },
    )
  })

  it.each([
    ['no currents', () => limitingProbabilities([], []), 'currentsMaCm2'],
    ['a covariance of another size', () => limitingProbabilities([1, 2], [[1]]), 'covariance'],
    ['a negative variance', () => limitingProbabilities([1], [[-1]]), 'covariance[0][0]'],
    [
      'more correlation than the variances allow',
      () =>
        limitingProbabilities(
          [1, 2],
          [
            [1, 2],
            [2, 1],
          ],
        ),
      'covariance',
    ],
  ])('refuses %s', (_, run, argument) => {
    expect(run).toThrow(DomainError)
    expect(run).toThrow(expect.objectContaining({ argument }))
  })
})

describe('verdict', () => {
  it('names the limiting junction from 0.95 on', () => {
    expect(limitingVerdict([0.03, 0.97])).toEqual({ kind: 'limited', junction: 2, probability: 0.97 })
    expect(limitingVerdict([0.95, 0.05]).kind).toBe('limited')
  })

  it('is matched within uncertainty below', () => {
    expect(limitingVerdict([0.94, 0.06])).toEqual({
      kind: 'matched-within-uncertainty',
      likeliest: 1,
      probability: 0.94,
    })
  })

  it('refuses no or impossible probabilities', () => {
    expect(() => limitingVerdict([])).toThrow(DomainError)
    expect(() => limitingVerdict([1.2, -0.2])).toThrow('between 0 and 1')
  })
})

describe("smaller of two currents (Clark's moments)", () => {
  it('is 19.3307 ± 0.2477 at a tie of 19.5 ± 0.3', () => {
    const moments = minimumOfTwo(19.5, 0.3, 19.5, 0.3, 0)
    expect(moments.meanMaCm2).toBeCloseTo(19.3307, 4)
    expect(moments.uncertaintyMaCm2).toBeCloseTo(0.2477, 4)
    expect(moments.probabilityFirst).toBe(0.5)
  })

  it('is the smaller one itself when they lie apart', () => {
    const moments = minimumOfTwo(19.5, 0.3, 20.7, 0.3, 0)
    expect(moments.meanMaCm2).toBeCloseTo(19.4997, 4)
    expect(moments.uncertaintyMaCm2).toBeCloseTo(0.2994, 4)
    expect(moments.probabilityFirst).toBeCloseTo(0.9977, 4)
  })

  it('takes the smaller estimate when both share every error', () => {
    expect(minimumOfTwo(18, 0.2, 19, 0.2, 1)).toEqual({ meanMaCm2: 18, uncertaintyMaCm2: 0.2, probabilityFirst: 1 })
  })

  it('is symmetric and never above either mean', () => {
    const j = fc.double({ min: 10, max: 20, noNaN: true })
    const u = fc.double({ min: 0.01, max: 1, noNaN: true })
    fc.assert(
      fc.property(j, u, j, u, fc.double({ min: -1, max: 0.9, noNaN: true }), (a, ua, b, ub, r) => {
        const ab = minimumOfTwo(a, ua, b, ub, r)
        const ba = minimumOfTwo(b, ub, a, ua, r)
        expect(ab.meanMaCm2).toBeCloseTo(ba.meanMaCm2, 10)
        expect(ab.uncertaintyMaCm2).toBeCloseTo(ba.uncertaintyMaCm2, 8)
        expect(ab.meanMaCm2).toBeLessThanOrEqual(Math.min(a, b) + 1e-12)
      }),
      { seed: 19 },
    )
  })

  it('refuses a correlation beyond one', () => {
    expect(() => minimumOfTwo(1, 0.1, 1, 0.1, 1.5)).toThrow('correlation is 1.5')
  })
})
