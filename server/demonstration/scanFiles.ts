import type { Curve } from '../../shared/physics/curve.js'
import { inventedScans, type InventedDevice } from './devices.js'

/** A file as an instrument would have written it. */
export interface ScanFile {
  name: string
  text: string
}

/** Ways in which laboratories write the same numbers down; each device's files follow one. */
export const FILE_STYLES = ['comma', 'semicolon', 'tab'] as const
export type FileStyle = (typeof FILE_STYLES)[number]

interface Writing {
  separator: string
  extension: string
  number: (value: number, digits: number) => string
}
const WRITING: Record<FileStyle, Writing> = {
  comma: { separator: ',', extension: 'csv', number: (value, digits) => value.toFixed(digits) },
  semicolon: {
    separator: ';',
    extension: 'csv',
    number: (value, digits) => value.toFixed(digits).replace('.', ','),
  },
  tab: { separator: '\t', extension: 'txt', number: (value, digits) => value.toFixed(digits) },
}

/** One file with the EQE of every junction side by side, in per cent. */
export function eqeFile(device: InventedDevice, style: FileStyle, measuredOn: string): ScanFile {
  return tableFile(
    `${device.sampleId}_EQE`,
    style,
    [`# Sample ${device.sampleId}`, `# Measured ${measuredOn}, bias light and voltage on`],
    ['Wavelength (nm)', ...device.junctions.map((junction) => `EQE ${junction.label} (%)`)],
    inventedScans(device).map((scan) => inPercent(scan.curve)),
    3,
  )
}

/** One junction's EQE in a file of its own, as a fraction. */
export function junctionFile(device: InventedDevice, position: number, curve: Curve, remark: string): ScanFile {
  const { label } = device.junctions[position - 1]!
  return tableFile(
    `${device.sampleId}_${label}_${remark.replaceAll(' ', '-')}`,
    'comma',
    [`# Sample ${device.sampleId}, junction ${label}`, `# ${remark}`],
    ['Wavelength (nm)', 'EQE (-)'],
    [curve],
    5,
  )
}

/** Reflectance in per cent. */
export function reflectanceFile(device: InventedDevice, style: FileStyle): ScanFile {
  return tableFile(
    `${device.sampleId}_reflectance`,
    style,
    [`# Sample ${device.sampleId}, integrating sphere, 8 degrees`],
    ['Wavelength (nm)', 'Reflectance (%)'],
    [inPercent(device.reflectance)],
    3,
  )
}

function inPercent({ wavelengthNm, values }: Curve): Curve {
  return { wavelengthNm, values: values.map((value) => 100 * value) }
}

/** All curves share the wavelengths of the first. */
function tableFile(
  name: string,
  style: FileStyle,
  remarks: string[],
  headers: string[],
  curves: readonly Curve[],
  digits: number,
): ScanFile {
  const { separator, extension, number } = WRITING[style]
  const rows = Array.from(curves[0]!.wavelengthNm, (nm, i) =>
    [number(nm, 1), ...curves.map((curve) => number(curve.values[i]!, digits))].join(separator),
  )
  return { name: `${name}.${extension}`, text: [...remarks, headers.join(separator), ...rows, ''].join('\r\n') }
}
