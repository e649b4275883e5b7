import { assertWithin, DomainError } from '../errors.js'
import type { DeviceErrors, ErrorEffect, ErrorSource, OmittedComponent } from './errorSources.js'
import { rootSumOfSquares } from './errorSources.js'
import { limitingVerdict } from './limitingProbability.js'
import type { LimitingVerdict } from './limitingProbability.js'
import { pairMismatches, standardEffects, widestPair } from './propagation.js'
import { sampleCorrelation, summarise } from './sampleStatistics.js'
import type { SampleSummary } from './sampleStatistics.js'
import { shiftTable, tabulatedCurrent } from './shiftTable.js'
import type { ShiftTable } from './shiftTable.js'
import { StandardDraws } from './standardDraws.js'

/** Draws when nothing else is said. */
export const DEFAULT_DRAWS = 20_000
const FEWEST_DRAWS = 1000
const MOST_DRAWS = 5_000_000
/** Draws done at a stretch; small enough to stay in the cache and to be stopped between. */
const CHUNK = 500
/** How far the offset table reaches, in sums of the offsets' standard uncertainties. */
const TABLE_REACH = 6

/** What a run needs beside the errors. */
export interface MonteCarloOptions {
  /** Whole number; the same seed, errors and draws give the same result to the last bit. */
  readonly seed: number
  /** 1000 … 5 000 000; default 20 000. */
  readonly draws?: number
  /**
   * Draw the error of every point instead of their weighted sum. Normal point errors add up to a normal error of the
   * current exactly, so the default draws that sum; both give the same distribution. Rectangular ones are always
   * drawn one by one.
   */
  readonly drawEveryPoint?: boolean
}

/** How a run tells of itself and is stopped; both are called between chunks of 500 draws. */
export interface MonteCarloControl {
  readonly onProgress?: (done: number, total: number) => void
  readonly shouldStop?: () => boolean
}

/** Result of a Monte Carlo run; currents in mA cm⁻², mismatch in percent. */
export interface MonteCarloResult {
  readonly draws: number
  readonly seed: number
  readonly currents: readonly SampleSummary[]
  /** Smallest current of each draw: below the smallest estimate when junctions are nearly matched. */
  readonly limitingCurrent: SampleSummary
  readonly correlation: readonly (readonly number[])[]
  /** `J_higher/J_lower − 1` of the pair that the estimates name (1 = sunward); may go below zero. Null for one junction. */
  readonly mismatch: (SampleSummary & { readonly higher: number; readonly lower: number }) | null
  /** `(J_max − J_min)/J_min` of each draw, never below zero. */
  readonly spread: SampleSummary
  /** Share of draws in which each junction had the smallest current; draws that tie are split. */
  readonly limitingProbability: readonly number[]
  readonly verdict: LimitingVerdict
  readonly omitted: readonly OmittedComponent[]
}

/** A run that its caller drives: a worker advances it, reports, looks for messages, and advances again. */
export interface MonteCarloRun {
  readonly draws: number
  readonly done: number
  /** Does up to `draws` further draws. How they are cut up does not change the result. */
  advance(draws: number): void
  /** @throws DomainError while draws are still missing. */
  result(): MonteCarloResult
}

/**
 * Propagation of distributions (JCGM 101:2008, 7) through `J_i = Π(1 + r_s z_s) · (J_i(δ_i) + Σ b_s z_s + Σ_k w_k u_k z_k)`:
 * relative errors multiply; the curve is moved by the sum δ of the wavelength offsets and integrated again (from a
 * table that is exact at its nodes, see `shiftTable`); changes of shape and point noise enter by the quadrature weights
 * of the unmoved curve, in which J is linear (their product with the offset is of second order and is left out). Each
 * error has its own stream of numbers named after it, so that a further component does not change the draws of the
 * others. Degrees of freedom are not used: standard uncertainties are taken as known (no t-distributions, 6.4.9).
 *
 * @throws DomainError when `draws` or `seed` is not a whole number in range.
 */
export function startMonteCarlo(errors: DeviceErrors, options: MonteCarloOptions): MonteCarloRun {
  const draws = options.draws ?? DEFAULT_DRAWS
  assertWithin(draws, FEWEST_DRAWS, MOST_DRAWS, 'draws')
  if (!Number.isInteger(draws)) throw new DomainError('draws', `draws is ${draws}; it must be a whole number.`)
  if (!Number.isSafeInteger(options.seed))
    throw new DomainError('seed', `seed is ${options.seed}; it must be a whole number.`)
  const count = errors.currentsMaCm2.length
  const samples = Array.from({ length: count }, () => new Float64Array(draws))
  const streams = errors.sources.map((source) => new ErrorStream(source, options))
  const tables = errors.currentsMaCm2.map((_, i) => offsetTable(errors, i))
  const work = Array.from({ length: count }, () => new JunctionWork())
  let done = 0
  return {
    draws,
    get done() {
      return done
    },
    advance(further) {
      const end = Math.min(draws, done + Math.max(0, Math.floor(further)))
      while (done < end) {
        const size = Math.min(CHUNK, end - done)
        for (const junction of work) junction.reset(size)
        for (const stream of streams) stream.apply(work, size)
        for (let i = 0; i < count; i++) work[i]!.currents(errors.currentsMaCm2[i]!, tables[i]!, samples[i]!, done, size)
        done += size
      }
    },
    result() {
      if (done < draws)
        throw new DomainError('draws', `Only ${done} of ${draws} draws are done; advance the run first.`)
      return evaluate(errors, samples, options.seed)
    },
  }
}

/**
 * The whole run at once. @returns null when `shouldStop` said so: part of a sample is no result.
 * Cost: 20 000 draws of two junctions take some milliseconds, about 0.1 s with `drawEveryPoint` at 300 points.
 */
export function runMonteCarlo(
  errors: DeviceErrors,
  options: MonteCarloOptions,
  control: MonteCarloControl = {},
): MonteCarloResult | null {
  const run = startMonteCarlo(errors, options)
  while (run.done < run.draws) {
    if (control.shouldStop?.()) return null
    run.advance(CHUNK)
    control.onProgress?.(run.done, run.draws)
  }
  return run.result()
}

/** Sums of the errors that reach one junction, draw by draw, for one chunk. */
class JunctionWork {
  readonly factor = new Float64Array(CHUNK)
  readonly added = new Float64Array(CHUNK)
  readonly offsetNm = new Float64Array(CHUNK)

  reset(size: number): void {
    this.factor.fill(1, 0, size)
    this.added.fill(0, 0, size)
    this.offsetNm.fill(0, 0, size)
  }

  currents(estimate: number, table: ShiftTable | null, out: Float64Array, start: number, size: number): void {
    const { factor, added, offsetNm } = this
    for (let d = 0; d < size; d++) {
      const moved = table === null ? estimate : tabulatedCurrent(table, offsetNm[d]!)
      out[start + d] = factor[d]! * (moved + added[d]!)
    }
  }
}

/** The draws of one error source and what they do. */
class ErrorStream {
  private readonly stream: StandardDraws
  private readonly z = new Float64Array(CHUNK)
  private readonly points: Float64Array

  constructor(
    private readonly source: ErrorSource,
    options: MonteCarloOptions,
  ) {
    this.stream = new StandardDraws(options.seed, source.key)
    const effect = source.effects.find((candidate) => candidate?.type === 'points')
    const oneByOne = options.drawEveryPoint === true || source.distribution === 'rectangular'
    this.points = new Float64Array(effect?.type === 'points' && oneByOne ? effect.pointsMaCm2.length : 0)
  }

  apply(work: readonly JunctionWork[], size: number): void {
    if (this.points.length === 0) this.fill(this.z, size)
    this.source.effects.forEach((effect, i) => {
      if (effect !== null) this.applyTo(effect, work[i]!, size)
    })
  }

  private fill(out: Float64Array, size: number): void {
    if (this.source.distribution === 'normal') this.stream.fillNormal(out, size)
    else this.stream.fillRectangular(out, size)
  }

  private applyTo(effect: ErrorEffect, work: JunctionWork, size: number): void {
    const { z } = this
    switch (effect.type) {
      case 'scale':
        for (let d = 0; d < size; d++) work.factor[d]! *= 1 + effect.relative * z[d]!
        return
      case 'shift':
        addScaled(work.offsetNm, z, effect.nm, size)
        return
      case 'shape':
        addScaled(work.added, z, effect.currentMaCm2, size)
        return
      case 'points':
        if (this.points.length === 0) addScaled(work.added, z, rootSumOfSquares(effect.pointsMaCm2), size)
        else this.addPoints(effect.pointsMaCm2, work.added, size)
    }
  }

  private addPoints(pointsMaCm2: Float64Array, added: Float64Array, size: number): void {
    const { points } = this
    for (let d = 0; d < size; d++) {
      this.fill(points, points.length)
      added[d]! += scalarProduct(pointsMaCm2, points)
    }
  }
}

/** `Σ a_k b_k` in four interleaved sums, so that one addition need not wait for the one before it. */
function scalarProduct(a: Float64Array, b: Float64Array): number {
  let first = 0
  let second = 0
  let third = 0
  let fourth = 0
  let k = 0
  for (; k + 3 < a.length; k += 4) {
    first += a[k]! * b[k]!
    second += a[k + 1]! * b[k + 1]!
    third += a[k + 2]! * b[k + 2]!
    fourth += a[k + 3]! * b[k + 3]!
  }
  for (; k < a.length; k++) first += a[k]! * b[k]!
  return first + second + (third + fourth)
}

function addScaled(out: Float64Array, z: Float64Array, scale: number, size: number): void {
  for (let d = 0; d < size; d++) out[d]! += scale * z[d]!
}

function offsetTable(errors: DeviceErrors, junction: number): ShiftTable | null {
  let sumNm = 0
  for (const { effects } of errors.sources) {
    const effect = effects[junction]
    if (effect?.type === 'shift') sumNm += Math.abs(effect.nm)
  }
  return sumNm > 0 ? shiftTable(errors, junction, TABLE_REACH * sumNm) : null
}

function evaluate(errors: DeviceErrors, samples: readonly Float64Array[], seed: number): MonteCarloResult {
  const draws = samples[0]!.length
  const pair = widestPair(
    pairMismatches(
      errors.currentsMaCm2,
      errors.sources.map((source) => standardEffects(errors, source)),
    ),
  )
  const least = new Float64Array(draws)
  const spread = new Float64Array(draws)
  const limits = new Array<number>(samples.length).fill(0)
  for (let d = 0; d < draws; d++) {
    let low = samples[0]![d]!
    let high = low
    let lowest = 0
    let ties = 1
    for (let i = 1; i < samples.length; i++) {
      const current = samples[i]![d]!
      if (current === low) ties++
      else if (current < low) {
        low = current
        lowest = i
        ties = 1
      }
      if (current > high) high = current
    }
    least[d] = low
    spread[d] = (100 * (high - low)) / low
    if (ties === 1) limits[lowest]!++
    else samples.forEach((sample, i) => (limits[i]! += sample[d] === low ? 1 / ties : 0))
  }
  const limitingProbability = limits.map((share) => share / draws)
  return {
    draws,
    seed,
    currents: samples.map(summarise),
    limitingCurrent: summarise(least),
    correlation: sampleCorrelation(samples),
    mismatch: pair && {
      ...summarise(ratioPercent(samples[pair.higher - 1]!, samples[pair.lower - 1]!)),
      higher: pair.higher,
      lower: pair.lower,
    },
    spread: summarise(spread),
    limitingProbability,
    verdict: limitingVerdict(limitingProbability),
    omitted: errors.omitted,
  }
}

function ratioPercent(upper: Float64Array, lower: Float64Array): Float64Array {
  return upper.map((value, d) => 100 * (value / lower[d]! - 1))
}
