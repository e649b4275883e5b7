import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../shared/physics/errors.js'
import {
  correlationOf,
  coverageFactor,
  propagateCovariance,
  propagateLinear,
  secondOrderVariance,
  welchSatterthwaite,
} from '../../../shared/physics/uncertainty/index.js'

/** JCGM 100:2008, H.1: calibration of an end gauge; l = l_s + d − l_s(δα θ + α_s δθ), nm. */
const gauge = { length: 50_000_623, alpha: 11.5e-6, theta: -0.1 }
const endGauge = [
  { sensitivity: 1, uncertainty: 25, degreesOfFreedom: 18 },
  { sensitivity: 1, uncertainty: 9.7, degreesOfFreedom: 25.6 },
  { sensitivity: 0, uncertainty: 1.2e-6 },
  { sensitivity: 0, uncertainty: 0.41 },
  { sensitivity: -gauge.length * gauge.theta, uncertainty: 0.58e-6, degreesOfFreedom: 50 },
  { sensitivity: -gauge.length * gauge.alpha, uncertainty: 0.029, degreesOfFreedom: 2 },
]

describe('end gauge of JCGM 100:2008, H.1', () => {
  const result = propagateLinear(endGauge)

  it('has the printed contributions and combined uncertainty', () => {
    const printed = [25, 9.7, 0, 0, 2.9, 16.7]
    result.contributions.forEach((c, i) => expect(Math.abs(c - printed[i]!)).toBeLessThan(0.05))
    expect(Math.abs(result.uncertainty - 31.71)).toBeLessThan(0.02)
  })

  it('says which inputs have no influence to first order instead of failing', () => {
    expect(result.insensitive).toEqual([2, 3])
    expect(result.shares[2]).toBe(0)
  })

  it('has 16.66 effective degrees of freedom and U99 of 92.6 nm', () => {
    expect(Math.abs(result.effectiveDegreesOfFreedom! - 16.66)).toBeLessThan(0.02)
    expect(coverageFactor(0.99, 16)).toBeCloseTo(2.92, 2)
    expect(Math.abs(coverageFactor(0.99, 16) * result.uncertainty - 92.6)).toBeLessThan(0.1)
    expect(Math.abs(coverageFactor(0.99, result.effectiveDegreesOfFreedom!) * result.uncertainty - 92.1)).toBeLessThan(
      0.1,
    )
  })

  it('compares the gauges with u(d) = 9.7 nm and the printed degrees of freedom', () => {
    const comparison = propagateLinear(
      [
        [5.8, 24],
        [3.9, 5],
        [6.7, 8],
      ].map(([uncertainty, degreesOfFreedom]) => ({
        sensitivity: 1,
        uncertainty: uncertainty!,
        degreesOfFreedom: degreesOfFreedom!,
      })),
    )
    expect(comparison.uncertainty).toBeCloseTo(9.682, 3)
    // The printed 25.6 takes u(d) rounded to 9.7 in the numerator; unrounded it is 25.45.
    expect(comparison.effectiveDegreesOfFreedom).toBeCloseTo(25.45, 2)
    expect(comparison.effectiveDegreesOfFreedom! * (9.7 / comparison.uncertainty) ** 4).toBeCloseTo(25.6, 1)
  })

  it('adds 11.9 and 1.7 nm at second order (H.1.7), 33.9 nm in all', () => {
    const u = endGauge.map((input) => input.uncertainty)
    const hessian = u.map(() => u.map(() => 0))
    for (const [i, j] of [
      [4, 3],
      [3, 4],
      [2, 5],
      [5, 2],
    ])
      hessian[i!]![j!] = -gauge.length
    const added = secondOrderVariance(hessian, u)
    expect(Math.sqrt(added)).toBeCloseTo(Math.hypot(11.9, 1.74), 1)
    expect(Math.sqrt(result.uncertainty ** 2 + added)).toBeCloseTo(33.9, 1)
  })
})

/** JCGM 100:2008, H.2: five simultaneous observations of voltage V, current A, phase rad (Table H.2, from memory). */
const volts = [5.007, 4.994, 5.005, 4.99, 4.999]
const amperes = [19.663e-3, 19.639e-3, 19.64e-3, 19.685e-3, 19.678e-3]
const phases = [1.0456, 1.0438, 1.0468, 1.0428, 1.0433]

const mean = (x: readonly number[]): number => x.reduce((sum, value) => sum + value, 0) / x.length
const covarianceOfMeans = (x: readonly number[], y: readonly number[]): number =>
  x.reduce((sum, value, i) => sum + (value - mean(x)) * (y[i]! - mean(y)), 0) / (x.length * (x.length - 1))

describe('simultaneous resistance and reactance of JCGM 100:2008, H.2', () => {
  const observed = [volts, amperes, phases]
  const covariance = observed.map((x) => observed.map((y) => covarianceOfMeans(x, y)))
  const [v, i, phi] = observed.map(mean) as [number, number, number]
  const [resistance, reactance, impedance] = [(v * Math.cos(phi)) / i, (v * Math.sin(phi)) / i, v / i]
  const jacobian = [
    [resistance / v, -resistance / i, -reactance],
    [reactance / v, -reactance / i, resistance],
    [impedance / v, -impedance / i, 0],
  ]
  const inputs = (row: number, u: readonly number[]): { sensitivity: number; uncertainty: number }[] =>
    jacobian[row]!.map((sensitivity, k) => ({ sensitivity, uncertainty: u[k]! }))
  const u = covariance.map((row, k) => Math.sqrt(row[k]!))

  it('gives R, X and their uncertainties with all correlations', () => {
    expect(resistance).toBeCloseTo(127.732, 3)
    expect(reactance).toBeCloseTo(219.847, 3)
    const correlation = correlationOf(covariance)
    const r = propagateLinear(inputs(0, u), correlation)
    expect(Math.abs(r.uncertainty - 0.07107)).toBeLessThan(5e-5)
    expect(Math.abs(propagateLinear(inputs(1, u), correlation).uncertainty - 0.29558)).toBeLessThan(5e-5)
    expect(r.effectiveDegreesOfFreedom).toBeNull()
    expect(r.shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(1, 12)
  })

  it('gives the correlations of the results', () => {
    const results = correlationOf(propagateCovariance(jacobian, covariance))
    expect(Math.abs(results[0]![1]! + 0.588)).toBeLessThan(1e-3)
    expect(Math.abs(results[0]![2]! + 0.485)).toBeLessThan(1e-3)
    expect(Math.abs(results[1]![2]! - 0.993)).toBeLessThan(1e-3)
  })

  it('would give 0.194 and 0.201 Ω if the correlations were dropped', () => {
    const printed = [0.0032, 0.0095e-3, 0.00075]
    expect(Math.abs(propagateLinear(inputs(0, printed)).uncertainty - 0.1941)).toBeLessThan(5e-4)
    expect(Math.abs(propagateLinear(inputs(1, printed)).uncertainty - 0.2007)).toBeLessThan(5e-4)
    expect(Math.abs(propagateLinear(inputs(2, printed)).uncertainty - 0.2039)).toBeLessThan(5e-4)
  })

  it('gives 0.0702 and 0.2961 Ω with the printed two-decimal correlations', () => {
    const printed = [
      [1, -0.36, 0.86],
      [-0.36, 1, -0.65],
      [0.86, -0.65, 1],
    ]
    expect(Math.abs(propagateLinear(inputs(0, u), printed).uncertainty - 0.0702)).toBeLessThan(3e-4)
    expect(Math.abs(propagateLinear(inputs(1, u), printed).uncertainty - 0.2961)).toBeLessThan(3e-4)
    expect(Math.abs(propagateLinear(inputs(2, u), printed).uncertainty - 0.2367)).toBeLessThan(3e-4)
  })

  it('has V and I cancel in R/Z', () => {
    const ratio = propagateLinear(
      [0, 0, -Math.sin(phi)].map((sensitivity, k) => ({ sensitivity, uncertainty: [0.0032, 0.0095e-3, 0.00075][k]! })),
    )
    expect(ratio.uncertainty).toBeCloseTo(0.00065, 5)
  })

  it('agrees with the second approach, each observation evaluated by itself', () => {
    const each = volts.map((voltage, k) => (voltage * Math.cos(phases[k]!)) / amperes[k]!)
    expect(mean(each)).toBeCloseTo(127.732, 3)
    expect(Math.sqrt(covarianceOfMeans(each, each))).toBeCloseTo(0.071, 3)
  })
})

describe('laws of the propagation', () => {
  it('gives four equal contributions of ten degrees of freedom forty', () => {
    expect(welchSatterthwaite([3, 3, 3, 3], [10, 10, 10, 10])).toBe(40)
  })

  it('gives infinitely many degrees of freedom when nothing states any', () => {
    expect(welchSatterthwaite([1, 2], [Infinity, Infinity])).toBe(Infinity)
    expect(coverageFactor(0.95, Infinity)).toBeCloseTo(1.959963985, 8)
  })

  it('matches Student factors of scipy.stats.t', () => {
    expect(coverageFactor(0.95, 5)).toBeCloseTo(2.5705818356363, 9)
    expect(coverageFactor(0.95, 50.5)).toBeCloseTo(2.008066498295, 9)
    expect(coverageFactor(0.6827, 1)).toBeCloseTo(1.837409429490547, 9)
  })

  it('never gives fewer degrees of freedom than the poorest input nor more than all together', () => {
    const input = fc.tuple(fc.double({ min: 0.01, max: 10, noNaN: true }), fc.integer({ min: 1, max: 60 }))
    fc.assert(
      fc.property(fc.array(input, { minLength: 1, maxLength: 8 }), (parts) => {
        const freedom = parts.map(([, nu]) => nu)
        const effective = welchSatterthwaite(
          parts.map(([c]) => c),
          freedom,
        )
        expect(effective).toBeGreaterThanOrEqual(Math.min(...freedom) * (1 - 1e-12))
        expect(effective).toBeLessThanOrEqual(freedom.reduce((sum, nu) => sum + nu, 0) * (1 + 1e-12))
      }),
      { seed: 11 },
    )
  })

  it.each([
    ['no inputs', () => propagateLinear([]), 'inputs'],
    ['a negative uncertainty', () => propagateLinear([{ sensitivity: 1, uncertainty: -1 }]), 'inputs[0].uncertainty'],
    ['NaN as sensitivity', () => propagateLinear([{ sensitivity: NaN, uncertainty: 1 }]), 'inputs[0].sensitivity'],
    [
      'a correlation above one',
      () =>
        propagateLinear(
          [1, 1].map((sensitivity) => ({ sensitivity, uncertainty: 1 })),
          [
            [1, 1.2],
            [1.2, 1],
          ],
        ),
      'correlation',
    ],
    ['a probability of one', () => coverageFactor(1, 5), 'probability'],
    ['no degrees of freedom', () => coverageFactor(0.95, 0), 'degreesOfFreedom'],
  ])('refuses %s', (_, run, argument) => {
    expect(run).toThrow(DomainError)
    try {
      run()
    } catch (error) {
      expect((error as DomainError).argument).toBe(argument)
    }
  })
})
