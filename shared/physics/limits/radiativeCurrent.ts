import { BOLTZMANN_J_K, ELEMENTARY_CHARGE_C, PLANCK_J_S, SPEED_OF_LIGHT_M_S } from '../constants.js'
import { assertPositive } from '../errors.js'

/** Faces that a cell emits from: `oneSided` into the front hemisphere only (a rear mirror), or both. */
export type Emission = 'oneSided' | 'twoSided'

/**
 * Natural logarithm of the dark current density of detailed balance, J_0 in mA cm⁻²:
 * `J_0 = (2πq/h³c²) ∫_{E_g}^∞ E² dE/(e^{E/kT} − 1)`, twice that for two-sided emission. The Bose–Einstein integral is
 * summed in closed form, `Σ_m e^{−mx}(x²/m + 2x/m² + 2/m³)` with x = E_g/kT; the first term is Boltzmann's. As a
 * logarithm, so that wide gaps at low temperature do not underflow.
 * Source: W. Shockley, H. J. Queisser, J. Appl. Phys. 32 (1961) 510; refractive index 1 outside.
 * @param bandGapEv eV, above zero. @param temperatureK K, above zero.
 * @throws DomainError naming the argument. Cost: one term for x > 36, more for narrow gaps.
 */
export function logDarkCurrentMaCm2(bandGapEv: number, temperatureK: number, emission: Emission = 'oneSided'): number {
  assertPositive(bandGapEv, 'bandGapEv')
  assertPositive(temperatureK, 'temperatureK')
  const thermalJ = BOLTZMANN_J_K * temperatureK
  const x = (bandGapEv * ELEMENTARY_CHARGE_C) / thermalJ
  let sum = 0
  for (let m = 1; m <= 10_000; m++) {
    const term = Math.exp(-(m - 1) * x) * (x * x + (2 * x) / m + 2 / (m * m)) * (1 / m)
    sum += term
    if (term < 1e-17 * sum) break
  }
  const perArea = (2 * Math.PI * ELEMENTARY_CHARGE_C * thermalJ ** 3) / (PLANCK_J_S ** 3 * SPEED_OF_LIGHT_M_S ** 2)
  const faces = emission === 'twoSided' ? 2 : 1
  return Math.log(faces * perArea * 0.1) - x + Math.log(sum)
}

/** Dark current density of detailed balance, mA cm⁻²; see `logDarkCurrentMaCm2`. */
export function darkCurrentMaCm2(bandGapEv: number, temperatureK: number, emission: Emission = 'oneSided'): number {
  return Math.exp(logDarkCurrentMaCm2(bandGapEv, temperatureK, emission))
}
