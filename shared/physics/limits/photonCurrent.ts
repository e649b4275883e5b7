import { PHOTON_ENERGY_NM_EV } from '../constants.js'
import { assertCurve, indexAtOrBelow, type Curve } from '../curve.js'
import { assertPositive, DomainError } from '../errors.js'

/**
 * The current that all photons above an energy would give, J(E) = q∫φ dλ from the spectrum's first wavelength to hc/E.
 * E·λ is linear between the points of the spectrum and integrated exactly, so that a step of EQE 1 has the same current
 * here as by the integration of a curve.
 */
export interface PhotonCurrent {
  readonly spectrum: Curve
  /** Irradiance of the whole table, W m⁻², or the total that was stated. */
  readonly irradianceWM2: number
  /** J up to each point of the table, mA cm⁻². */
  readonly cumulativeMaCm2: Float64Array
}

/**
 * Prepares a spectrum for the limits.
 * @param spectrum irradiance, W m⁻² nm⁻¹ over nm. @param irradianceWM2 input power where the table does not hold all of
 * it (a black body: σT⁴ × dilution); otherwise the integral of the table.
 * @throws DomainError for a bad curve, negative irradiance or no light at all. Cost O(n).
 */
export function photonCurrent(spectrum: Curve, irradianceWM2?: number): PhotonCurrent {
  assertCurve(spectrum, 'spectrum')
  const { wavelengthNm: x, values: y } = spectrum
  const cumulative = new Float64Array(x.length)
  let irradiance = 0
  for (let i = 0; i < x.length; i++) {
    if (!(y[i]! >= 0))
      throw new DomainError('spectrum', `spectrum.values[${i}] is ${y[i]}; irradiance must be zero or above.`)
    if (i === 0) continue
    const h = x[i]! - x[i - 1]!
    cumulative[i] =
      cumulative[i - 1]! + (0.5 * h * (y[i]! * x[i]! + y[i - 1]! * x[i - 1]!)) / (10 * PHOTON_ENERGY_NM_EV)
    // E = (E·λ)/λ with E·λ linear is not a straight line; the trapezoid of E is what the standard's totals use.
    irradiance += 0.5 * h * (y[i]! + y[i - 1]!)
  }
  const total = irradianceWM2 ?? irradiance
  assertPositive(total, 'irradianceWM2')
  return { spectrum, irradianceWM2: total, cumulativeMaCm2: cumulative }
}

/** J of a unit step of EQE above `bandGapEv`, mA cm⁻². Zero or the whole table outside it. Cost O(log n). */
export function stepCurrentMaCm2(photons: PhotonCurrent, bandGapEv: number): number {
  assertPositive(bandGapEv, 'bandGapEv')
  const { wavelengthNm: x, values: y } = photons.spectrum
  const edge = PHOTON_ENERGY_NM_EV / bandGapEv
  const i = indexAtOrBelow(x, edge)
  if (i < 0) return 0
  if (i >= x.length - 1) return photons.cumulativeMaCm2[x.length - 1]!
  const h = x[i + 1]! - x[i]!
  const t = edge - x[i]!
  const g0 = y[i]! * x[i]!
  const g1 = y[i + 1]! * x[i + 1]!
  return photons.cumulativeMaCm2[i]! + (t * (g0 + (0.5 * t * (g1 - g0)) / h)) / (10 * PHOTON_ENERGY_NM_EV)
}
