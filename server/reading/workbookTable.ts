import { read, utils, type CellObject, type WorkSheet } from 'xlsx'
import { READING_LIMITS } from './limits.js'
import type { RawCell } from './numerals.js'
import { isEmptyCell, type RawGrid, type RawRow } from './rawGrid.js'
import { ReadingError } from './readingError.js'
import { checkWorkbookZip, damagedWorkbook } from './zipDirectory.js'

/** Cells of every sheet of an XLSX workbook that holds any, in full precision. @throws ReadingError */
export function workbookTable(bytes: Uint8Array, fileName: string): RawGrid[] {
  checkWorkbookZip(bytes, fileName)
  const workbook = unpack(bytes, fileName)
  const names = workbook.SheetNames.slice(0, READING_LIMITS.sheets)
  const grids = names.flatMap((name) => {
    const sheet = workbook.Sheets[name]
    const grid = sheet ? sheetGrid(name, sheet) : null
    return grid && grid.rows.some((row) => row.cells.length > 0) ? [grid] : []
  })
  if (grids.length === 0)
    throw new ReadingError('empty', `${fileName} is an empty workbook: none of its sheets holds a cell.`, {
      expected: 'a sheet with a column of wavelengths',
    })
  return grids
}

function unpack(bytes: Uint8Array, fileName: string) {
  try {
    return read(bytes, {
      type: 'array',
      dense: true,
      cellFormula: false,
      cellHTML: false,
      cellText: false,
      cellNF: true,
      sheetRows: READING_LIMITS.lines,
    })
  } catch (error) {
    throw damagedWorkbook(fileName, error instanceof Error ? error.message.toLowerCase() : 'it cannot be unpacked')
  }
}

function sheetGrid(name: string, sheet: WorkSheet): RawGrid | null {
  const reference = sheet['!ref']
  const data = sheet['!data']
  if (!reference || !data) return null
  const { s: start, e: end } = utils.decode_range(reference)
  if (end.c + 1 > READING_LIMITS.columns)
    throw new ReadingError(
      'too-many-columns',
      `Sheet ${name} reaches to column ${utils.encode_col(end.c)}; at most ${READING_LIMITS.columns} columns are read.`,
    )
  const percentFormatted = new Set<number>()
  const rows: RawRow[] = []
  for (let r = start.r; r <= end.r; r++) {
    const cells = Array.from(data[r] ?? [], (cell: CellObject | undefined) => cellValue(cell))
    data[r]?.forEach((cell, c) => {
      if (cell?.t === 'n' && String(cell.z ?? '').includes('%')) percentFormatted.add(c)
    })
    while (cells.length > 0 && isEmptyCell(cells.at(-1))) cells.pop()
    const isComment = typeof cells[0] === 'string' && cells[0].trimStart().startsWith('#')
    if (isComment) cells[0] = String(cells[0]).replace(/^\s*#+\s*/, '')
    rows.push({ line: r + 1, cells, isComment })
  }
  return { sheet: name, separator: 'sheet', rows, percentFormatted }
}

function cellValue(cell: CellObject | undefined): RawCell {
  if (!cell || cell.v === undefined || cell.v === null) return ''
  if (cell.t === 'n' && typeof cell.v === 'number') return cell.v
  if (cell.t === 'e') return cell.w ?? '#ERROR'
  return String(cell.v).replace(/\s+/g, ' ').trim()
}
