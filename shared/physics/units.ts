import { PHOTON_ENERGY_NM_EV } from './constants.js'
import { assertFinite, assertPositive } from './errors.js'

/** Units in which laboratories write wavelengths. */
export type WavelengthUnit = 'nm' | 'um' | 'angstrom' | 'eV'
/** Units in which they write a quantum efficiency, or the responsivity it follows from. */
export type EfficiencyUnit = 'fraction' | 'percent' | 'A/W'

/** A wavelength in nm, or the wavelength of a photon energy. @throws DomainError unless above zero. */
export function toNanometres(value: number, unit: WavelengthUnit): number {
  assertPositive(value, 'wavelength')
  switch (unit) {
    case 'nm':
      return value
    case 'um':
      return value * 1000
    case 'angstrom':
      return value / 10
    case 'eV':
      return PHOTON_ENERGY_NM_EV / value
  }
}

/** Inverse of `toNanometres`. */
export function fromNanometres(wavelengthNm: number, unit: WavelengthUnit): number {
  assertPositive(wavelengthNm, 'wavelengthNm')
  switch (unit) {
    case 'nm':
      return wavelengthNm
    case 'um':
      return wavelengthNm / 1000
    case 'angstrom':
      return wavelengthNm * 10
    case 'eV':
      return PHOTON_ENERGY_NM_EV / wavelengthNm
  }
}

/**
 * EQE as a fraction; from a spectral responsivity by `EQE = SR · (h c/q) / λ` (IEC 60904-8).
 * @param wavelengthNm nm, needed for A/W only.
 * @throws DomainError unless the value is finite and, for A/W, the wavelength above zero.
 */
export function toFraction(value: number, unit: EfficiencyUnit, wavelengthNm: number): number {
  assertFinite(value, 'value')
  switch (unit) {
    case 'fraction':
      return value
    case 'percent':
      return value / 100
    case 'A/W':
      assertPositive(wavelengthNm, 'wavelengthNm')
      return (value * PHOTON_ENERGY_NM_EV) / wavelengthNm
  }
}

/** Inverse of `toFraction`; a responsivity in A/W is `SR = EQE · λ / (h c/q)`. */
export function fromFraction(eqe: number, unit: EfficiencyUnit, wavelengthNm: number): number {
  assertFinite(eqe, 'eqe')
  switch (unit) {
    case 'fraction':
      return eqe
    case 'percent':
      return eqe * 100
    case 'A/W':
      assertPositive(wavelengthNm, 'wavelengthNm')
      return (eqe * wavelengthNm) / PHOTON_ENERGY_NM_EV
  }
}
