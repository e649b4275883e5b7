import { PHOTON_ENERGY_NM_EV } from '../constants.js'
import { assertPositive, DomainError } from '../errors.js'

/** A direct-gap absorption edge with an Urbach tail. */
export interface DirectGapEdge {
  /** E_g, eV. */
  readonly bandGapEv: number
  /** α_0, the scale of the law above the edge, cm⁻¹. The law's own maximum is α_0/2, at 2 E_g. */
  readonly alpha0PerCm: number
  /** E_U, the energy over which the tail falls by e, meV. About 15 for halide perovskites (common practice). */
  readonly urbachMev: number
}

/**
 * Checks an edge. The law `√(E − E_g)/E` rises only up to 2 E_g, and its logarithmic slope there is below 1/E_U for
 * every E_U; but a tail that does not fall within the gap itself describes no absorber, so E_U must stay below E_g.
 * @throws DomainError naming the member.
 */
export function assertDirectGapEdge(edge: DirectGapEdge, argument: string): void {
  assertPositive(edge.bandGapEv, `${argument}.bandGapEv`)
  assertPositive(edge.alpha0PerCm, `${argument}.alpha0PerCm`)
  assertPositive(edge.urbachMev, `${argument}.urbachMev`)
  if (!(edge.urbachMev < 1000 * edge.bandGapEv))
    throw new DomainError(
      `${argument}.urbachMev`,
      `${argument}.urbachMev is ${edge.urbachMev} meV; the tail must fall within the gap of ` +
        `${1000 * edge.bandGapEv} meV (15 meV is usual for halide perovskites).`,
    )
}

/**
 * Energy E_j at which the tail joins the edge, eV: where `1/(2(E − E_g)) − 1/E = 1/E_U`. With x = E_j − E_g this is
 * `2x² + (2E_g + E_U)x − E_U E_g = 0`, whose positive root is taken in the form that does not cancel.
 * Cost O(1).
 */
export function joinEnergyEv(edge: DirectGapEdge): number {
  assertDirectGapEdge(edge, 'edge')
  const gap = edge.bandGapEv
  const tail = edge.urbachMev / 1000
  const b = 2 * gap + tail
  return gap + (2 * tail * gap) / (b + Math.sqrt(b * b + 8 * tail * gap))
}

/**
 * Absorption coefficient of the edge at one photon energy, cm⁻¹:
 * `α_0 √((E − E_g)/E_g) (E_g/E)` at and above E_j, `α(E_j) exp((E − E_j)/E_U)` below. Value and slope are continuous.
 * @param energyEv above zero.
 * Cost O(1).
 */
export function directGapAbsorptionPerCm(edge: DirectGapEdge, energyEv: number): number {
  assertPositive(energyEv, 'energyEv')
  const join = joinEnergyEv(edge)
  return energyEv >= join
    ? aboveJoin(edge, energyEv)
    : aboveJoin(edge, join) * Math.exp((energyEv - join) / (edge.urbachMev / 1000))
}

/**
 * Absorption coefficient of the edge on a wavelength grid, shifted rigidly in energy: `α'(E) = α(E − ΔE_g)`, cm⁻¹.
 * @param wavelengthNm nm. @param gapShiftEv ΔE_g, eV; positive widens the gap.
 * @param out same length; filled and returned.
 * @throws DomainError for a wavelength of zero. Cost O(n).
 */
export function directGapSpectrumPerCm(
  edge: DirectGapEdge,
  wavelengthNm: Float64Array,
  gapShiftEv = 0,
  out: Float64Array = new Float64Array(wavelengthNm.length),
): Float64Array {
  const join = joinEnergyEv(edge)
  const atJoin = aboveJoin(edge, join)
  const perEv = 1000 / edge.urbachMev
  for (let i = 0; i < wavelengthNm.length; i++) {
    const energy = PHOTON_ENERGY_NM_EV / wavelengthNm[i]! - gapShiftEv
    if (!Number.isFinite(energy))
      throw new DomainError('wavelengthNm', `wavelengthNm[${i}] is ${wavelengthNm[i]}; it must be above zero.`)
    out[i] = energy >= join ? aboveJoin(edge, energy) : atJoin * Math.exp((energy - join) * perEv)
  }
  return out
}

function aboveJoin(edge: DirectGapEdge, energyEv: number): number {
  const gap = edge.bandGapEv
  return edge.alpha0PerCm * Math.sqrt((energyEv - gap) / gap) * (gap / energyEv)
}
