import { describe, expect, it } from 'vitest'
import { DomainError } from '../../../shared/physics/errors.js'
import {
  deviceErrors,
  minimumOfTwo,
  propagateDevice,
  runMonteCarlo,
  startMonteCarlo,
} from '../../../shared/physics/uncertainty/index.js'
import type {
  MeasuredJunction,
  MonteCarloOptions,
  MonteCarloResult,
} from '../../../shared/physics/uncertainty/index.js'
import { summarise } from '../../../shared/physics/uncertainty/sampleStatistics.js'
import { StandardDraws } from '../../../shared/physics/uncertainty/standardDraws.js'
import { band, component, measured, stripedSun, tandem } from './device.js'

const sun = stripedSun()
const run = (junctions: readonly MeasuredJunction[], options: MonteCarloOptions): MonteCarloResult =>
  runMonteCarlo(deviceErrors(junctions, sun), options)!

/** Sum of four streams, as in JCGM 101:2008, 9.2. */
function sumOfFour(fill: 'fillNormal' | 'fillRectangular', draws: number): Float64Array {
  const sum = new Float64Array(draws)
  const part = new Float64Array(draws)
  for (const name of ['a', 'b', 'c', 'd']) {
    new StandardDraws(2024, name)[fill](part, draws)
    for (let i = 0; i < draws; i++) sum[i]! += part[i]!
  }
  return sum
}

describe('draws', () => {
  it('are standard normal: four moments and the far tail', () => {
    const count = 1_000_000
    const z = new Float64Array(count)
    new StandardDraws(7, 'moments').fillNormal(z, count)
    const moment = (power: number): number => z.reduce((sum, value) => sum + value ** power, 0) / count
    expect(Math.abs(moment(1))).toBeLessThan(0.004) // 4 σ of each moment's own scatter
    expect(Math.abs(moment(2) - 1)).toBeLessThan(0.0057)
    expect(Math.abs(moment(3))).toBeLessThan(0.016)
    expect(Math.abs(moment(4) - 3)).toBeLessThan(0.04)
    const beyond = z.filter((value) => Math.abs(value) > 3.6541528853610088).length
    expect(Math.abs(beyond - 258)).toBeLessThan(65) // 2 (1 − Φ(3.654)) of a million = 258 ± 16
  })

  it('are the same for the same seed and name however they are asked for, and others for another name', () => {
    const all = new Float64Array(1000)
    new StandardDraws(3, 'x').fillNormal(all, 1000)
    const stream = new StandardDraws(3, 'x')
    const parts = [17, 400, 583].flatMap((size) => {
      const out = new Float64Array(size)
      stream.fillNormal(out, size)
      return [...out]
    })
    expect(parts).toEqual([...all])
    const other = new Float64Array(1000)
    new StandardDraws(3, 'y').fillNormal(other, 1000)
    expect(other[0]).not.toBe(all[0])
    expect(Math.abs(other.reduce((sum, value, i) => sum + value * all[i]!, 0) / 1000)).toBeLessThan(0.13)
  })

  it('reproduce JCGM 101:2008, 9.2.2: four normal inputs, u = 2.00, ±3.92', () => {
    const { uncertainty, interval95 } = summarise(sumOfFour('fillNormal', 400_000))
    expect(Math.abs(uncertainty - 2)).toBeLessThan(0.01)
    expect(Math.abs(interval95[0] + 3.92)).toBeLessThan(0.02)
    expect(Math.abs(interval95[1] - 3.92)).toBeLessThan(0.02)
  })

  it('reproduce JCGM 101:2008, 9.2.3: four rectangular inputs, u = 2.00, ±3.88', () => {
    const { uncertainty, interval95 } = summarise(sumOfFour('fillRectangular', 400_000))
    const exact = 2 * Math.sqrt(3) * (2 - 0.6 ** 0.25)
    expect(Math.abs(uncertainty - 2)).toBeLessThan(0.01)
    expect(Math.abs(interval95[0] + exact)).toBeLessThan(0.02)
    expect(Math.abs(interval95[1] - exact)).toBeLessThan(0.02)
  })
})

describe('summary of a sample', () => {
  it('takes the 25th and the 975th of 1000 values, whatever their order', () => {
    const values = Float64Array.from({ length: 1000 }, (_, i) => ((i * 387) % 1000) + 1)
    const summary = summarise(values)
    expect(summary.interval95).toEqual([25, 975])
    expect(summary.mean).toBeCloseTo(500.5, 10)
    expect(summary.uncertainty).toBeCloseTo(288.819, 3)
    expect(values[1]).toBe(388)
  })

  it('finds the ends of the interval also where they are not in a tail: nearly all values equal', () => {
    const values = Float64Array.from({ length: 1000 }, (_, i) => (i === 500 ? 1e6 : i === 501 ? -1 : 7))
    expect(summarise(values).interval95).toEqual([7, 7])
  })

  it('keeps ties and constants', () => {
    expect(summarise(new Float64Array(100).fill(4))).toEqual({ mean: 4, uncertainty: 0, interval95: [4, 4] })
  })
})

describe('Monte Carlo against the law of propagation', () => {
  it.each([
    ['a clearly mismatched tandem', tandem(720)],
    ['a nearly matched tandem', tandem(790)],
    ['three junctions', [band(310, 660, 0.85), band(660, 870, 0.9), band(870, 1190, 0.9)].map((eqe) => measured(eqe))],
  ])('agrees within 3 %% for u(J) and u(mismatch): %s', (_, junctions) => {
    const linear = propagateDevice(deviceErrors(junctions, sun))
    const drawn = run(junctions, { seed: 1, draws: 40_000 })
    linear.currents.forEach((current, i) => {
      expect(Math.abs(drawn.currents[i]!.uncertainty / current.uncertaintyMaCm2 - 1)).toBeLessThan(0.03)
      expect(Math.abs(drawn.currents[i]!.mean / current.currentMaCm2 - 1)).toBeLessThan(1e-3)
    })
    expect(Math.abs(drawn.mismatch!.uncertainty / linear.mismatch!.uncertaintyPercent - 1)).toBeLessThan(0.03)
    expect([drawn.mismatch!.higher, drawn.mismatch!.lower]).toEqual([linear.mismatch!.higher, linear.mismatch!.lower])
    linear.correlation.forEach((row, i) =>
      row.forEach((r, j) => expect(Math.abs(drawn.correlation[i]![j]! - r)).toBeLessThan(0.02)),
    )
    linear.limitingProbability.forEach((p, i) =>
      expect(Math.abs(drawn.limitingProbability[i]! - p)).toBeLessThan(0.015),
    )
  })

  it('draws every point with the same outcome as the exact sum of normal errors', () => {
    const noisy = tandem().map((junction) => ({ ...junction, pointUncertainty: junction.eqe.values.map(() => 0.05) }))
    const sum = run(noisy, { seed: 4, draws: 20_000 })
    const each = run(noisy, { seed: 4, draws: 20_000, drawEveryPoint: true })
    for (const i of [0, 1]) {
      expect(Math.abs(each.currents[i]!.uncertainty / sum.currents[i]!.uncertainty - 1)).toBeLessThan(0.03)
      expect(each.currents[i]!.mean).not.toBe(sum.currents[i]!.mean)
    }
  })

  it('draws rectangular point errors one by one: their sum has the right spread', () => {
    const noise = component({
      id: 'noise',
      uncertainty: { unit: 'percent', value: 5 },
      correlatedOverWavelength: false,
      correlatedBetweenJunctions: false,
      distribution: 'rectangular',
    })
    const junctions = tandem(770, [noise])
    const linear = propagateDevice(deviceErrors(junctions, sun))
    const drawn = run(junctions, { seed: 9 })
    expect(Math.abs(drawn.currents[0]!.uncertainty / linear.currents[0]!.uncertaintyMaCm2 - 1)).toBeLessThan(0.02)
  })
})

describe('what the draws say of the stack', () => {
  const gain = component({
    id: 'gain',
    correlatedBetweenJunctions: false,
    uncertainty: { unit: 'percent', value: 1.5 },
  })
  const same = measured(band(310, 770, 0.88), [gain])

  it('two equal independent junctions limit with probability 0.5 ± 0.01', () => {
    const result = run([same, same], { seed: 12 })
    expect(Math.abs(result.limitingProbability[0]! - 0.5)).toBeLessThan(0.01)
    expect(result.verdict.kind).toBe('matched-within-uncertainty')
  })

  it("the limiting current at a tie has Clark's mean and spread, below both estimates", () => {
    const [j] = deviceErrors([same], sun).currentsMaCm2 as [number]
    const clark = minimumOfTwo(j, 0.015 * j, j, 0.015 * j, 0)
    const { limitingCurrent } = run([same, same], { seed: 12 })
    expect(Math.abs(limitingCurrent.mean / clark.meanMaCm2 - 1)).toBeLessThan(5e-4)
    expect(Math.abs(limitingCurrent.uncertainty / clark.uncertaintyMaCm2 - 1)).toBeLessThan(0.02)
    expect(limitingCurrent.mean).toBeLessThan(0.995 * j)
  })

  it('the spread is never below zero while the signed mismatch at a tie is centred on it', () => {
    const { spread, mismatch } = run([same, same], { seed: 12 })
    expect(spread.interval95[0]).toBeGreaterThanOrEqual(0)
    expect(mismatch!.interval95[0]).toBeLessThan(-3)
    expect(Math.abs(mismatch!.mean)).toBeLessThan(0.1)
  })

  it('a common detector error leaves the mismatch untouched', () => {
    const detector = component({ id: 'detector', uncertainty: { unit: 'percent', value: 2 } })
    const result = run(tandem(740, [detector]), { seed: 2 })
    expect(result.currents[0]!.uncertainty / result.currents[0]!.mean).toBeCloseTo(0.02, 3)
    expect(result.mismatch!.uncertainty).toBeLessThan(1e-10)
    expect(result.correlation[0]![1]).toBeCloseTo(1, 10)
  })

  it('junctions that are always equal share the probability', () => {
    const shared = measured(band(310, 770, 0.88), [component({ id: 'area' })])
    expect(run([shared, shared], { seed: 1, draws: 1000 }).limitingProbability).toEqual([0.5, 0.5])
  })
})

describe('a run', () => {
  const errors = deviceErrors(tandem(), sun)

  it('gives the same result to the last bit for the same seed, and another for another', () => {
    const once = JSON.stringify(runMonteCarlo(errors, { seed: 77, draws: 5000 }))
    expect(JSON.stringify(runMonteCarlo(errors, { seed: 77, draws: 5000 }))).toBe(once)
    expect(JSON.stringify(runMonteCarlo(errors, { seed: 78, draws: 5000 }))).not.toBe(once)
  })

  it.each([false, true])('does not depend on how it is cut into pieces (every point drawn: %s)', (drawEveryPoint) => {
    const options = { seed: 5, draws: 3001, drawEveryPoint }
    const whole = runMonteCarlo(errors, options)
    const pieces = startMonteCarlo(errors, options)
    for (const piece of [1, 700, 13, 2000, 5000]) pieces.advance(piece)
    expect(pieces.done).toBe(3001)
    expect(pieces.result()).toEqual(whole)
  })

  it('a further component does not change the draws of the others', () => {
    const extra = component({ id: 'extra', uncertainty: { unit: 'percent', value: 1e-9 } })
    const without = run(tandem(), { seed: 6, draws: 2000 })
    const more = tandem().map((junction) => ({ ...junction, components: [extra, ...junction.components] }))
    expect(run(more, { seed: 6, draws: 2000 }).currents[0]!.interval95[0]).toBeCloseTo(
      without.currents[0]!.interval95[0],
      8,
    )
  })

  it('reports its progress and ends at the whole', () => {
    const reports: number[] = []
    runMonteCarlo(errors, { seed: 1, draws: 1200 }, { onProgress: (done, total) => reports.push(done / total) })
    expect(reports).toEqual([500 / 1200, 1000 / 1200, 1])
  })

  it('stops when told to, with nothing in hand', () => {
    let asked = 0
    const result = runMonteCarlo(errors, { seed: 1, draws: 10_000 }, { shouldStop: () => ++asked > 3 })
    expect(result).toBeNull()
    expect(asked).toBe(4)
  })

  it.each([
    ['too few draws', { seed: 1, draws: 10 }, 'draws'],
    ['half a draw', { seed: 1, draws: 2000.5 }, 'draws'],
    ['a seed that is no whole number', { seed: 0.5 }, 'seed'],
    ['NaN draws', { seed: 1, draws: NaN }, 'draws'],
  ])('refuses %s', (_, options, argument) => {
    expect(() => startMonteCarlo(errors, options)).toThrow(expect.objectContaining({ argument }))
  })

  it('has no result before its last draw', () => {
    const started = startMonteCarlo(errors, { seed: 1 })
    started.advance(100)
    expect(() => started.result()).toThrow(DomainError)
    expect(() => started.result()).toThrow('100 of 20000')
  })
})
