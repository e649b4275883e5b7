import { readFile } from 'node:fs/promises'
import { isAbsolute, join } from 'node:path'
import type { ValueUnit, WavelengthUnit } from '../shared/contract/scans.js'
import { makeCurve, type Curve } from '../shared/physics/curve.js'
import { readMeasurementFile } from '../server/reading/readMeasurementFile.js'
import { ReadingError } from '../server/reading/readingError.js'
import type { ColumnChoice, FoundColumn, FoundTable, ReadScan, ReadingResult } from '../server/reading/readingResult.js'
import { CommandError } from './commandError.js'
import type { ScanReference } from './deviceFile.js'

type Wanted = 'eqe' | 'reflectance' | 'irradiance'

export const WAVELENGTH_UNITS: Record<string, WavelengthUnit> = {
  nm: 'nm',
  um: 'um',
  µm: 'um',
  μm: 'um',
  angstrom: 'angstrom',
  å: 'angstrom',
  ev: 'eV',
}
const VALUE_UNITS: Record<string, ValueUnit> = {
  '%': 'percent',
  percent: 'percent',
  fraction: 'fraction',
  '1': 'fraction',
  'a/w': 'A/W',
}

/** The curve of one quantity in a file. @throws CommandError: one sentence with file, line and reason. */
export async function readScan(
  folder: string,
  reference: ScanReference,
  wanted: Wanted,
  junctionName: string,
): Promise<Curve> {
  const { path, bytes } = await openFile(folder, reference.file)
  try {
    const result = readAsAsked(path, bytes, reference, wanted)
    const scan = chooseScan(path, result.scans, wanted, junctionName)
    return makeCurve(scan.wavelengthNm, scan.values)
  } catch (error) {
    if (!(error instanceof ReadingError)) throw error
    const { line } = error.details
    throw new CommandError(`${path}${line === undefined ? '' : `, line ${line}`}: ${error.message}`)
  }
}

/** A file named beside another. @throws CommandError when it cannot be opened. */
export async function openFile(folder: string, file: string): Promise<{ path: string; bytes: Buffer }> {
  const path = isAbsolute(file) ? file : join(folder, file)
  const bytes = await readFile(path).catch((error: NodeJS.ErrnoException) => {
    throw new CommandError(
      error.code === 'ENOENT'
        ? `${path}: there is no such file.`
        : `${path} cannot be opened (${error.code ?? error.message}).`,
    )
  })
  return { path, bytes }
}

function readAsAsked(path: string, bytes: Uint8Array, reference: ScanReference, wanted: Wanted): ReadingResult {
  const { sheet, columns, units } = reference
  const valueColumn = wanted === 'irradiance' ? undefined : columns[wanted]
  const valueUnit = wanted === 'irradiance' ? undefined : units[wanted]
  const asked = [sheet, columns.wavelength, valueColumn, units.wavelength, valueUnit].some((one) => one !== undefined)
  if (!asked) return single(path, readMeasurementFile(bytes, path, { expected: wanted }))

  const { tables, taken } = proposal(bytes, path, wanted)
  const ofSheet = tables.filter((one) => sheet === undefined || one.sheet === sheet)
  const named = columns.wavelength ?? valueColumn
  const table =
    ofSheet.find((one) => valueColumn !== undefined && findColumn(one, valueColumn)) ??
    ofSheet.find((one) => named !== undefined && findColumn(one, named)) ??
    ofSheet.find((one) => one.tableIndex === taken) ??
    ofSheet[0]
  if (!table) {
    const names = [...new Set(tables.map((one) => one.sheet).filter(Boolean))].join(', ')
    throw new CommandError(`${path} has no sheet "${sheet}"${names ? `; it has ${names}` : ''}.`)
  }
  const index = (column: string | number) => columnOf(path, table, column).index
  const choice: ColumnChoice = {
    tableIndex: table.tableIndex,
    quantity: wanted,
    ...(columns.wavelength !== undefined && { wavelengthColumn: index(columns.wavelength) }),
    ...(valueColumn !== undefined && { valueColumns: [index(valueColumn)] }),
    ...(units.wavelength !== undefined && { wavelengthUnit: unitOf(path, units.wavelength, WAVELENGTH_UNITS) }),
    ...(valueUnit !== undefined && { valueUnit: unitOf(path, valueUnit, VALUE_UNITS) }),
  }
  return single(path, readMeasurementFile(bytes, path, { expected: wanted, choice }))
}

/** Without a screen to choose on, a file with several scans one after the other is not guessed at. */
function single(path: string, result: ReadingResult): ReadingResult {
  const [next] = result.appendedTables
  if (next === undefined) return result
  const line = result.tables[next]!.firstLine
  throw new CommandError(
    `${path}, line ${line}: the wavelengths begin again, so the file holds ${result.appendedTables.length + 1} scans ` +
      'one after the other; keep one scan in a file.',
  )
}

/** The tables of a file even where no mapping could be proposed; null for the index of the one that would be taken. */
export function proposal(
  bytes: Uint8Array,
  path: string,
  wanted: Wanted,
): { tables: FoundTable[]; taken: number | null } {
  try {
    const { tables, mapping } = readMeasurementFile(bytes, path, { expected: wanted })
    return { tables, taken: mapping.tableIndex }
  } catch (error) {
    if (error instanceof ReadingError && error.details.tables) return { tables: error.details.tables, taken: null }
    throw error
  }
}

/** A column by its header, whatever its case, or by its number from 1. */
export function columnOf(path: string, table: FoundTable, wanted: string | number): FoundColumn {
  const column = findColumn(table, wanted)
  if (!column)
    throw new CommandError(
      `${path} has no column ${typeof wanted === 'number' ? wanted : `"${wanted}"`}; it has ${table.columns.map((one) => `"${one.header}"`).join(', ')}.`,
    )
  return column
}

const findColumn = (table: FoundTable, wanted: string | number): FoundColumn | undefined =>
  typeof wanted === 'number'
    ? table.columns.find((one) => one.index === wanted - 1)
    : table.columns.find((one) => one.header.trim().toLowerCase() === wanted.trim().toLowerCase())

export function unitOf<Unit>(path: string, text: string, units: Record<string, Unit>): Unit {
  const unit = units[text.trim().toLowerCase()]
  if (unit === undefined)
    throw new CommandError(`${path}: "${text}" is no unit known here; there are ${Object.keys(units).join(', ')}.`)
  return unit
}

function chooseScan(path: string, scans: readonly ReadScan[], wanted: Wanted, junctionName: string): ReadScan {
  const fitting = scans.filter((scan) => scan.quantity === wanted)
  const named = fitting.filter((scan) => scan.label.toLowerCase().includes(junctionName.toLowerCase()))
  if (fitting.length === 1) return fitting[0]!
  if (named.length === 1) return named[0]!
  const what = { eqe: 'EQE', reflectance: 'reflectance', irradiance: 'irradiance' }[wanted]
  if (fitting.length === 0)
    throw new CommandError(
      `${path} holds no ${what}; it holds ${scans.map((scan) => `${scan.quantity} "${scan.label}"`).join(', ') || 'nothing that was understood'}.`,
    )
  throw new CommandError(
    `${path} holds ${fitting.length} columns of ${what} (${fitting.map((scan) => `"${scan.label}"`).join(', ')}); say which with "columns": {"${wanted}": …}.`,
  )
}
