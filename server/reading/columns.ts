import type { WavelengthUnit } from '../../shared/contract/scans.js'
import type { Block } from './blocks.js'
import { roleInHeader, namesJunction, quantityInContext } from './headerRole.js'
import type { BlockHeaders } from './headers.js'
import { parseNumeral, type DecimalMark } from './numerals.js'
import { isEmptyCell } from './rawGrid.js'
import type { ColumnRole, FoundColumn } from './readingResult.js'
import { unitInHeader, WRITTEN_WAVELENGTH_UNIT } from './units.js'
import { looksLikeWavelengths, wavelengthUnitByRange } from './wavelengthColumn.js'

/** A column with its numbers; null stands for an empty cell or a word. */
export interface NumberedColumn extends FoundColumn {
  numbers: (number | null)[]
  /** Whether a percent sign in cells or the workbook's format tells how the numbers are meant. */
  cellUnit: 'percent' | 'fraction' | null
  /** Words above the header: the name of a device or of a group of columns. */
  group: string
}

/** What to take columns for whose headers say nothing. */
export interface ColumnContext {
  fileName: string
  expected: ColumnRole | null
}

/** Says of each column of a block what it holds, by header and unit first, by the range of its numbers otherwise. */
export function guessColumns(
  block: Block,
  { headers, groups, title }: BlockHeaders,
  mark: DecimalMark,
  context: ColumnContext,
): NumberedColumn[] {
  const columns = headers.map((header, i) => describe(block, i, header, groups[i] ?? '', mark))
  if (isPlainXy(columns)) columns.forEach((column) => Object.assign(column, unknown))
  settleWavelength(columns)
  const baseName = context.fileName.replace(/\.[^.]*$/, '')
  const told = quantityInContext([title, block.grid.sheet ?? '', baseName])
  const quantity = context.expected ?? told ?? 'eqe'
  const why = context.expected
    ? 'The file is read for it.'
    : told
      ? 'The title or the name of the file speaks of it.'
      : 'Its numbers lie where EQEs do, and the header says nothing else.'
  const isQuantityKnown = columns.some((column) => QUANTITY_ROLES.has(column.role))
  for (const column of columns) {
    if (column.role !== 'ignored' || column.confidence > 0) continue
    const { numbers } = column
    const isNumeric = numbers.filter((value) => value !== null).length >= Math.max(2, numbers.length * 0.1)
    const isLeftOut = isQuantityKnown && !namesJunction(column.header)
    if (!isNumeric) column.why = 'Holds words or nothing.'
    else if (isLeftOut) column.why = 'The header is not known, and other columns name their quantity.'
    else if (!fits(quantity, numbers)) column.why = 'The header is not known, and the numbers fit no quantity.'
    else Object.assign(column, { role: quantity, confidence: column.header === '' ? 0.5 : 0.6, why })
  }
  return columns
}

const QUANTITY_ROLES = new Set<ColumnRole>(['eqe', 'responsivity', 'reflectance', 'transmittance', 'irradiance'])
const unknown = { role: 'ignored', confidence: 0, why: '' } as const

function describe(block: Block, i: number, header: string, group: string, mark: DecimalMark): NumberedColumn {
  const index = block.fromColumn + i
  const cells = block.rows.map((row) => row.cells[index])
  const numbers = cells.map((cell) => (isEmptyCell(cell) ? null : parseNumeral(cell!, mark)))
  const named = roleInHeader(header) ?? (group === '' ? null : roleInGroup(group, header))
  const unit = unitInHeader(header) ?? unitInHeader(group)
  const hasPercentSigns = cells.filter((cell) => typeof cell === 'string' && cell.trimEnd().endsWith('%')).length > 1
  return {
    index,
    header,
    group,
    numbers,
    unit: unit === null || unit.of === 'unknown' ? null : unit.unit,
    cellUnit: block.grid.percentFormatted.has(index) ? 'fraction' : hasPercentSigns ? 'percent' : null,
    ...(named ? { role: named.role, confidence: 0.95, why: `The header says “${named.by}”.` } : unknown),
  }
}

function roleInGroup(group: string, header: string) {
  const role = roleInHeader(group)
  return role && role.role !== 'wavelength' && role.role !== 'ignored' && header !== '' ? role : null
}

/** Two columns headed x and y are no lock-in signals but a curve. */
const isPlainXy = (columns: NumberedColumn[]): boolean =>
  columns.length === 2 && columns[0]!.role === 'signal-x' && columns[1]!.role === 'signal-y'

/** Without a header that says so, the first column that runs one way within the range of wavelengths is taken. */
function settleWavelength(columns: NumberedColumn[]): void {
  const named = columns.filter((column) => column.role === 'wavelength')
  if (named.length > 0) {
    for (const column of named) column.unit ??= wavelengthUnitByRange(column.numbers).unit
    return
  }
  const column = columns.find(({ numbers, role }) => role === 'ignored' && looksLikeWavelengths(numbers))
  if (!column) return
  const { unit, isAmbiguous } = wavelengthUnitByRange(column.numbers)
  Object.assign(column, {
    role: 'wavelength',
    unit: isWavelengthUnit(column.unit) ? column.unit : unit,
    confidence: isAmbiguous ? 0.5 : 0.7,
    why: `Its numbers run one way, in the range of wavelengths in ${WRITTEN_WAVELENGTH_UNIT[unit]}.`,
  })
}

export const isWavelengthUnit = (unit: string | null): unit is WavelengthUnit =>
  unit === 'nm' || unit === 'um' || unit === 'angstrom' || unit === 'eV'

function fits(role: ColumnRole, numbers: (number | null)[]): boolean {
  const values = numbers.filter((value) => value !== null)
  const largest = values.reduce((most, value) => Math.max(most, value), -Infinity)
  const smallest = values.reduce((least, value) => Math.min(least, value), Infinity)
  if (role === 'irradiance') return smallest >= 0 && largest > 0
  return largest <= 200 && smallest >= -50
}
