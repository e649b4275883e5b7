import type { Block } from './blocks.js'
import { numeralKind } from './numerals.js'
import { cellText, type RawRow } from './rawGrid.js'
import { unitInHeader } from './units.js'

/** What stands above the columns of a block. */
export interface BlockHeaders {
  /** One a column: the header with its unit. */
  headers: string[]
  /** One a column: words above the header, as the names of devices or of a group of columns. */
  groups: string[]
  /** A line of one cell above the table. */
  title: string
}

/** How many lines above the numbers may hold headers and names. */
const LINES_LOOKED_AT = 8
const LONGEST_HEADER = 80
const BARE_UNIT =
  /^[([]?\s*(?:[-–1%]|a\.?\s?u\.?|arb\.?\s?u\w*\.?|[mµuμn]?[AVWs]|k?Hz|°|°?C|K|deg|degrees?|rad)\s*[)\]]?$/i

export function headersOf(block: Block): BlockHeaders {
  const width = block.toColumn - block.fromColumn + 1
  const rows = block.above
    .filter((row) => inColumns(row, block).some((cell) => cell !== '') && !isMarker(row))
    .slice(-LINES_LOOKED_AT)
    .reverse()
  const lines = rows.map((row) => inColumns(row, block))
  const isHeader = (cells: string[]) =>
    filled(cells) >= Math.min(2, width) && cells.every((c) => c.length <= LONGEST_HEADER)
  const nearest = lines.findIndex((cells) => isHeader(cells) && !isSetting(cells))
  if (nearest < 0) return { headers: blanks(width), groups: blanks(width), title: titleIn(lines) }
  const hasUnitsRow = lines[nearest]!.every((cell) => cell === '' || isBareUnit(cell))
  const names = hasUnitsRow
    ? lines.findIndex((cells, i) => i > nearest && isHeader(cells) && !isSetting(cells))
    : nearest
  const headerAt = names < 0 ? nearest : names
  const headers = lines[headerAt]!.map((cell, c) => (headerAt === nearest ? cell : withUnit(cell, lines[nearest]![c]!)))
  const rest = namesOfDevicesFirst(rows.slice(headerAt + 1), block).filter((cells) => !isSetting(cells))
  const groupLine = rest.find((cells) => isNaming(cells, width))
  return { headers, groups: groupLine ? filledForward(groupLine) : blanks(width), title: titleIn(rest) }
}

const blanks = (width: number): string[] => Array.from({ length: width }, () => '')
const filled = (cells: string[]) => cells.filter((cell) => cell !== '').length

/** `[Data]` on a line of its own opens a section and names nothing. */
const isMarker = (row: RawRow): boolean => {
  const cells = row.cells.map(cellText).filter((cell) => cell !== '')
  return cells.length === 1 && /^\[.*\]$/.test(cells[0]!)
}

/** Of tables side by side, a line that reaches over several tables names them; a lone cell is a remark. */
function namesOfDevicesFirst(rows: RawRow[], block: Block): string[][] {
  const reachesBeyond = (row: RawRow) =>
    row.cells.some((cell, c) => (c < block.fromColumn || c > block.toColumn) && cellText(cell) !== '')
  return [...rows.filter(reachesBeyond), ...rows.filter((row) => !reachesBeyond(row))].map((row) =>
    inColumns(row, block),
  )
}

function inColumns(row: RawRow, block: Block): string[] {
  const width = block.toColumn - block.fromColumn + 1
  return Array.from({ length: width }, (_, i) => cellText(row.cells[block.fromColumn + i]))
}

const isBareUnit = (cell: string) =>
  BARE_UNIT.test(cell) || (cell.length <= 24 && unitInHeader(`(${cell})`) !== null && !/[\p{L}]{5,}/u.test(cell))

/** `Temperature; 25; °C` or `Operator: …` is a setting of the instrument, not a header. */
function isSetting(cells: string[]): boolean {
  const [first = '', second = ''] = cells.filter((cell) => cell !== '')
  return /[:=]\s*\S|[:=]$/.test(first) || (filled(cells) <= 3 && numeralKind(second) !== null && cells.length <= 3)
}

/** Names of devices or groups: words, not a sentence, and not a single cell over a table of one column of values. */
const isNaming = (cells: string[], width: number) =>
  cells.every((cell) => cell.length <= LONGEST_HEADER) &&
  cells.some((cell) => /\p{L}/u.test(cell)) &&
  (filled(cells) > 1 || width > 1)

const filledForward = (cells: string[]): string[] => {
  let last = ''
  return cells.map((cell) => (last = cell || last))
}

const titleIn = (lines: string[][]): string =>
  lines
    .find((cells) => filled(cells) === 1 && /\p{L}/u.test(cells.join('')))
    ?.find((cell) => cell !== '')
    ?.slice(0, 120) ?? ''

function withUnit(header: string, unit: string): string {
  if (unit === '') return header
  return /^[([]/.test(unit) ? `${header} ${unit}`.trim() : `${header} (${unit})`.trim()
}
