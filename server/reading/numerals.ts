/** A cell as it stands in the file: text, or the number of a workbook's cell. */
export type RawCell = string | number
export type DecimalMark = '.' | ','

const DOT = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eEdD][+-]?\d+)?$/
const COMMA = /^[+-]?(?:\d+,?\d*|,\d+)(?:[eEdD][+-]?\d+)?$/
const WHOLE = /^[+-]?\d+(?:[eEdD][+-]?\d+)?$/
/** Digits grouped by one mark and ended by the other: 1.234,5 or 1,234.5. */
const GROUPED = /^[+-]?\d{1,3}(?:([.,])\d{3})+(?!\1)[.,]\d+$/

/** Blanks, a minus sign of typography and a trailing percent sign are taken off. */
export function bareNumeral(cell: string): string {
  const bare = cell.trim().replace(/^[\u2212\u2013]/, '-')
  return bare.endsWith('%') ? bare.slice(0, -1).trimEnd() : bare
}

/** Which mark a numeral is written with; 'whole' without one, 'grouped' with both, null for what is no number. */
export function numeralKind(cell: RawCell): DecimalMark | 'whole' | 'grouped' | null {
  if (typeof cell === 'number') return Number.isFinite(cell) ? 'whole' : null
  const bare = bareNumeral(cell)
  if (WHOLE.test(bare)) return 'whole'
  if (DOT.test(bare)) return '.'
  if (COMMA.test(bare)) return ','
  return GROUPED.test(bare) ? 'grouped' : null
}

/** The number of a cell under the file's decimal mark; null for what is no finite number. */
export function parseNumeral(cell: RawCell, mark: DecimalMark): number | null {
  if (typeof cell === 'number') return Number.isFinite(cell) ? cell : null
  const kind = numeralKind(cell)
  if (kind === null || kind === 'grouped' || (kind !== 'whole' && kind !== mark)) return null
  const value = Number(bareNumeral(cell).replace(',', '.').replace(/[dD]/, 'e'))
  return Number.isFinite(value) ? value : null
}

/** Thrown errors name cells by the letter that a spreadsheet shows when there is no header. */
export function columnLetters(index: number): string {
  const rest = index % 26
  const letter = String.fromCharCode(65 + rest)
  return index < 26 ? letter : columnLetters((index - rest) / 26 - 1) + letter
}
