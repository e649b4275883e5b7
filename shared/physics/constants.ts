/** Physical constants. Source: CODATA 2018 (Tiesinga, Mohr, Newell, Taylor), exact by definition of the SI. */

/** Speed of light in vacuum, m/s. */
export const SPEED_OF_LIGHT_M_S = 299_792_458
/** Planck constant, J s. */
export const PLANCK_J_S = 6.626_070_15e-34
/** Elementary charge, C. */
export const ELEMENTARY_CHARGE_C = 1.602_176_634e-19
/** Boltzmann constant, J/K. */
export const BOLTZMANN_J_K = 1.380_649e-23

/** h c / q: the product of a photon's energy in eV and its wavelength in nm, nm eV (1239.841984…). */
export const PHOTON_ENERGY_NM_EV = (PLANCK_J_S * SPEED_OF_LIGHT_M_S * 1e9) / ELEMENTARY_CHARGE_C

/** 0 °C in kelvin. */
export const ZERO_CELSIUS_K = 273.15
/** 25 °C, the temperature of standard test conditions, K. */
export const STANDARD_TEMPERATURE_K = 298.15

/** Thermal voltage k T / q, V. */
export function thermalVoltage(temperatureK: number): number {
  return (BOLTZMANN_J_K * temperatureK) / ELEMENTARY_CHARGE_C
}
