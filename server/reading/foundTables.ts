import type { ReadTable } from '../../shared/contract/scans.js'
import { findBlocks, isSingleColumn, type Block } from './blocks.js'
import { guessColumns, type ColumnContext, type NumberedColumn } from './columns.js'
import { headersOf } from './headers.js'
import { numeralKind, type DecimalMark } from './numerals.js'
import { cellText, isEmptyCell, shownCell, type RawGrid, type RawRow } from './rawGrid.js'
import { ReadingError } from './readingError.js'
import type { FoundColumn, FoundTable } from './readingResult.js'
import { appendedScans } from './wavelengthColumn.js'

/** A table with everything the reader needs of it; `found` is what goes to the screen. */
export interface WorkingTable {
  sheet: string | null
  tableIndex: number
  title: string
  rows: RawRow[]
  columns: NumberedColumn[]
  mark: DecimalMark
  /** Index of the table of which this one repeats the wavelengths, further down in the file. */
  repeats: number | null
}

/** Tables of all grids, in the order of the file. @throws ReadingError when there is none. */
export function findTables(grids: readonly RawGrid[], context: ColumnContext): WorkingTable[] {
  const tables: WorkingTable[] = []
  for (const grid of grids) {
    const blocks = findBlocks(grid)
    const mark = decimalMark(blocks)
    for (const block of blocks) {
      const headers = headersOf(block)
      const columns = guessColumns(block, headers, mark, context)
      for (const part of splitAtWavelengths(columns)) addScans(tables, block, part, headers.title, mark)
    }
  }
  if (tables.length === 0) throw noTable(grids, context.fileName)
  return tables
}

export function foundTable(table: WorkingTable, previewRows: number): FoundTable {
  const { sheet, tableIndex, title, rows, columns } = table
  return {
    sheet,
    tableIndex,
    title,
    firstLine: rows[0]!.line,
    lastLine: rows.at(-1)!.line,
    columns: columns.map(({ index, header, role, unit, confidence, why }): FoundColumn => {
      return { index, header, role, unit, confidence, why }
    }),
    rows: rows.slice(0, previewRows).map((row) => columns.map((column) => cellText(row.cells[column.index]))),
    rowCount: rows.length,
  } satisfies ReadTable
}

/** The mark that the file's numbers are written with. @throws ReadingError naming the first number that differs. */
function decimalMark(blocks: readonly Block[]): DecimalMark {
  let first: { mark: DecimalMark; line: number; value: string } | null = null
  for (const { rows, fromColumn, toColumn } of blocks)
    for (const row of rows)
      for (const cell of row.cells.slice(fromColumn, toColumn + 1)) {
        const kind = numeralKind(cell)
        if (kind === null || kind === 'whole') continue
        const value = shownCell(cell)
        if (kind === 'grouped')
          throw new ReadingError(
            'mixed-decimal-marks',
            `Line ${row.line} has the number ${value} with a point and a comma, so its decimal mark is uncertain.`,
            { line: row.line, value, expected: 'numbers without a mark for thousands' },
          )
        first ??= { mark: kind, line: row.line, value }
        if (kind !== first.mark)
          throw new ReadingError(
            'mixed-decimal-marks',
            `The decimal marks are mixed: line ${first.line} has ${first.value}, line ${row.line} has ${value}.`,
            { line: row.line, value, expected: 'one decimal mark, point or comma, in the whole file' },
          )
      }
  return first?.mark ?? '.'
}

/** A second column of wavelengths that values follow begins a table of its own. */
function splitAtWavelengths(columns: NumberedColumn[]): NumberedColumn[][] {
  const parts: NumberedColumn[][] = [[]]
  columns.forEach((column, i) => {
    const part = parts.at(-1)!
    const at = part.findIndex((other) => other.role === 'wavelength')
    const isNext = column.role === 'wavelength' && at >= 0 && part.length > at + 1
    const isFollowed = i + 1 < columns.length && columns[i + 1]!.role !== 'wavelength'
    const hasOwnUnit = part[at]?.unit === column.unit
    if (isNext && isFollowed && hasOwnUnit) parts.push([column])
    else part.push(column)
  })
  return parts
}

function addScans(
  tables: WorkingTable[],
  block: Block,
  columns: NumberedColumn[],
  title: string,
  mark: DecimalMark,
): void {
  const isUsed = block.rows.map((row) => columns.some((column) => !isEmptyCell(row.cells[column.index])))
  const rows = block.rows.filter((_, i) => isUsed[i])
  const kept = columns.map((column) => ({ ...column, numbers: column.numbers.filter((_, i) => isUsed[i]) }))
  const wavelength = kept.find((column) => column.role === 'wavelength')
  const runs = wavelength ? appendedScans(wavelength.numbers) : [{ from: 0, to: rows.length - 1 }]
  const first = tables.length
  runs.forEach(({ from, to }, i) => {
    tables.push({
      sheet: block.grid.sheet,
      tableIndex: tables.length,
      title: runs.length > 1 ? `${title} scan ${i + 1} of ${runs.length}`.trim() : title || groupTitle(kept),
      rows: rows.slice(from, to + 1),
      columns: kept.map((column) => ({ ...column, numbers: column.numbers.slice(from, to + 1) })),
      mark,
      repeats: i > 0 ? first : null,
    })
  })
}

/** The name above a table when all its columns share it. */
function groupTitle(columns: NumberedColumn[]): string {
  const groups = new Set(columns.map((column) => column.group))
  return groups.size === 1 ? [...groups][0]! : ''
}

function noTable(grids: readonly RawGrid[], fileName: string): ReadingError {
  const expected = 'a column of wavelengths and at least one column of values, two rows or more'
  if (grids.some(isSingleColumn))
    return new ReadingError('one-column', `${fileName} has only one column of numbers; its wavelengths are missing.`, {
      expected,
    })
  const single = grids.flatMap((grid) => grid.rows).find((row) => isNumberRow(row))
  if (single)
    return new ReadingError(
      'too-few-rows',
      `${fileName} has a single row of numbers (line ${single.line}); a scan needs at least two rows.`,
      { line: single.line, expected },
    )
  return new ReadingError('no-table', `${fileName} holds no table of numbers.`, { expected })
}

const isNumberRow = (row: RawRow): boolean =>
  row.cells.filter((cell) => numeralKind(cell) !== null).length >= 2 &&
  row.cells.every((cell) => isEmptyCell(cell) || numeralKind(cell) !== null)
