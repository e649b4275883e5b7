import { assertNotNegative, assertPositive, assertWithin } from '../errors.js'

/** What a slab does with the light that falls on it; the three fractions add up to one. */
export interface SlabOptics {
  readonly reflectance: number
  readonly transmittance: number
  readonly absorptance: number
}

/**
 * A slab too thick to interfere, all passes added in closed form:
 * `T = (1 − R₁)(1 − R₂) t/(1 − R₁R₂t²)`, `R = R₁ + (1 − R₁)² R₂ t²/(1 − R₁R₂t²)`.
 * @param frontReflectance R₁ and @param rearReflectance R₂ of the two faces, fractions, the same from both sides.
 * @param passTransmittance t = e^{−αd/cos θ} of one pass, fraction.
 * @throws DomainError for a fraction outside 0…1. Cost O(1).
 */
export function incoherentSlab(
  frontReflectance: number,
  rearReflectance: number,
  passTransmittance: number,
): SlabOptics {
  assertWithin(frontReflectance, 0, 1, 'frontReflectance')
  assertWithin(rearReflectance, 0, 1, 'rearReflectance')
  assertWithin(passTransmittance, 0, 1, 'passTransmittance')
  const entering = 1 - frontReflectance
  if (entering === 0) return { reflectance: 1, transmittance: 0, absorptance: 0 }
  const rounds = 1 - frontReflectance * rearReflectance * passTransmittance * passTransmittance
  const transmittance = (entering * (1 - rearReflectance) * passTransmittance) / rounds
  const absorptance = (entering * (1 - passTransmittance) * (1 + rearReflectance * passTransmittance)) / rounds
  return { reflectance: 1 - transmittance - absorptance, transmittance, absorptance }
}

/** The largest mean path factor of a scattering rear, 4n² (E. Yablonovitch, J. Opt. Soc. Am. 72 (1982) 899). */
export function lambertianPathFactor(index: number): number {
  assertPositive(index, 'index')
  return 4 * index * index
}

/**
 * Absorptance of a slab with ideal light trapping, `A = α/(α + 1/(4n²d))`, good for weak absorption.
 * Source: T. Tiedje, E. Yablonovitch, G. D. Cody, B. G. Brooks, IEEE Trans. Electron Devices 31 (1984) 711.
 * @param alphaPerCm cm⁻¹. @param thicknessNm nm. @param index n of the slab. Cost O(1).
 */
export function lambertianAbsorptance(alphaPerCm: number, thicknessNm: number, index: number): number {
  assertNotNegative(alphaPerCm, 'alphaPerCm')
  assertPositive(thicknessNm, 'thicknessNm')
  const strength = alphaPerCm * lambertianPathFactor(index) * thicknessNm * 1e-7
  return strength / (strength + 1)
}
