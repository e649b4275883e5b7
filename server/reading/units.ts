import type { ValueUnit, WavelengthUnit } from '../../shared/contract/scans.js'
import { toFraction } from '../../shared/physics/units.js'

/** What a unit written in a header means; 'unknown' is a unit that is recognised but cannot be read. */
export type HeaderUnit =
  { of: 'wavelength'; unit: WavelengthUnit } | { of: 'value'; unit: ValueUnit } | { of: 'unknown'; written: string }

const SUPERSCRIPTS: Record<string, string> = { '²': '2', '³': '3', '¹': '1', '⁻': '-', '⁰': '0' }

/** Irradiance units lose their signs before they are compared: W/(m²·nm) and W m-2 nm-1 both become wm2nm. */
function squeezed(header: string): string {
  return header
    .toLowerCase()
    .replace(/[²³¹⁻⁰]/g, (sign) => SUPERSCRIPTS[sign] ?? sign)
    .replace(/[µμ]/g, 'u')
    .replace(/[\s·⋅*^()[\]{}/_.|-]/g, '')
}

/** The unit that a header states, in brackets, behind a slash, or alone; null without one. */
export function unitInHeader(header: string): HeaderUnit | null {
  const bare = squeezed(header)
  if (/uwcm2nm/.test(bare)) return { of: 'value', unit: 'uW/cm2/nm' }
  if (/[mk]wcm2(nm|um)|[mk]wm2(nm|um)|uwm2(nm|um)|wcm2(nm|um)/.test(bare)) return { of: 'unknown', written: header }
  if (/wm2nm/.test(bare)) return { of: 'value', unit: 'W/m2/nm' }
  if (/wm2um/.test(bare)) return { of: 'value', unit: 'W/m2/um' }
  const text = ` ${header.toLowerCase().replace(/[μµ]/g, 'u')} `
  if (/[\s([/]m[aA]\s*(\/|\s)\s*w(?![a-z/])/.test(text)) return { of: 'unknown', written: header }
  if (/[\s([/,_]a\s*(?:\/|\*|·|\s)\s*w(?:\^?-1|⁻¹)?(?![a-z/])/.test(text)) return { of: 'value', unit: 'A/W' }
  if (/%|\bpercent\b|\bprozent\b|_pct\b/.test(text)) return { of: 'value', unit: 'percent' }
  if (/\bfraction\b|\bbruchteil\b|[([]\s*[-–1]\s*[)\]]|\b0\s*(?:\.\.|-|–|…)\s*1\b/.test(text))
    return { of: 'value', unit: 'fraction' }
  if (/[\s([/_,]nm[\s)\],]/.test(text)) return { of: 'wavelength', unit: 'nm' }
  if (/[\s([/_,](?:um|micron|microns|micrometer|micrometre)[\s)\],]/.test(text)) return { of: 'wavelength', unit: 'um' }
  if (/[\s([/_,](?:å|angstrom|angström|ångström|Å)[\s)\],]/.test(text)) return { of: 'wavelength', unit: 'angstrom' }
  if (/[\s([/_,]ev[\s)\],]/.test(text)) return { of: 'wavelength', unit: 'eV' }
  return null
}

/** Units of the wavelength as people write them. */
export const WRITTEN_WAVELENGTH_UNIT: Record<WavelengthUnit, string> = { nm: 'nm', um: 'µm', angstrom: 'Å', eV: 'eV' }

/** EQE and the like as a fraction, irradiance in W m⁻² nm⁻¹. */
export function valueInBaseUnit(value: number, unit: ValueUnit, wavelengthNm: number): number {
  switch (unit) {
    case 'W/m2/nm':
      return value
    case 'W/m2/um':
      return value / 1000
    case 'uW/cm2/nm':
      return value / 100
    default:
      return toFraction(value, unit, wavelengthNm)
  }
}

/** Shortest and longest wavelength that a scan of a solar cell, its optics or its light can reach, nm. */
export const PLAUSIBLE_NM = { from: 100, to: 100_000 } as const
