import { assertNotNegative, assertPositive, DomainError } from '../errors.js'
import { assertAngle } from './fresnel.js'

/** A column on the stack's wavelengths, or one value for all of them. */
export type Dispersion = Float64Array | number

/** A plane layer with index n + ik. */
export interface StackLayer {
  readonly name?: string
  readonly thicknessNm: number
  readonly n: Dispersion
  readonly k: Dispersion
  /** False for a layer too thick to interfere (glass, a wafer). Default true. */
  readonly coherent?: boolean
}

export type Polarisation = 's' | 'p' | 'unpolarised'

/** Layers, sunward first, between a transparent medium and one that light does not return from. */
export interface OpticalStack {
  /** nm, above zero; any order. */
  readonly wavelengthNm: Float64Array
  /** Index of the medium the light comes from, without absorption. Default 1 (air). */
  readonly incidentIndex?: Dispersion
  readonly layers: readonly StackLayer[]
  /** Half-space behind the stack. Default air. */
  readonly exit?: { readonly n: Dispersion; readonly k: Dispersion }
  /** Angle in the incident medium, degrees from the normal, 0 to below 90. Default 0. */
  readonly angleDeg?: number
  /** Default unpolarised. */
  readonly polarisation?: Polarisation
}

/** Fractions of the incident light at each wavelength; R + T + Σ A = 1. */
export interface StackOptics {
  readonly reflectance: Float64Array
  readonly transmittance: Float64Array
  /** One spectrum a layer, in the order of the stack's layers. */
  readonly absorptance: readonly Float64Array[]
}

/** Checks a stack. @throws DomainError naming the member. Cost O(layers × wavelengths). */
export function assertStack(stack: OpticalStack): void {
  const points = stack.wavelengthNm.length
  if (points === 0) throw new DomainError('wavelengthNm', 'wavelengthNm is empty; it needs at least one wavelength.')
  for (let i = 0; i < points; i++) assertPositive(stack.wavelengthNm[i]!, `wavelengthNm[${i}]`)
  assertAngle(stack.angleDeg ?? 0)
  assertDispersion(stack.incidentIndex ?? 1, points, 'incidentIndex', assertPositive)
  stack.layers.forEach((layer, l) => {
    assertNotNegative(layer.thicknessNm, `layers[${l}].thicknessNm`)
    assertIndex(layer.n, layer.k, points, `layers[${l}]`)
  })
  if (stack.exit) assertIndex(stack.exit.n, stack.exit.k, points, 'exit')
}

/** Checks an index n + ik on `points` wavelengths. @throws DomainError naming the value. */
export function assertIndex(n: Dispersion, k: Dispersion, points: number, argument: string): void {
  assertDispersion(n, points, `${argument}.n`, assertPositive)
  assertDispersion(k, points, `${argument}.k`, assertNotNegative)
}

function assertDispersion(
  values: Dispersion,
  points: number,
  argument: string,
  assertValue: (value: number, argument: string) => void,
): void {
  if (typeof values === 'number') return assertValue(values, argument)
  if (values.length !== points)
    throw new DomainError(argument, `${argument} has ${values.length} values for ${points} wavelengths.`)
  for (let i = 0; i < points; i++) if (!(values[i]! > 0)) assertValue(values[i]!, `${argument}[${i}]`)
}

/** The value of a dispersion at the wavelength of index `i`. */
export function at(values: Dispersion, i: number): number {
  return typeof values === 'number' ? values : values[i]!
}
