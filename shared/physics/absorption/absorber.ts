import { PHOTON_ENERGY_NM_EV } from '../constants.js'
import { assertFinite } from '../errors.js'
import { assertDirectGapEdge, directGapSpectrumPerCm, type DirectGapEdge } from './directGapEdge.js'
import {
  assertOpticalConstants,
  opticalColumnAt,
  outsideRange,
  opticalRangeNm,
  type OpticalConstants,
} from './opticalConstants.js'

/** What absorbs in a junction: a table of n and k, or the parametric edge. */
export type Absorber =
  { readonly kind: 'table'; readonly table: OpticalConstants } | { readonly kind: 'edge'; readonly edge: DirectGapEdge }

/** Checks an absorber. @throws DomainError naming the member. */
export function assertAbsorber(absorber: Absorber, argument: string): void {
  if (absorber.kind === 'table') assertOpticalConstants(absorber.table, argument)
  else assertDirectGapEdge(absorber.edge, argument)
}

/** α = 4πk/λ, cm⁻¹, from the extinction coefficient k and the wavelength in nm. */
export function absorptionFromExtinctionPerCm(k: number, wavelengthNm: number): number {
  return (4e7 * Math.PI * k) / wavelengthNm
}

/** k = αλ/4π from the absorption coefficient in cm⁻¹ and the wavelength in nm. */
export function extinctionFromAbsorption(alphaPerCm: number, wavelengthNm: number): number {
  return (alphaPerCm * wavelengthNm) / (4e7 * Math.PI)
}

/**
 * Absorption coefficient of an absorber on a wavelength grid, its edge shifted rigidly in energy:
 * `α'(E) = α(E − ΔE_g)`, cm⁻¹. A table is asked at λ' = hc/(E − ΔE_g), where α = 4πk(λ')/λ'.
 * @param wavelengthNm nm, any length. @param gapShiftEv ΔE_g, eV; positive widens the gap.
 * @param out same length; filled and returned.
 * @throws DomainError with the range when a table does not reach a wavelength that the shift asks for.
 * Cost O(n), or O(n log m) for a table of m rows.
 */
export function absorptionPerCm(
  absorber: Absorber,
  wavelengthNm: Float64Array,
  gapShiftEv = 0,
  out: Float64Array = new Float64Array(wavelengthNm.length),
): Float64Array {
  assertFinite(gapShiftEv, 'gapShiftEv')
  if (absorber.kind === 'edge') return directGapSpectrumPerCm(absorber.edge, wavelengthNm, gapShiftEv, out)
  const shifted = shiftedWavelengthNm(absorber.table, wavelengthNm, gapShiftEv)
  opticalColumnAt(absorber.table, absorber.table.k, shifted, out)
  for (let i = 0; i < out.length; i++) out[i] = absorptionFromExtinctionPerCm(out[i]!, shifted[i]!)
  return out
}

/** The wavelengths at which a table answers for `wavelengthNm` after the rigid shift. */
function shiftedWavelengthNm(table: OpticalConstants, wavelengthNm: Float64Array, gapShiftEv: number): Float64Array {
  if (gapShiftEv === 0) return wavelengthNm
  return wavelengthNm.map((x) => {
    const energy = PHOTON_ENERGY_NM_EV / x - gapShiftEv
    if (!(energy > 0)) throw outsideRange(table, Infinity)
    return PHOTON_ENERGY_NM_EV / energy
  })
}

/**
 * The gap shifts that an absorber allows on a range of wavelengths, eV: a table may be shifted only as far as it has
 * data for both ends of the range. The parametric edge may fall to just above zero gap.
 * @returns [lowest, highest]; lowest > 0 or highest < 0 when the range is not covered even unshifted.
 */
export function gapShiftRangeEv(absorber: Absorber, fromNm: number, toNm: number): [number, number] {
  if (absorber.kind === 'edge') return [-0.9 * absorber.edge.bandGapEv, 2]
  const [tableFrom, tableTo] = opticalRangeNm(absorber.table)
  return [
    PHOTON_ENERGY_NM_EV / fromNm - PHOTON_ENERGY_NM_EV / tableFrom,
    PHOTON_ENERGY_NM_EV / toNm - PHOTON_ENERGY_NM_EV / tableTo,
  ]
}
