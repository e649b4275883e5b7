import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { makeCurve } from '../../../shared/physics/curve.js'
import { DomainError } from '../../../shared/physics/errors.js'
import { makeSpectrum } from '../../../shared/physics/spectrum.js'
import { deviceErrors, normalProbabilityBelow, propagateDevice } from '../../../shared/physics/uncertainty/index.js'
import type { BudgetComponent, DeviceUncertainty, MeasuredJunction } from '../../../shared/physics/uncertainty/index.js'
import { shiftedCurrent } from '../../../shared/physics/uncertainty/errorSources.js'
import { band, component, fullBudget, measured, stripedSun, tandem } from './device.js'

const sun = stripedSun()
const propagate = (junctions: readonly MeasuredJunction[]): DeviceUncertainty =>
  propagateDevice(deviceErrors(junctions, sun))

const pointwise = (value: number): BudgetComponent =>
  component({
    id: 'noise',
    uncertainty: { unit: 'percent', value },
    correlatedOverWavelength: false,
    correlatedBetweenJunctions: false,
  })

describe('a step of EQE 0.9 from 300 to 750 nm on 46 points', () => {
  const nm = Array.from({ length: 46 }, (_, k) => 300 + 10 * k)
  const step = makeCurve(
    nm,
    nm.map(() => 0.9),
  )

  it('has 2 % of its current when the 2 % are common to all wavelengths', () => {
    const { currents } = propagate([
      measured(step, [component({ id: 'x', uncertainty: { unit: 'percent', value: 2 } })]),
    ])
    expect(currents[0]!.uncertaintyMaCm2 / currents[0]!.currentMaCm2).toBeCloseTo(0.02, 12)
    expect(currents[0]!.expandedMaCm2).toBe(2 * currents[0]!.uncertaintyMaCm2)
  })

  it('has some 0.3 % when every point errs by itself: √46 times less, more where the sun is uneven', () => {
    const { currents } = propagate([measured(step, [pointwise(2)])])
    const relative = currents[0]!.uncertaintyMaCm2 / currents[0]!.currentMaCm2
    expect(relative).toBeGreaterThan(0.02 / Math.sqrt(46))
    expect(relative).toBeLessThan(0.0034)
  })
})

describe('a common error', () => {
  const detector = (group: string): BudgetComponent =>
    component({ id: 'detector', kind: 'detector-calibration', correlatedBetweenJunctions: group })

  it('of the reference detector leaves the mismatch untouched: u(J1/J2) = 0, u(J1 − J2) = 1 % of the difference', () => {
    const result = propagate(tandem(770, [detector('A')]))
    expect(result.mismatch!.uncertaintyPercent).toBeLessThan(1e-12)
    expect(result.correlation[0]![1]).toBeCloseTo(1, 12)
    const [j1, j2] = result.currents.map((current) => current.currentMaCm2) as [number, number]
    const [[c11, c12], [, c22]] = result.covariance as [[number, number], [number, number]]
    expect(Math.sqrt(Math.max(0, c11 + c22 - 2 * c12))).toBeCloseTo(0.01 * Math.abs(j1 - j2), 7)
  })

  it('almost untouched in a whole budget: the mismatch is known far better than the currents', () => {
    const budget = (size: number): BudgetComponent[] =>
      fullBudget.map((c) => (c.id === 'detector' ? { ...c, uncertainty: { unit: 'percent', value: size } } : c))
    const small = propagate(tandem(770, budget(0.1)))
    const large = propagate(tandem(770, budget(3)))
    expect(large.currents[0]!.uncertaintyMaCm2).toBeGreaterThan(3 * small.currents[0]!.uncertaintyMaCm2)
    expect(large.mismatch!.uncertaintyPercent).toBeCloseTo(small.mismatch!.uncertaintyPercent, 12)
  })

  it('counts in the mismatch when the junctions were measured with different detectors', () => {
    const [top, bottom] = tandem() as [MeasuredJunction, MeasuredJunction]
    const result = propagate([
      { ...top, components: [detector('A')] },
      { ...bottom, components: [detector('B')] },
    ])
    const { mismatchPercent, uncertaintyPercent } = result.mismatch!
    expect(uncertaintyPercent).toBeCloseTo((1 + mismatchPercent / 100) * Math.SQRT2, 10)
    expect(result.correlation[0]![1]).toBe(0)
  })
})

describe('the parts of a whole budget', () => {
  const result = propagate(tandem())

  it('have shares that add up to one for every current and for the mismatch', () => {
    for (const i of [0, 1]) expect(result.components.reduce((sum, part) => sum + part.shares[i]!, 0)).toBeCloseTo(1, 12)
    expect(result.components.reduce((sum, part) => sum + part.mismatchShare, 0)).toBeCloseTo(1, 12)
    expect(result.components.map((part) => part.componentId)).toEqual(fullBudget.map((c) => c.id))
  })

  it('carry the degrees of freedom of the drift alone', () => {
    const drift = result.components.find((part) => part.componentId === 'drift')!
    expect(result.currents[0]!.effectiveDegreesOfFreedom).toBeCloseTo(9 / drift.shares[0]! ** 2, 6)
    expect(result.currents[0]!.coverageFactor95).toBeGreaterThan(1.96)
  })

  it('give the offset as half the difference of the moved currents, opposite for the two junctions', () => {
    const errors = deviceErrors(tandem(), sun)
    const offset = result.components.find((part) => part.componentId === 'offset')!
    const half = (i: number): number => 0.5 * (shiftedCurrent(errors, i, 0.5) - shiftedCurrent(errors, i, -0.5))
    expect(offset.uncertaintyMaCm2[0]).toBeCloseTo(Math.abs(half(0)), 12)
    expect(half(0)).toBeGreaterThan(0)
    expect(half(1)).not.toBeCloseTo(half(0), 2)
  })

  it('give a limiting probability that follows the normal distribution of the difference', () => {
    const [a, b] = result.currents.map((current) => current.currentMaCm2) as [number, number]
    const [[c11, c12], [, c22]] = result.covariance as [[number, number], [number, number]]
    const expected = normalProbabilityBelow((b - a) / Math.sqrt(c11 + c22 - 2 * c12))
    expect(result.limitingProbability[0]).toBeCloseTo(expected, 12)
    expect(result.limitingProbability[0]! + result.limitingProbability[1]!).toBeCloseTo(1, 12)
  })
})

describe('three junctions', () => {
  const triple = [band(310, 660, 0.85), band(660, 870, 0.9), band(870, 1190, 0.9)].map((eqe) => measured(eqe))
  const result = propagate(triple)

  it('have a mismatch of the highest against the lowest and a table of three pairs', () => {
    const j = result.currents.map((current) => current.currentMaCm2)
    expect(result.mismatch!.mismatchPercent).toBeCloseTo(100 * (Math.max(...j) / Math.min(...j) - 1), 10)
    expect(result.mismatch!.higher).toBe(j.indexOf(Math.max(...j)) + 1)
    expect(result.mismatch!.lower).toBe(j.indexOf(Math.min(...j)) + 1)
    expect(result.pairs).toHaveLength(3)
  })

  it('have results that do not depend on the order in which they are given', () => {
    const turned = propagate([triple[2]!, triple[0]!, triple[1]!])
    const close = (a: number, b: number): void => expect(Math.abs(a - b)).toBeLessThan(1e-7)
    close(turned.currents[1]!.uncertaintyMaCm2, result.currents[0]!.uncertaintyMaCm2)
    close(turned.mismatch!.uncertaintyPercent, result.mismatch!.uncertaintyPercent)
    result.limitingProbability.forEach((p, i) => close(turned.limitingProbability[(i + 1) % 3]!, p))
  })
})

describe('special devices', () => {
  it('a single junction has no mismatch and limits with certainty', () => {
    const result = propagate([measured(band(310, 1120, 0.9))])
    expect(result.mismatch).toBeNull()
    expect(result.limitingProbability).toEqual([1])
  })

  it('two equal junctions with independent errors tie at one half, the order is not certain', () => {
    const same = measured(band(310, 770, 0.88), [component({ id: 'gain', correlatedBetweenJunctions: false })])
    const result = propagate([same, same])
    expect(result.limitingProbability).toEqual([0.5, 0.5])
    expect(result.mismatch).toMatchObject({ mismatchPercent: 0, orderCertain: false })
    expect(result.mismatch!.uncertaintyPercent).toBeCloseTo(Math.SQRT2, 10)
    expect(result.verdict.kind).toBe('matched-within-uncertainty')
  })

  it('without a budget has no uncertainty and says so with zeros', () => {
    const result = propagate(tandem(700, []))
    expect(result.currents.map((current) => current.uncertaintyMaCm2)).toEqual([0, 0])
    expect(result.components).toEqual([])
    expect(result.verdict).toMatchObject({ kind: 'limited', probability: 1 })
  })

  it('names the noise that it could not count', () => {
    const [top, bottom] = tandem() as [MeasuredJunction, MeasuredJunction]
    const result = propagate([top, { ...bottom, pointUncertainty: null }])
    expect(result.omitted).toEqual([
      {
        junction: 2,
        componentId: 'noise',
        reason: 'Junction 2 has neither repeat scans nor an uncertainty column; "noise" is not counted.',
      },
    ])
  })

  it.each<[string, () => unknown, string]>([
    ['no junctions', () => deviceErrors([], sun), 'device has at least one'],
    ['a dark junction', () => deviceErrors([measured(makeCurve([300, 400], [0, 0]))], sun), 'must be above zero'],
    [
      'a point uncertainty too few',
      () => deviceErrors([{ ...tandem()[0]!, pointUncertainty: new Float64Array(3) }], sun),
      'has 3 values for 300 points',
    ],
    [
      'a budget with a slip, at the place of the slip',
      () =>
        deviceErrors(
          [tandem()[0]!, measured(band(770, 1120, 0.9), [component({ id: 'x', degreesOfFreedom: -1 })])],
          sun,
        ),
      'degrees of freedom are -1',
    ],
    [
      'two distributions for one error',
      () =>
        deviceErrors(
          [
            measured(band(310, 770, 0.88), [component({ id: 'area' })]),
            measured(band(770, 1120, 0.88), [component({ id: 'area', distribution: 'rectangular' })]),
          ],
          sun,
        ),
      'state one distribution',
    ],
  ])('refuses %s', (_, run, words) => {
    expect(run).toThrow(DomainError)
    expect(run).toThrow(words)
  })
})

describe('laws', () => {
  it('u scales with the budget, and relative u does not depend on the scale of the sun', () => {
    const size = fc.double({ min: 0.01, max: 2, noNaN: true })
    fc.assert(
      fc.property(size, size, (percent, scale) => {
        const junctions = tandem(770, [
          component({ id: 'gain', uncertainty: { unit: 'percent', value: percent } }),
          pointwise(1),
        ])
        const bright = makeSpectrum({
          id: 'bright',
          name: 'Bright',
          curve: { ...sun.curve, values: sun.curve.values.map((e) => e * scale) },
        })
        const a = propagateDevice(deviceErrors(junctions, sun)).currents[0]!
        const b = propagateDevice(deviceErrors(junctions, bright)).currents[0]!
        expect(b.uncertaintyMaCm2 / b.currentMaCm2).toBeCloseTo(a.uncertaintyMaCm2 / a.currentMaCm2, 12)
        expect(a.uncertaintyMaCm2 / a.currentMaCm2).toBeGreaterThan(percent / 100)
      }),
      { seed: 31, numRuns: 20 },
    )
  })
})
