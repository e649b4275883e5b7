import { assertCurve } from '../curve.js'
import type { Curve } from '../curve.js'
import { DomainError } from '../errors.js'
import type { Spectrum } from '../spectrum.js'
import type { BudgetComponent, ComponentKind, ErrorDistribution, StandardUncertainty } from './budget.js'
import { assertBudget } from './budgetProblems.js'
import { currentWeights, uncheckedCurrentWeights, weightedSum } from './currentWeights.js'

/** One junction of a device with the scan that measured it and the budget that applies to that scan. */
export interface MeasuredJunction {
  /** External quantum efficiency, fraction; zero outside the scan. */
  readonly eqe: Curve
  /** Standard uncertainty of each point of `eqe` (k = 1, in EQE) from repeat scans or the file; null when unknown. */
  readonly pointUncertainty: Float64Array | null
  readonly components: readonly BudgetComponent[]
}

/** What one standard deviation of an error does to the current of one junction. */
export type ErrorEffect =
  /** J is multiplied by 1 + relative. */
  | { readonly type: 'scale'; readonly relative: number }
  /** The curve moves by `nm` towards longer wavelengths. */
  | { readonly type: 'shift'; readonly nm: number }
  /** J changes by `currentMaCm2`: a change of the curve's shape, weighted by the spectrum. */
  | { readonly type: 'shape'; readonly currentMaCm2: number }
  /** Every point errs by itself; `pointsMaCm2[k] = w_k u_k` is what point k does to J. */
  | { readonly type: 'points'; readonly pointsMaCm2: Float64Array }

/** One independent error of the measurement: a variable of mean 0 and standard deviation 1 and its effects. */
export interface ErrorSource {
  /** Stable name of the variable; seeds its stream of random numbers. */
  readonly key: string
  readonly componentId: string
  readonly kind: ComponentKind
  readonly distribution: ErrorDistribution
  /** Infinity when the component states none. */
  readonly degreesOfFreedom: number
  /** One entry a junction; null where the error does not reach it. */
  readonly effects: readonly (ErrorEffect | null)[]
}

/** A component that could not be applied to a junction, and why. It is reported beside the result, never hidden. */
export interface OmittedComponent {
  /** 1 = sunward. */
  readonly junction: number
  readonly componentId: string
  readonly reason: string
}

/** The one description of a device's errors from which propagation and Monte Carlo both start. */
export interface DeviceErrors {
  readonly irradiance: Curve
  readonly eqe: readonly Curve[]
  /** `weights[i]` makes `J_i = Σ w_k EQE_k`, mA cm⁻². */
  readonly weights: readonly Float64Array[]
  readonly currentsMaCm2: readonly number[]
  readonly sources: readonly ErrorSource[]
  readonly omitted: readonly OmittedComponent[]
}

/**
 * Turns measured junctions and their budgets into independent errors. Components of the same id are one error for the
 * junctions that share it (`correlatedBetweenJunctions`), and separate errors for the others. Components of size zero
 * vanish; a `column` component of a scan without one is listed in `omitted`.
 *
 * @param junctions from the sunward side, n ≥ 1. @param spectrum under which they are compared.
 * @throws DomainError when a curve or a budget is not valid, the point uncertainties have another length than the scan
 * or are negative, a current is not above zero, or junctions that share an error state different distributions for it.
 * Cost O(junctions · (points of EQE + points of spectrum)).
 */
export function deviceErrors(junctions: readonly MeasuredJunction[], spectrum: Spectrum): DeviceErrors {
  const irradiance = spectrum.curve
  if (junctions.length === 0) throw new DomainError('junctions', 'junctions is empty; a device has at least one.')
  junctions.forEach(assertJunction)
  const weights = junctions.map(({ eqe }) => currentWeights(eqe.wavelengthNm, irradiance))
  const currents = junctions.map(({ eqe }, i) => weightedSum(weights[i]!, eqe.values))
  currents.forEach((current, i) => {
    if (!(current > 0))
      throw new DomainError(
        `junctions[${i}].eqe`,
        `Junction ${i + 1} has a current of ${current} mA/cm² under this spectrum; it must be above zero.`,
      )
  })
  const omitted: OmittedComponent[] = []
  const sources = new Map<string, ErrorSource & { effects: (ErrorEffect | null)[] }>()
  junctions.forEach((junction, i) => {
    for (const component of junction.components) {
      if (component.uncertainty.unit === 'column' && junction.pointUncertainty === null) {
        const reason = `Junction ${i + 1} has neither repeat scans nor an uncertainty column; "${component.label}" is not counted.`
        omitted.push({ junction: i + 1, componentId: component.id, reason })
        continue
      }
      const effect = effectOf(component, junction, weights[i]!)
      if (effect === null) continue
      const key = sourceKey(component, i)
      const source = sources.get(key) ?? newSource(key, component, junctions.length)
      assertSameDistribution(source, component, i)
      source.effects[i] = effect
      sources.set(key, { ...source, degreesOfFreedom: Math.min(source.degreesOfFreedom, freedomOf(component)) })
    }
  })
  return {
    irradiance,
    eqe: junctions.map(({ eqe }) => eqe),
    weights,
    currentsMaCm2: currents,
    sources: [...sources.values()],
    omitted,
  }
}

/** J of one junction with its curve moved by `shiftNm` towards longer wavelengths, mA cm⁻²; exact, O(n + m). */
export function shiftedCurrent(errors: DeviceErrors, junction: number, shiftNm: number): number {
  const eqe = errors.eqe[junction]!
  return weightedSum(uncheckedCurrentWeights(eqe.wavelengthNm, errors.irradiance, shiftNm), eqe.values)
}

/** `√Σ c_k²`: standard uncertainty of the current from points that err independently. */
export function rootSumOfSquares(values: ArrayLike<number>): number {
  let sum = 0
  for (let k = 0; k < values.length; k++) sum += values[k]! * values[k]!
  return Math.sqrt(sum)
}

function assertJunction(junction: MeasuredJunction, index: number): void {
  const name = `junctions[${index}]`
  assertCurve(junction.eqe, `${name}.eqe`)
  assertBudget(junction, `${name}.`)
  const points = junction.pointUncertainty
  if (points === null) return
  if (points.length !== junction.eqe.values.length)
    throw new DomainError(
      `${name}.pointUncertainty`,
      `${name}.pointUncertainty has ${points.length} values for ${junction.eqe.values.length} points; each point needs one.`,
    )
  for (let k = 0; k < points.length; k++)
    if (!(points[k]! >= 0) || !Number.isFinite(points[k]!))
      throw new DomainError(
        `${name}.pointUncertainty`,
        `${name}.pointUncertainty[${k}] is ${points[k]}; it must be zero or a number above zero.`,
      )
}

const freedomOf = (component: BudgetComponent): number => component.degreesOfFreedom ?? Infinity

function sourceKey(component: BudgetComponent, junction: number): string {
  const shared = component.correlatedBetweenJunctions
  if (shared === true) return `${component.id} / all`
  if (shared === false) return `${component.id} / junction ${junction + 1}`
  return `${component.id} / group ${shared}`
}

function newSource(
  key: string,
  component: BudgetComponent,
  count: number,
): ErrorSource & { effects: (ErrorEffect | null)[] } {
  return {
    key,
    componentId: component.id,
    kind: component.kind,
    distribution: component.distribution,
    degreesOfFreedom: Infinity,
    effects: new Array<ErrorEffect | null>(count).fill(null),
  }
}

function assertSameDistribution(source: ErrorSource, component: BudgetComponent, junction: number): void {
  if (source.distribution !== component.distribution)
    throw new DomainError(
      `junctions[${junction}].components`,
      `"${component.label}" is one error for several junctions but is ${component.distribution} for junction ${junction + 1} and ${source.distribution} before it; state one distribution.`,
    )
}

function effectOf(component: BudgetComponent, junction: MeasuredJunction, weights: Float64Array): ErrorEffect | null {
  const { uncertainty } = component
  if (component.kind === 'bandwidth' && uncertainty.unit === 'nm')
    return shapeEffect(weightedSum(weights, broadening(junction.eqe, uncertainty.value)))
  if (uncertainty.unit === 'nm') return uncertainty.value === 0 ? null : { type: 'shift', nm: uncertainty.value }
  if (uncertainty.unit === 'percent' && component.correlatedOverWavelength)
    return uncertainty.value === 0 ? null : { type: 'scale', relative: uncertainty.value / 100 }
  const points = pointUncertainties(uncertainty, junction)
  if (component.correlatedOverWavelength) return shapeEffect(weightedSum(weights, points))
  const pointsMaCm2 = points.map((u, k) => u * weights[k]!)
  return pointsMaCm2.some((c) => c !== 0) ? { type: 'points', pointsMaCm2 } : null
}

function shapeEffect(currentMaCm2: number): ErrorEffect | null {
  return currentMaCm2 === 0 ? null : { type: 'shape', currentMaCm2 }
}

function pointUncertainties(
  uncertainty: Exclude<StandardUncertainty, { unit: 'nm' }>,
  junction: MeasuredJunction,
): Float64Array {
  const { wavelengthNm, values } = junction.eqe
  if (uncertainty.unit === 'column') return junction.pointUncertainty ?? new Float64Array(values.length)
  if (uncertainty.unit === 'percent') return values.map((eqe) => (Math.abs(eqe) * uncertainty.value) / 100)
  const { wavelengthNm: tableNm, percent } = uncertainty
  return values.map((eqe, k) => (Math.abs(eqe) * heldInterpolation(tableNm, percent, wavelengthNm[k]!)) / 100)
}

/** Linear between the points, constant beyond the first and the last. */
function heldInterpolation(x: readonly number[], y: readonly number[], at: number): number {
  const next = x.findIndex((value) => value > at)
  if (next === 0) return y[0]!
  if (next === -1) return y[y.length - 1]!
  const t = (at - x[next - 1]!) / (x[next]! - x[next - 1]!)
  return y[next - 1]! + t * (y[next]! - y[next - 1]!)
}

/**
 * Change of a curve by a triangular slit function of full width at half maximum w: `w²/12 · EQE''(λ)` to second order
 * (the triangle's variance is w²/6), with EQE'' the divided second difference; nothing at the ends of the scan.
 */
function broadening(eqe: Curve, widthNm: number): Float64Array {
  const { wavelengthNm: x, values: y } = eqe
  return y.map((_, k) => {
    if (k === 0 || k === y.length - 1) return 0
    const before = (y[k]! - y[k - 1]!) / (x[k]! - x[k - 1]!)
    const after = (y[k + 1]! - y[k]!) / (x[k + 1]! - x[k]!)
    return ((widthNm * widthNm) / 12) * ((2 * (after - before)) / (x[k + 1]! - x[k - 1]!))
  })
}
