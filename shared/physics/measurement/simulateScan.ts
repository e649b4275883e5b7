import { makeCurve, valueAt, type Curve } from '../curve.js'
import { assertNotNegative, DomainError } from '../errors.js'
import type { JunctionDiode } from '../diode/junction.js'
import type { SeriesStack } from '../diode/stack.js'
import { seededRandom } from '../numerics/random.js'
import { biasPhotocurrents, type BiasSource } from './biasLight.js'
import { apparentEqe, smallSignal, type SmallSignal } from './smallSignal.js'

/** A stack of which everything is known. */
export interface KnownStack {
  /** True EQE of each junction, from the sunward side. */
  readonly eqes: readonly Curve[]
  readonly diodes: readonly JunctionDiode[]
  readonly seriesResistanceKohmCm2?: number
  readonly couplingToNext?: readonly number[]
  readonly temperatureK: number
}

/** How one scan is taken of it, and what goes wrong on the way. */
export interface SimulatedConditions {
  readonly wavelengthNm: ArrayLike<number>
  readonly biasLight: readonly BiasSource[]
  readonly biasVoltageV: number
  /** Standard deviation of the noise of each point, EQE fraction. Default 0. */
  readonly noise?: number
  /** Further noise in proportion to the signal. Default 0. */
  readonly relativeNoise?: number
  readonly seed?: number
  /** A wrong calibration or area: multiplies the whole scan. Default 1. */
  readonly scale?: number
  /** Share of the response at λ/2 that is added at λ. Default 0. */
  readonly secondOrderShare?: number
  /** Order-sorting filters: from `atNm` on, no light below it passes, and the scan is multiplied by `factor`. */
  readonly filters?: readonly { readonly atNm: number; readonly factor?: number }[]
  /** Lock-in phase: at the first point, and how far it has turned at the last, degrees. Default no phase. */
  readonly phase?: { readonly startDeg: number; readonly turnDeg: number }
}

export interface SimulatedScan {
  readonly scan: Curve
  /** Standard uncertainty of each point, where noise was asked for. */
  readonly noise?: Float64Array
  /** In-phase and quadrature part, where a phase was asked for, in units of EQE. */
  readonly inPhase?: Float64Array
  readonly quadrature?: Float64Array
  /** The truth behind the scan. */
  readonly truth: SmallSignal & { readonly biasPhotocurrentsMaCm2: number[] }
}

/** The illuminated stack that the bias light makes of a known stack. */
export function stackUnderBias(stack: KnownStack, biasLight: readonly BiasSource[]): SeriesStack {
  if (stack.diodes.length !== stack.eqes.length)
    throw new DomainError(
      'stack.diodes',
      `There are ${stack.diodes.length} diodes for ${stack.eqes.length} junctions; each junction needs one.`,
    )
  const currents = biasPhotocurrents(stack.eqes, biasLight)
  return {
    junctions: stack.diodes.map((diode, i) => ({ diode, photocurrentMaCm2: currents[i]! })),
    temperatureK: stack.temperatureK,
    ...(stack.seriesResistanceKohmCm2 !== undefined && { seriesResistanceKohmCm2: stack.seriesResistanceKohmCm2 }),
    ...(stack.couplingToNext && { couplingToNext: stack.couplingToNext }),
  }
}

/**
 * The scan that an instrument would write down: the small-signal response of the full circuit under bias light and
 * voltage, then filters, second order, scale and seeded noise. Which junction it shows follows from the conditions.
 * The probe is taken as weak: it moves no operating point.
 * @throws DomainError for a stack or condition outside its domain. Cost: one solution of the circuit, n points.
 */
export function simulateScan(stack: KnownStack, conditions: SimulatedConditions): SimulatedScan {
  const biased = stackUnderBias(stack, conditions.biasLight)
  const truth = smallSignal(biased, conditions.biasVoltageV)
  const clean = apparentEqe(stack.eqes, truth.selectivities, conditions.wavelengthNm)
  const { wavelengthNm } = clean
  const noise = conditions.noise ?? 0
  const relativeNoise = conditions.relativeNoise ?? 0
  const secondOrderShare = conditions.secondOrderShare ?? 0
  assertNotNegative(noise, 'noise')
  assertNotNegative(relativeNoise, 'relativeNoise')
  assertNotNegative(secondOrderShare, 'secondOrderShare')
  const filters = conditions.filters ?? []
  const random = seededRandom(conditions.seed ?? 1)
  const half = secondOrderShare > 0 ? halfWavelengthResponse(stack.eqes, truth.selectivities, wavelengthNm) : null
  const u = new Float64Array(wavelengthNm.length)
  const values = clean.values.map((value, i) => {
    const nm = wavelengthNm[i]!
    const isSorted = filters.some((f) => f.atNm <= nm && f.atNm > nm / 2)
    let signal = value + (half && !isSorted ? secondOrderShare * half[i]! : 0)
    for (const filter of filters) if (nm >= filter.atNm) signal *= filter.factor ?? 1
    signal *= conditions.scale ?? 1
    u[i] = Math.hypot(noise, relativeNoise * signal)
    return signal + u[i]! * random.normal()
  })
  return {
    scan: makeCurve(wavelengthNm, values),
    truth: { ...truth, biasPhotocurrentsMaCm2: biased.junctions.map((j) => j.photocurrentMaCm2) },
    ...(u.some((x) => x > 0) && { noise: u }),
    ...(conditions.phase && turned(values, u, conditions.phase, random.normal)),
  }
}

function halfWavelengthResponse(
  eqes: readonly Curve[],
  selectivities: readonly number[],
  wavelengthNm: Float64Array,
): Float64Array {
  return wavelengthNm.map((nm) => eqes.reduce((sum, eqe, i) => sum + selectivities[i]! * valueAt(eqe, nm / 2), 0))
}

function turned(
  values: Float64Array,
  u: Float64Array,
  phase: { readonly startDeg: number; readonly turnDeg: number },
  normal: () => number,
): { inPhase: Float64Array; quadrature: Float64Array } {
  const angle = values.map(
    (_, i) => ((phase.startDeg + (phase.turnDeg * i) / Math.max(1, values.length - 1)) * Math.PI) / 180,
  )
  const across = u.map((x) => x * normal())
  return {
    inPhase: values.map((r, i) => r * Math.cos(angle[i]!) - across[i]! * Math.sin(angle[i]!)),
    quadrature: values.map((r, i) => r * Math.sin(angle[i]!) + across[i]! * Math.cos(angle[i]!)),
  }
}
