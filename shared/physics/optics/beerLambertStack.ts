import { assertNotNegative, assertPositive, DomainError } from '../errors.js'

/** One absorber that light crosses. `alphaPerCm` on a wavelength grid, cm⁻¹, zero or above. */
export interface BeerLambertLayer {
  readonly alphaPerCm: Float64Array
  readonly thicknessNm: number
  /** m: how often the thickness is crossed; 1 single pass, 2 with a mirror, up to 4n² with a scattering rear. */
  readonly pathFactor?: number
}

export interface BeerLambertOptics {
  /** Absorptance of each layer, fraction of the light that enters the stack. */
  readonly absorptance: readonly Float64Array[]
  /** What leaves the last layer. */
  readonly transmittance: Float64Array
}

/** m α d without a unit, from cm⁻¹ and nm. */
export function opticalDepth(alphaPerCm: number, thicknessNm: number, pathFactor: number): number {
  return alphaPerCm * 1e-7 * (pathFactor * thicknessNm)
}

/**
 * Light that passes absorbers in turn: `A_i = T_i (1 − e^{−m_i α_i d_i})`, `T_{i+1} = T_i e^{−m_i α_i d_i}`, T_1 = 1; no
 * reflection. `1 − e^{−x}` is taken with expm1, so that thin layers keep their digits. Source: the Beer–Lambert law.
 * @param layers sunward first; all spectra of one length.
 * @throws DomainError naming the layer. Cost O(layers × wavelengths).
 */
export function beerLambertStack(layers: readonly BeerLambertLayer[]): BeerLambertOptics {
  const points = layers[0]?.alphaPerCm.length
  if (points === undefined) throw new DomainError('layers', 'layers is empty; a stack has at least one layer.')
  const transmittance = new Float64Array(points).fill(1)
  const absorptance = layers.map((layer, l) => {
    const pathFactor = layer.pathFactor ?? 1
    assertNotNegative(layer.thicknessNm, `layers[${l}].thicknessNm`)
    assertPositive(pathFactor, `layers[${l}].pathFactor`)
    if (layer.alphaPerCm.length !== points)
      throw new DomainError(
        `layers[${l}].alphaPerCm`,
        `layers[${l}].alphaPerCm has ${layer.alphaPerCm.length} values; layers[0] has ${points}.`,
      )
    const absorbed = new Float64Array(points)
    for (let i = 0; i < points; i++) {
      assertNotNegative(layer.alphaPerCm[i]!, `layers[${l}].alphaPerCm[${i}]`)
      const depth = opticalDepth(layer.alphaPerCm[i]!, layer.thicknessNm, pathFactor)
      absorbed[i] = transmittance[i]! * -Math.expm1(-depth)
      transmittance[i]! *= Math.exp(-depth)
    }
    return absorbed
  })
  return { absorptance, transmittance }
}
