import { gapWavelengthNm, photovoltaicGap } from './bandGap.js'
import { rangeNm, type Curve } from './curve.js'
import { DomainError } from './errors.js'
import { cumulativeProduct, integrateProduct } from './integration.js'
import type { Spectrum } from './spectrum.js'

/**
 * Short-circuit current density `J = q ∫ EQE φ dλ`, mA/cm² (IEC 60904-8; 1 mA/cm² = 10 A/m²). EQE and E·λ are linear
 * between their points and their product is integrated exactly; outside the scan the EQE counts as zero.
 *
 * @param eqe fraction over nm. @param fromNm @param toNm a wavelength band, the whole scan unless given.
 * @throws DomainError when a limit is NaN or the band's end lies before its start. Cost O(n + m).
 */
export function shortCircuitCurrentDensity(eqe: Curve, spectrum: Spectrum, fromNm?: number, toNm?: number): number {
  for (const [limit, argument] of [
    [fromNm, 'fromNm'],
    [toNm, 'toNm'],
  ] as const)
    if (Number.isNaN(limit)) throw new DomainError(argument, `${argument} is NaN; it must be a wavelength in nm.`)
  if (fromNm !== undefined && toNm !== undefined && fromNm > toNm)
    throw new DomainError('toNm', `The band ends at ${toNm} nm, before it begins at ${fromNm} nm.`)
  return integrateProduct(eqe, spectrum.photonCurrent, fromNm, toNm)
}

/** J(λ): the current collected up to each wavelength of the union grid, mA/cm². */
export function cumulativeCurrentDensity(eqe: Curve, spectrum: Spectrum): Curve {
  return cumulativeProduct(eqe, spectrum.photonCurrent)
}

/** Where the account of coverage begins, nm. */
export const COVERAGE_FROM_NM = 280

/**
 * Share of the spectrum's photon flux between 280 nm and the junction's own long-wavelength edge that lies inside the
 * scan. The edge is the wavelength of the photovoltaic gap; where the scan ends before its edge has fallen, the edge is
 * not known and the scan's end is taken (the finding on truncated range speaks then).
 * @returns 0…1; null when the spectrum has no photons there.
 */
export function coverage(eqe: Curve, spectrum: Spectrum): number | null {
  const [from, to] = rangeNm(eqe)
  const { gap } = photovoltaicGap(eqe)
  const edge = gap ? gapWavelengthNm(gap) : to
  const ones: Curve = { wavelengthNm: Float64Array.of(1e-3, 1e9), values: Float64Array.of(1, 1) }
  const whole = integrateProduct(ones, spectrum.photonCurrent, COVERAGE_FROM_NM, edge)
  if (!(whole > 0)) return null
  return integrateProduct(ones, spectrum.photonCurrent, Math.max(from, COVERAGE_FROM_NM), Math.min(to, edge)) / whole
}

export interface EdgeResponse {
  readonly shortNm: number
  readonly shortEqe: number
  readonly longNm: number
  readonly longEqe: number
}

/** EQE at each end of the scan: above 0.02 the scan is truncated and J is a lower bound. */
export function edgeResponse(eqe: Curve): EdgeResponse {
  const [shortNm, longNm] = rangeNm(eqe)
  return { shortNm, shortEqe: eqe.values[0]!, longNm, longEqe: eqe.values[eqe.values.length - 1]! }
}
