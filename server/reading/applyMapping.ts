import type { ReadingMapping, ValueUnit } from '../../shared/contract/scans.js'
import { toNanometres } from '../../shared/physics/units.js'
import type { NumberedColumn } from './columns.js'
import type { WorkingTable } from './foundTables.js'
import { columnLetters } from './numerals.js'
import { shownCell } from './rawGrid.js'
import { ReadingError } from './readingError.js'
import type { ReadScan } from './readingResult.js'
import { PLAUSIBLE_NM, valueInBaseUnit, WRITTEN_WAVELENGTH_UNIT } from './units.js'

type MappedSeries = ReadingMapping['series'][number]

/** The scans of a table under a mapping, ascending in wavelength. @throws ReadingError naming line, column and value. */
export function applyMapping(table: WorkingTable, mapping: ReadingMapping, notes: string[]): ReadScan[] {
  const wavelength = columnOf(table, mapping.wavelength.column)
  const series = mapping.series.map((one) => ({ ...one, from: columnOf(table, one.column) }))
  const own = series.find((one) => one.from === wavelength)
  if (own)
    throw new ReadingError(
      'mapping-mismatch',
      `Column “${nameOf(wavelength)}” cannot be the wavelength and the values of “${own.label}” at once.`,
      { column: nameOf(wavelength) },
    )
  const nm = wavelengthsNm(table, wavelength, mapping.wavelength.unit)
  const order = ascendingOrder(table, wavelength, nm)
  const values = series.filter((one) => one.quantity !== 'noise')
  if (values.length === 0)
    throw new ReadingError('no-values', 'The mapping names no column of EQE, reflectance or irradiance.')
  return values.map((one) => {
    const points = pointsOf(table, one.from, nm, order, values.length > 1, notes)
    const noise = noiseOf(one, series)
    return {
      label: one.label || nameOf(one.from),
      quantity: one.quantity as ReadScan['quantity'],
      column: one.column,
      wavelengthNm: Float64Array.from(points, (row) => nm[row]!),
      values: Float64Array.from(points, (row) => inUnit(table, one.from, row, one.unit, nm)),
      ...(noise && { noise: Float64Array.from(points, (row) => inUnit(table, noise.from, row, noise.unit, nm)) }),
    }
  })
}

/** How a person knows the column: by its header, else by its letter. */
export const nameOf = (column: NumberedColumn): string => column.header || columnLetters(column.index)

function columnOf(table: WorkingTable, index: number): NumberedColumn {
  const column = table.columns.find((one) => one.index === index)
  if (column) return column
  throw new ReadingError(
    'mapping-mismatch',
    `The mapping names column ${columnLetters(index)}, but the table has ` +
      `${table.columns.map((one) => columnLetters(one.index)).join(', ')}.`,
    { expected: 'a mapping made for a file of this shape' },
  )
}

function wavelengthsNm(
  table: WorkingTable,
  column: NumberedColumn,
  unit: ReadingMapping['wavelength']['unit'],
): number[] {
  return column.numbers.map((value, row) => {
    const { line, cells } = table.rows[row]!
    const where = { line, column: nameOf(column), value: shownCell(cells[column.index]) }
    if (value === null) throw notANumber(where, 'a wavelength')
    if (!(value > 0))
      throw new ReadingError(
        'wavelength-not-positive',
        `Line ${line} has the wavelength ${where.value}; a wavelength is above zero.`,
        { ...where, expected: 'wavelengths above zero' },
      )
    const nm = toNanometres(value, unit)
    if (!(nm >= PLAUSIBLE_NM.from && nm <= PLAUSIBLE_NM.to))
      throw new ReadingError(
        'wavelength-range',
        `Line ${line} has the wavelength ${where.value}, which is ${Number(nm.toPrecision(6))} nm if its unit is ` +
          `${WRITTEN_WAVELENGTH_UNIT[unit]}; no scan reaches there.`,
        { ...where, expected: `another unit, or wavelengths from ${PLAUSIBLE_NM.from} to ${PLAUSIBLE_NM.to} nm` },
      )
    return nm
  })
}

/** Rows in ascending wavelength. Only a clean reversal is turned round: what goes up and down is refused. */
function ascendingOrder(table: WorkingTable, column: NumberedColumn, nm: number[]): number[] {
  const line = (row: number) => table.rows[row]!.line
  const seen = new Map<number, number>()
  nm.forEach((value, row) => {
    const before = seen.get(value)
    const written = shownCell(table.rows[row]!.cells[column.index])
    if (before !== undefined)
      throw new ReadingError(
        'repeated-wavelength',
        `The wavelength ${written} stands twice: in line ${line(before)} and in line ${line(row)}.`,
        { line: line(row), column: nameOf(column), value: written, expected: 'each wavelength once in a scan' },
      )
    seen.set(value, row)
  })
  const isDescending = nm.length > 1 && nm[1]! < nm[0]!
  const wrong = nm.findIndex((value, row) => row > 0 && value > nm[row - 1]! === isDescending)
  if (wrong > 0) {
    const written = (row: number) => shownCell(table.rows[row]!.cells[column.index])
    throw new ReadingError(
      'unsorted-wavelength',
      `The wavelengths go up and down: line ${line(wrong)} has ${written(wrong)} after ${written(wrong - 1)}.`,
      { line: line(wrong), column: nameOf(column), value: written(wrong), expected: 'wavelengths that run one way' },
    )
  }
  const rows = nm.map((_, row) => row)
  return isDescending ? rows.reverse() : rows
}

/** Rows of the scan. Empty cells are left out where several columns share the wavelengths or at the ends of the scan. */
function pointsOf(
  table: WorkingTable,
  column: NumberedColumn,
  nm: number[],
  order: number[],
  hasCompany: boolean,
  notes: string[],
): number[] {
  const isEmpty = (row: number) => shownCell(table.rows[row]!.cells[column.index]) === ''
  const points = order.filter((row) => !isEmpty(row))
  const [first, last] = [points[0], points.at(-1)]
  if (first === undefined || last === undefined || points.length < 2)
    throw new ReadingError(
      'too-few-rows',
      `Column “${nameOf(column)}” has ${points.length === 1 ? 'one value' : 'no values'}; a scan needs at least two.`,
      { line: table.rows[0]!.line, column: nameOf(column) },
    )
  const inside = order.filter((row) => isEmpty(row) && nm[row]! > nm[first]! && nm[row]! < nm[last]!)
  if (inside.length > 0 && !hasCompany) {
    const { line } = table.rows[Math.min(...inside)]!
    throw new ReadingError('missing-value', `Line ${line} has no value in column “${nameOf(column)}”.`, {
      line,
      column: nameOf(column),
      value: '',
      expected: 'a value at each wavelength, or no such line',
    })
  }
  if (points.length < order.length)
    notes.push(`Column “${nameOf(column)}” has ${order.length - points.length} empty cells; they were left out.`)
  return points
}

/** The noise column that stands next behind the values, before the values of another series. */
function noiseOf(one: MappedSeries & { from: NumberedColumn }, series: (MappedSeries & { from: NumberedColumn })[]) {
  const at = series.indexOf(one)
  const next = series[at + 1]
  if (next?.quantity === 'noise') return next
  const noises = series.filter((other) => other.quantity === 'noise')
  const values = series.filter((other) => other.quantity !== 'noise')
  return noises.length === values.length ? noises[values.indexOf(one)] : undefined
}

function inUnit(table: WorkingTable, column: NumberedColumn, row: number, unit: ValueUnit, nm: number[]): number {
  const value = column.numbers[row]
  const { line, cells } = table.rows[row]!
  if (value === null || value === undefined)
    throw notANumber({ line, column: nameOf(column), value: shownCell(cells[column.index]) }, 'a number')
  return valueInBaseUnit(value, unit, nm[row]!)
}

function notANumber(where: { line: number; column: string; value: string }, expected: string): ReadingError {
  const what =
    where.value === '' ? `no value in column “${where.column}”` : `“${where.value}” in column “${where.column}”`
  return new ReadingError('not-a-number', `Line ${where.line} has ${what} where ${expected} should be.`, {
    ...where,
    expected,
  })
}
