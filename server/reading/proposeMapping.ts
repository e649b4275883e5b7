import type { Quantity, ReadingMapping, ValueUnit } from '../../shared/contract/scans.js'
import { isWavelengthUnit, type NumberedColumn } from './columns.js'
import type { WorkingTable } from './foundTables.js'
import { plainWords, roleInHeader } from './headerRole.js'
import { ReadingError } from './readingError.js'
import type { ColumnChoice, ColumnRole } from './readingResult.js'
import { unitInHeader, WRITTEN_WAVELENGTH_UNIT } from './units.js'
import { wavelengthUnitByRange } from './wavelengthColumn.js'

export interface Proposal {
  mapping: ReadingMapping
  notes: string[]
}

const QUANTITY_OF: Partial<Record<ColumnRole, Quantity>> = {
  eqe: 'eqe',
  responsivity: 'eqe',
  reflectance: 'reflectance',
  transmittance: 'transmittance',
  irradiance: 'irradiance',
  noise: 'noise',
}
const RAW_ROLES = new Set<ColumnRole>(['signal-x', 'signal-y', 'magnitude', 'phase', 'reference', 'monitor', 'dark'])

/**
 * What the table seems to hold, as a mapping that a person may correct; units that were stated are taken as they are.
 * @throws ReadingError when nothing can be read.
 */
export function proposeMapping(
  table: WorkingTable,
  fileName: string,
  stated: Pick<ColumnChoice, 'wavelengthUnit' | 'valueUnit'> = {},
): Proposal {
  const notes: string[] = []
  const wavelength = table.columns.find((column) => column.role === 'wavelength')
  if (!wavelength)
    throw new ReadingError('no-wavelength', `No column of ${fileName} holds wavelengths that run one way.`, {
      line: table.rows[0]!.line,
      expected: 'a column of wavelengths in nm, µm or Å, or of photon energies in eV',
    })
  const chosen = table.columns.filter((column) => QUANTITY_OF[column.role] && column !== wavelength)
  if (!chosen.some((column) => column.role !== 'noise')) throw nothingToRead(table, fileName)
  if (stated.valueUnit === undefined) refuseUnknownUnits(chosen, table)
  const series = chosen.map((column) => ({
    column: column.index,
    quantity: QUANTITY_OF[column.role]!,
    unit: stated.valueUnit ?? unitOf(column, chosen, notes),
    label: labelOf(column, table, fileName).slice(0, 200),
  }))
  return {
    mapping: {
      sheet: table.sheet,
      tableIndex: table.tableIndex,
      wavelength: { column: wavelength.index, unit: stated.wavelengthUnit ?? wavelengthUnit(wavelength, notes) },
      series,
    },
    notes,
  }
}

function nothingToRead(table: WorkingTable, fileName: string): ReadingError {
  const line = table.rows[0]!.line
  if (table.columns.some((column) => RAW_ROLES.has(column.role)))
    return new ReadingError('raw-signals-only', `${fileName} holds raw lock-in signals but no EQE.`, {
      line,
      expected: 'a column of EQE, %, or responsivity, A/W; or say which column is the EQE',
    })
  return new ReadingError('no-values', `${fileName} has wavelengths, but no column beside them that can be read.`, {
    line,
    expected: 'a column of EQE, responsivity, reflectance or irradiance',
  })
}

function refuseUnknownUnits(columns: NumberedColumn[], table: WorkingTable): void {
  for (const column of columns) {
    const unit = unitInHeader(column.header)
    if (unit?.of === 'unknown')
      throw new ReadingError('unknown-unit', `The unit of the column “${column.header}” cannot be read.`, {
        line: table.rows[0]!.line,
        column: column.header,
        expected: 'fraction, %, A/W; for irradiance W/m²/nm, W/m²/µm or µW/cm²/nm',
      })
  }
}

function wavelengthUnit(column: NumberedColumn, notes: string[]): ReadingMapping['wavelength']['unit'] {
  const stated = unitInHeader(column.header)
  const { unit, isAmbiguous } = wavelengthUnitByRange(column.numbers)
  if (stated?.of === 'wavelength') return stated.unit
  const taken = isWavelengthUnit(column.unit) ? column.unit : unit
  notes.push(
    isAmbiguous
      ? `Ambiguous: no unit is given for the wavelengths; their range fits µm and eV, ${WRITTEN_WAVELENGTH_UNIT[taken]} was taken.`
      : `No unit is given for the wavelengths; from their range ${WRITTEN_WAVELENGTH_UNIT[taken]} was taken.`,
  )
  return taken
}

/** A column above 1.5 is in percent (common practice); columns of one quantity without a unit are taken alike. */
function unitOf(column: NumberedColumn, all: NumberedColumn[], notes: string[]): ValueUnit {
  const name = column.header || `column ${column.index + 1}`
  const stated = unitInHeader(column.header) ?? unitInHeader(column.group)
  const largest = largestOf([column])
  if (column.role === 'irradiance') {
    if (stated?.of === 'value' && !['fraction', 'percent', 'A/W'].includes(stated.unit)) return stated.unit
    const unit = largest > 300 ? 'W/m2/um' : largest > 15 ? 'uW/cm2/nm' : 'W/m2/nm'
    notes.push(`Ambiguous: no unit is given for “${name}”; from its largest value ${unit} was taken.`)
    return unit
  }
  if (column.cellUnit === 'fraction') {
    notes.push(`The workbook shows “${name}” as percentages, so its numbers were taken as fractions.`)
    return 'fraction'
  }
  if (column.role === 'responsivity') return 'A/W'
  if (column.cellUnit === 'percent') return 'percent'
  if (stated?.of === 'value' && ['fraction', 'percent', 'A/W'].includes(stated.unit)) {
    if (
      stated.unit === 'percent' &&
      largestOf(all.filter((other) => other.role === column.role)) <= 1.5 &&
      column.role !== 'noise'
    )
      notes.push(
        `Ambiguous: “${name}” is headed in percent, but its largest value is ${largest}; it was read as percent. ` +
          'If the numbers are fractions, change the unit.',
      )
    if (stated.unit === 'fraction' && largest > 1.5)
      notes.push(`Ambiguous: “${name}” is headed as a fraction, but its largest value is ${largest}.`)
    return stated.unit
  }
  if (column.role === 'noise') {
    const before = all.filter((other) => other.role !== 'noise' && other.index < column.index).at(-1)
    return before ? unitOf(before, all, []) : 'fraction'
  }
  const together = largestOf(all.filter((other) => other.role === column.role && unitInHeader(other.header) === null))
  const unit = together > 1.5 ? 'percent' : 'fraction'
  const isAmbiguous = together > 1.02 && together <= 1.5
  notes.push(
    isAmbiguous
      ? `Ambiguous: no unit is given for “${name}” and its largest value is ${largest}; a fraction was taken.`
      : `No unit is given for “${name}”; from its largest value, ${largest}, ${unit === 'percent' ? 'percent' : 'a fraction'} was taken.`,
  )
  return unit
}

const largestOf = (columns: NumberedColumn[]): number =>
  columns.reduce(
    (most, { numbers }) => numbers.reduce<number>((larger, value) => Math.max(larger, value ?? -Infinity), most),
    -Infinity,
  )

/** A header that names more than quantity and unit is the label; otherwise the group, the title, the file. */
function labelOf(column: NumberedColumn, table: WorkingTable, fileName: string): string {
  const bare = column.header
    .replace(/[([{][^)\]}]*[)\]}]/g, '')
    .replace(/\s+/g, ' ')
    .trim()
  const above = column.group || table.title
  const role = roleInHeader(column.header)
  const saysOnlyQuantity = bare === '' || (role !== null && plainWords(bare) === plainWords(role.by))
  if (saysOnlyQuantity) return above || bare || fileName.replace(/\.[^.]*$/, '')
  return column.group && column.group !== column.header ? `${column.group} ${bare}` : bare
}
