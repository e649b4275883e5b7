import { numeralKind, type RawCell } from './numerals.js'
import { isEmptyCell, type RawGrid, type RawRow } from './rawGrid.js'

/** Rows of numbers that stand together, in the columns that belong together, and the lines of words above them. */
export interface Block {
  grid: RawGrid
  /** Lines above, from the end of the block before; the nearest last. */
  above: RawRow[]
  rows: RawRow[]
  fromColumn: number
  toColumn: number
}

type RowKind = 'blank' | 'numbers' | 'mixed' | 'words'

/**
 * Blocks of numbers of a grid. A line with a word among its numbers belongs to the block when numbers stand before and
 * behind it, so that a missing or spoilt value is found where it is and does not silently end the table.
 */
export function findBlocks(grid: RawGrid): Block[] {
  const kinds = grid.rows.map((row) => kindOf(row))
  const strict = kinds.filter((kind) => kind === 'numbers').length >= 2
  const isData = (i: number) =>
    strict ? kinds[i] === 'numbers' : kinds[i] === 'mixed' && numberCount(grid.rows[i]!) >= 2
  const blocks: Block[] = []
  let endOfLast = 0
  let i = 0
  while (i < grid.rows.length) {
    if (!isData(i)) {
      i++
      continue
    }
    const start = leadsIn(grid.rows, kinds, i, endOfLast) ? i - 1 : i
    const end = endOfBlock(grid.rows, kinds, i)
    const rows = grid.rows.slice(start, end).filter((_, k) => kinds[start + k] !== 'blank')
    if (rows.length >= 2) {
      blocks.push(...sideBySide(grid, grid.rows.slice(endOfLast, start), rows))
      endOfLast = end
    }
    i = end
  }
  return blocks
}

function kindOf(row: RawRow): RowKind {
  const filled = row.cells.filter((cell) => !isEmptyCell(cell))
  if (filled.length === 0) return 'blank'
  if (row.isComment) return 'words'
  const numbers = numberCount(row)
  if (numbers === filled.length) return numbers >= 2 ? 'numbers' : 'mixed'
  return numbers > 0 ? 'mixed' : 'words'
}

const leftmost = (row: RawRow): RawCell => row.cells.find((cell) => !isEmptyCell(cell)) ?? ''
const startsWithNumber = (row: RawRow) => numeralKind(leftmost(row)) !== null
const numberCount = (row: RawRow) => row.cells.filter((cell) => numeralKind(cell) !== null).length
const filledCount = (row: RawRow) => row.cells.filter((cell) => !isEmptyCell(cell)).length

/** A line `300, overload` just above the numbers is data, not a header. */
function leadsIn(rows: RawRow[], kinds: RowKind[], at: number, floor: number): boolean {
  if (at <= floor || kinds[at - 1] !== 'mixed') return false
  return startsWithNumber(rows[at - 1]!) && rows[at - 1]!.cells.length === rows[at]!.cells.length
}

function endOfBlock(rows: RawRow[], kinds: RowKind[], start: number): number {
  let end = start + 1
  for (let i = start + 1; i < rows.length; i++) {
    const kind = kinds[i]!
    if (kind === 'words') break
    if (kind === 'numbers' || (kind === 'mixed' && belongs(rows[i]!, rows[start]!))) end = i + 1
  }
  return end
}

/** A spoilt line goes on with the table: it starts with a number in the same column and is about as wide. */
function belongs(row: RawRow, first: RawRow): boolean {
  const column = first.cells.findIndex((cell) => !isEmptyCell(cell))
  if (filledCount(row) === 1 && filledCount(first) > 2) return true
  return numeralKind(row.cells[column] ?? '') !== null || row.cells.some((cell) => numeralKind(cell) !== null)
}

/** Tables beside each other have blank columns between them; a lone column goes with the table to its left. */
function sideBySide(grid: RawGrid, above: RawRow[], rows: RawRow[]): Block[] {
  const width = Math.max(...rows.map((row) => row.cells.length))
  const isUsed = Array.from({ length: width }, (_, c) => rows.some((row) => !isEmptyCell(row.cells[c])))
  const groups: [number, number][] = []
  for (let c = 0; c < width; c++) {
    if (!isUsed[c]) continue
    if (c > 0 && isUsed[c - 1]) groups.at(-1)![1] = c
    else groups.push([c, c])
  }
  const joined = groups.reduce<[number, number][]>((list, [from, to]) => {
    const before = list.at(-1)
    if (before && (from === to || before[0] === before[1])) before[1] = to
    else list.push([from, to])
    return list
  }, [])
  return joined.map(([fromColumn, toColumn]) => ({
    grid,
    above,
    rows: rows.filter((row) => row.cells.slice(fromColumn, toColumn + 1).some((cell) => !isEmptyCell(cell))),
    fromColumn,
    toColumn,
  }))
}

/** Whether a grid has a single column of numbers, which lacks its wavelengths. */
export function isSingleColumn(grid: RawGrid): boolean {
  const filled = grid.rows.filter((row) => filledCount(row) > 0 && !row.isComment)
  const numbers = filled.filter((row) => filledCount(row) === 1 && startsWithNumber(row))
  return numbers.length >= 3 && numbers.length >= filled.length / 2
}
