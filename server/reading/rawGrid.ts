import type { RawCell } from './numerals.js'

export interface RawRow {
  /** Line of the text file or row of the sheet, from 1. */
  line: number
  cells: RawCell[]
  /** The line was marked as a comment; its mark is taken off. */
  isComment: boolean
}

export type Separator = '\t' | ';' | ',' | 'blank' | 'sheet'

/** Lines and cells of a text file or of one sheet, before anything is understood. Blank lines are rows without cells. */
export interface RawGrid {
  sheet: string | null
  separator: Separator
  rows: RawRow[]
  /** Columns whose cells a workbook shows as percentages: their numbers are fractions. */
  percentFormatted: ReadonlySet<number>
}

export const isEmptyCell = (cell: RawCell | undefined): boolean =>
  cell === undefined || (typeof cell === 'string' && cell.trim() === '')

export const cellText = (cell: RawCell | undefined): string => (cell === undefined ? '' : String(cell).trim())

const LONGEST_SHOWN = 40

/** A cell as a sentence quotes it: a cell of a broken file may be as long as the file. */
export function shownCell(cell: RawCell | undefined): string {
  const text = cellText(cell)
  return text.length > LONGEST_SHOWN ? `${text.slice(0, LONGEST_SHOWN)}…` : text
}
