/** Complex refractive index n + ik of a material over wavelength, from a published table. */
export interface OpticalConstantsTable {
  readonly id: string
  readonly name: string
  /** Where the figures were published. */
  readonly reference: string
  /** What to know before they are used. */
  readonly caveat: string
  /** nm, strictly increasing; the material is not known outside. */
  readonly wavelengthNm: readonly number[]
  readonly n: readonly number[]
  readonly k: readonly number[]
}
