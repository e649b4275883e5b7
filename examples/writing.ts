import { PHOTON_ENERGY_NM_EV } from '../shared/physics/constants.js'
import { valueAt, type Curve } from '../shared/physics/curve.js'
import { fromFraction, fromNanometres, type EfficiencyUnit, type WavelengthUnit } from '../shared/physics/units.js'

/** Digits that a laboratory writes: enough that a current keeps four. */
const WAVELENGTH_DIGITS: Record<WavelengthUnit, number> = { nm: 1, um: 4, angstrom: 0, eV: 7 }
const VALUE_DIGITS: Record<EfficiencyUnit, number> = { fraction: 6, percent: 4, 'A/W': 6 }

export interface Numbers {
  wavelengthUnit?: WavelengthUnit
  valueUnit?: EfficiencyUnit
  decimalMark?: '.' | ','
  order?: 'ascending' | 'descending'
}

/** Wavelengths from, to (both ends), nm. */
export const gridNm = (from: number, to: number, step: number): number[] =>
  Array.from({ length: Math.round((to - from) / step) + 1 }, (_, i) => from + i * step)

/** Rows of numbers: wavelength, then each curve, in the units asked for. */
export function numberRows(wavelengthNm: readonly number[], curves: readonly Curve[], how: Numbers = {}): number[][] {
  const { wavelengthUnit = 'nm', valueUnit = 'fraction', order = 'ascending' } = how
  const rows = wavelengthNm.map((nm) => [
    round(fromNanometres(nm, wavelengthUnit), WAVELENGTH_DIGITS[wavelengthUnit]),
    ...curves.map((curve) => round(fromFraction(valueAt(curve, nm), valueUnit, nm), VALUE_DIGITS[valueUnit])),
  ])
  return order === 'ascending' ? rows : rows.reverse()
}

/** The same rows as text, each number with its usual digits. */
export function textRows(wavelengthNm: readonly number[], curves: readonly Curve[], how: Numbers = {}): string[][] {
  const { wavelengthUnit = 'nm', valueUnit = 'fraction', decimalMark = '.' } = how
  return numberRows(wavelengthNm, curves, how).map(([wavelength, ...values]) =>
    [
      wavelength!.toFixed(WAVELENGTH_DIGITS[wavelengthUnit]),
      ...values.map((value) => value.toFixed(VALUE_DIGITS[valueUnit])),
    ].map((text) => text.replace('.', decimalMark)),
  )
}

const round = (value: number, digits: number): number => Number(value.toFixed(digits))

/** Energies on an even grid of their own, as an instrument that scans in eV has them; given as wavelengths, nm. */
export const energyGridNm = (fromEv: number, toEv: number, stepEv: number): number[] =>
  gridNm(fromEv, toEv, stepEv)
    .map((ev) => PHOTON_ENERGY_NM_EV / round(ev, 6))
    .reverse()
