import { assertCurve, rangeNm, valueAt } from './curve.js'
import type { Curve } from './curve.js'
import { DomainError } from './errors.js'
import { integrateProduct } from './integration.js'
import type { Spectrum } from './spectrum.js'

/** Where the account of the losses begins, nm. */
export const LOSS_BUDGET_FROM_NM = 300
/** A junction's response ends where its EQE falls below this for good. */
const EDGE_RESPONSE = 0.02
/** Below zero by less than this is rounding, not a contradiction of the measurements. */
const ROUNDING = 1e-9

/** A part of the spectrum that the account is split by. */
export interface LossBand {
  readonly name: string
  readonly fromNm: number
  readonly toNm: number
}

/** Where the light of one range goes, mA cm⁻². The parts add up to `totalMaCm2`. */
export interface LossAccount {
  /** Every photon of the range turned into current. */
  readonly totalMaCm2: number
  /** One a junction, from the sunward side. */
  readonly junctionsMaCm2: readonly number[]
  /** Null without a measured reflectance. */
  readonly reflectionMaCm2: number | null
  /**
   * With reflectance: parasitic absorption, transmission and lost carriers, `1 − R − ΣEQE`. Without: everything that
   * no junction delivers, `1 − ΣEQE`. Negative where the measurements contradict each other; it is not cut off.
   */
  readonly remainderMaCm2: number
}

/** The same as curves over wavelength, to be stacked: at every wavelength they add up to 1. */
export interface LossCurves {
  readonly wavelengthNm: Float64Array
  readonly junctions: readonly Float64Array[]
  readonly reflection: Float64Array | null
  readonly remainder: Float64Array
}

/** Everything the account says. */
export interface LossBudget {
  readonly fromNm: number
  readonly toNm: number
  readonly whole: LossAccount
  readonly bands: readonly (LossBand & LossAccount)[]
  readonly curves: LossCurves
  /** Parts of the range without measured reflectance, nm; what is reflected there is counted in the remainder. */
  readonly withoutReflectanceNm: readonly (readonly [number, number])[]
  /** Wavelengths of `curves` at which ΣEQE + R exceeds 1, first and last; null when nowhere. */
  readonly aboveOneNm: readonly [number, number] | null
}

/** What the account is made of. */
export interface LossBudgetInput {
  /** EQE of each junction, fraction, from the sunward side; zero outside its scan. */
  readonly junctions: readonly Curve[]
  /** Reflectance, fraction; null when it was not measured. */
  readonly reflectance: Curve | null
  readonly spectrum: Spectrum
  /** Default: `defaultLossBands` of the range. Bands may leave gaps but not overlap. */
  readonly bands?: readonly LossBand[]
  /** Default 300 nm. */
  readonly fromNm?: number
  /** Default: `lastEdgeNm` of the junctions. */
  readonly toNm?: number
}

/**
 * Loss budget of a device: `J_total = Σ J_i + J_R + J_rest` between 300 nm and the last junction's edge, each term
 * `q ∫ f φ dλ` with f = EQE_i, R, `1 − R − ΣEQE`, integrated exactly for curves that are linear between their points
 * (the current is linear in f, so the last term is the difference of the others and the sum holds to rounding).
 *
 * @throws DomainError for curves that are not valid, no junction, a range that is empty or reaches beyond the spectrum,
 * or bands that are reversed, overlap or leave the range. Cost O(bands · (points + spectrum)).
 */
export function lossBudget(input: LossBudgetInput): LossBudget {
  const { junctions, reflectance, spectrum } = input
  if (junctions.length === 0) throw new DomainError('junctions', 'junctions is empty; a device has at least one.')
  junctions.forEach((eqe, i) => assertCurve(eqe, `junctions[${i}]`))
  if (reflectance) assertCurve(reflectance, 'reflectance')
  const fromNm = input.fromNm ?? LOSS_BUDGET_FROM_NM
  const toNm = input.toNm ?? lastEdgeNm(junctions)
  assertRange(fromNm, toNm, spectrum)
  const bands = input.bands ?? defaultLossBands(fromNm, toNm)
  assertBands(bands, fromNm, toNm)
  const curves = lossCurves(junctions, reflectance, fromNm, toNm)
  return {
    fromNm,
    toNm,
    whole: account(input, fromNm, toNm),
    bands: bands.map((band) => ({ ...band, ...account(input, band.fromNm, band.toNm) })),
    curves,
    withoutReflectanceNm: reflectance ? uncovered(reflectance, fromNm, toNm) : [[fromNm, toNm]],
    aboveOneNm: aboveOne(curves),
  }
}

/**
 * The last junction's long-wavelength edge: where the EQE of any junction last falls through 0.02 (linear between
 * points), or the end of a scan that ends above. @throws DomainError when no EQE reaches 0.02.
 */
export function lastEdgeNm(junctions: readonly Curve[]): number {
  const edges = junctions.map(({ wavelengthNm: x, values: y }) => {
    for (let k = y.length - 1; k >= 0; k--) {
      if (!(y[k]! >= EDGE_RESPONSE)) continue
      if (k === y.length - 1) return x[k]!
      return x[k]! + ((x[k + 1]! - x[k]!) * (y[k]! - EDGE_RESPONSE)) / (y[k]! - y[k + 1]!)
    }
    return 0
  })
  const edge = Math.max(0, ...edges)
  if (edge === 0) throw new DomainError('junctions', `No junction has an EQE of ${EDGE_RESPONSE} or more anywhere.`)
  return edge
}

/** Bands to start from: 300–400 nm and then every 200 nm to the end of the range. */
export function defaultLossBands(fromNm: number, toNm: number): LossBand[] {
  const cuts = [400, 600, 800, 1000, 1200, 1400, 1600, 1800].filter((nm) => nm > fromNm && nm < toNm)
  const ends = [...cuts, toNm]
  return ends.map((end, i) => {
    const start = i === 0 ? fromNm : ends[i - 1]!
    return { name: `${Math.round(start)}–${Math.round(end)} nm`, fromNm: start, toNm: end }
  })
}

function account({ junctions, reflectance, spectrum }: LossBudgetInput, fromNm: number, toNm: number): LossAccount {
  const current = (curve: Curve): number => integrateProduct(curve, spectrum.photonCurrent, fromNm, toNm)
  const totalMaCm2 = current({ wavelengthNm: Float64Array.of(fromNm, toNm), values: Float64Array.of(1, 1) })
  const junctionsMaCm2 = junctions.map(current)
  const reflectionMaCm2 = reflectance && current(reflectance)
  const accounted = junctionsMaCm2.reduce((sum, part) => sum + part, reflectionMaCm2 ?? 0)
  return { totalMaCm2, junctionsMaCm2, reflectionMaCm2, remainderMaCm2: totalMaCm2 - accounted }
}

/** Curves on the union of all grids within the range. A scan's end is a step; its last point still counts as measured. */
function lossCurves(junctions: readonly Curve[], reflectance: Curve | null, fromNm: number, toNm: number): LossCurves {
  const grids = [...junctions, ...(reflectance ? [reflectance] : [])].flatMap((curve) => [...curve.wavelengthNm])
  const inside = grids.filter((nm) => nm > fromNm && nm < toNm)
  const wavelengthNm = Float64Array.from(new Set([fromNm, ...inside, toNm])).sort()
  const sample = (curve: Curve): Float64Array => wavelengthNm.map((nm) => valueAt(curve, nm))
  const parts = junctions.map(sample)
  const reflection = reflectance && sample(reflectance)
  const remainder = wavelengthNm.map((_, k) =>
    parts.reduce((rest, part) => rest - part[k]!, 1 - (reflection?.[k] ?? 0)),
  )
  return { wavelengthNm, junctions: parts, reflection, remainder }
}

function uncovered(reflectance: Curve, fromNm: number, toNm: number): [number, number][] {
  const [first, last] = rangeNm(reflectance)
  const gaps: [number, number][] = [
    [fromNm, Math.min(first, toNm)],
    [Math.max(last, fromNm), toNm],
  ]
  return gaps.filter(([start, end]) => end > start)
}

function aboveOne({ wavelengthNm, remainder }: LossCurves): [number, number] | null {
  const negative = wavelengthNm.filter((_, k) => remainder[k]! < -ROUNDING)
  return negative.length === 0 ? null : [negative[0]!, negative[negative.length - 1]!]
}

function assertRange(fromNm: number, toNm: number, spectrum: Spectrum): void {
  if (!(toNm > fromNm))
    throw new DomainError('toNm', `The range ends at ${toNm} nm, which is not beyond its start at ${fromNm} nm.`)
  const [first, last] = rangeNm(spectrum.curve)
  if (!(fromNm >= first && toNm <= last))
    throw new DomainError(
      'spectrum',
      `The spectrum covers ${first} to ${last} nm and the loss budget needs ${fromNm} to ${toNm} nm.`,
    )
}

function assertBands(bands: readonly LossBand[], fromNm: number, toNm: number): void {
  const sorted = bands.map((band, index) => ({ band, index })).sort((a, b) => a.band.fromNm - b.band.fromNm)
  sorted.forEach(({ band, index }, place) => {
    if (!(band.toNm > band.fromNm))
      throw new DomainError(
        `bands[${index}]`,
        `Band "${band.name}" runs from ${band.fromNm} to ${band.toNm} nm; its end must lie beyond its start.`,
      )
    if (!(band.fromNm >= fromNm && band.toNm <= toNm))
      throw new DomainError(
        `bands[${index}]`,
        `Band "${band.name}" (${band.fromNm} to ${band.toNm} nm) leaves the range of ${fromNm} to ${toNm} nm.`,
      )
    const before = sorted[place - 1]?.band
    if (before && band.fromNm < before.toNm)
      throw new DomainError(
        `bands[${index}]`,
        `Bands "${before.name}" and "${band.name}" overlap below ${before.toNm} nm; light would count twice.`,
      )
  })
}
