import { REFERENCE_SPECTRA, type ReferenceSpectrumId } from '../data/spectra/index.js'
import { ELEMENTARY_CHARGE_C, PHOTON_ENERGY_NM_EV } from './constants.js'
import { assertCurve, makeCurve, type Curve } from './curve.js'
import { assertPositive, DomainError } from './errors.js'

/**
 * A spectrum of light ready for integrals. `curve` is the spectral irradiance E(λ), W m⁻² nm⁻¹. `photonCurrent` is
 * `q φ = q E λ / (h c)` in mA cm⁻² nm⁻¹ at the same wavelengths, linear between them (E·λ is taken as linear), so
 * that `∫ EQE · photonCurrent dλ` is a current density in mA/cm².
 */
export interface Spectrum {
  readonly id: string
  readonly name: string
  readonly curve: Curve
  readonly photonCurrent: Curve
}

/**
 * @param spectrum.curve spectral irradiance, W m⁻² nm⁻¹, not negative, with some light in it.
 * @throws DomainError for a bad curve, a negative irradiance, or no light at all. Cost O(n).
 */
export function makeSpectrum(spectrum: { id: string; name: string; curve: Curve }): Spectrum {
  const { id, name, curve } = spectrum
  assertCurve(curve, 'spectrum')
  let largest = 0
  for (let i = 0; i < curve.values.length; i++) {
    const value = curve.values[i]!
    if (value < 0)
      throw new DomainError(
        'spectrum',
        `The irradiance at ${curve.wavelengthNm[i]} nm is ${value}; it must be zero or above.`,
      )
    largest = Math.max(largest, value)
  }
  if (largest === 0) throw new DomainError('spectrum', 'The spectrum holds no light: every irradiance is zero.')
  const values = curve.values.map((value, i) => (value * curve.wavelengthNm[i]!) / (10 * PHOTON_ENERGY_NM_EV))
  return { id, name, curve, photonCurrent: { wavelengthNm: curve.wavelengthNm, values } }
}

/** Total irradiance ∫E dλ over the whole table, W m⁻², by the trapezoid rule that the standards' totals use. */
export function totalIrradianceWM2(spectrum: Spectrum): number {
  return trapezoid(spectrum.curve)
}

/** Photon flux ∫φ dλ over the whole table, m⁻² s⁻¹. */
export function photonFluxM2S(spectrum: Spectrum): number {
  return (trapezoid(spectrum.photonCurrent) * 10) / ELEMENTARY_CHARGE_C
}

/** The same spectrum scaled so that its table integrates to `totalWM2`, W m⁻². @throws DomainError unless above zero. */
export function scaleSpectrum(spectrum: Spectrum, totalWM2: number): Spectrum {
  assertPositive(totalWM2, 'totalWM2')
  const factor = totalWM2 / totalIrradianceWM2(spectrum)
  const scaled = (curve: Curve): Curve => ({
    wavelengthNm: curve.wavelengthNm,
    values: curve.values.map((value) => value * factor),
  })
  return { ...spectrum, curve: scaled(spectrum.curve), photonCurrent: scaled(spectrum.photonCurrent) }
}

const prepared = new Map<ReferenceSpectrumId, Spectrum>()

/** A reference spectrum of the standards' tables; made once and kept. */
export function referenceSpectrum(id: ReferenceSpectrumId): Spectrum {
  const known = prepared.get(id)
  if (known) return known
  const table = REFERENCE_SPECTRA[id]
  const spectrum = makeSpectrum({ id, name: table.name, curve: makeCurve(table.wavelengthNm, table.irradianceWM2Nm) })
  prepared.set(id, spectrum)
  return spectrum
}

function trapezoid(curve: Curve): number {
  const { wavelengthNm, values } = curve
  let sum = 0
  for (let i = 1; i < values.length; i++)
    sum += ((wavelengthNm[i]! - wavelengthNm[i - 1]!) * (values[i]! + values[i - 1]!)) / 2
  return sum
}
