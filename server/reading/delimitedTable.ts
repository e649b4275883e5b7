import { CsvError, parse } from 'csv-parse/sync'
import { READING_LIMITS } from './limits.js'
import { numeralKind } from './numerals.js'
import type { RawGrid, RawRow, Separator } from './rawGrid.js'
import { ReadingError } from './readingError.js'

type TextSeparator = Exclude<Separator, 'sheet'>

const COMMENT = /^\s*(?:\/\/+|[#!*]+|%+(?=\s*[\p{L}]))\s*/u
const SEPARATOR_HINT = /^sep=.$/i

/**
 * Lines and cells of a delimited text. The separator (tab, semicolon, comma or blanks) is the one under which most
 * lines are rows of numbers; line ends may be mixed. @throws ReadingError beyond the limits of a file.
 */
export function delimitedTable(text: string): RawGrid {
  const lines = text.split(/\r\n|\n|\r/)
  while (lines.length > 0 && lines.at(-1)!.trim() === '') lines.pop()
  checkLines(lines)
  const separator = chooseSeparator(lines)
  const rows = separator === 'blank' ? blankSeparated(lines) : separated(text, lines, separator)
  rows.forEach(checkWidth)
  if (separator === ',') refuseCommaInTwoRoles(rows)
  return { sheet: null, separator, rows, percentFormatted: new Set() }
}

function checkLines(lines: string[]): void {
  if (lines.length > READING_LIMITS.lines)
    throw new ReadingError('too-many-lines', `The file has ${lines.length} lines.`, {
      expected: `at most ${READING_LIMITS.lines} lines`,
    })
  const long = lines.findIndex((line) => line.length > READING_LIMITS.lineCharacters)
  if (long >= 0)
    throw new ReadingError(
      'line-too-long',
      `Line ${long + 1} is ${lines[long]!.length} characters long; a line of a table has at most ` +
        `${READING_LIMITS.lineCharacters}.`,
      { line: long + 1, expected: 'one line for each wavelength' },
    )
}

function checkWidth(row: RawRow): void {
  if (row.cells.length > READING_LIMITS.columns)
    throw new ReadingError(
      'too-many-columns',
      `Line ${row.line} has ${row.cells.length} columns; at most ${READING_LIMITS.columns} are read.`,
      { line: row.line },
    )
}

const split = (line: string, separator: TextSeparator): string[] =>
  separator === 'blank' ? line.trim().split(/\s+/) : line.split(separator).map((cell) => unquoted(cell.trim()))

const unquoted = (cell: string) => (/^".*"$/.test(cell) ? cell.slice(1, -1).trim() : cell)

function chooseSeparator(lines: string[]): TextSeparator {
  const sample = lines.filter((line) => line.trim() !== '' && !COMMENT.test(line)).slice(0, 3000)
  const candidates: TextSeparator[] = ['\t', ';', ',', 'blank']
  let best: TextSeparator = ','
  let bestScore = 0
  for (const candidate of candidates) {
    const score = sample.reduce((sum, line) => sum + rowScore(split(line, candidate)), 0)
    if (score > bestScore) [best, bestScore] = [candidate, score]
  }
  if (bestScore > 0) return best
  return candidates.find((candidate) => sample.some((line) => split(line, candidate).length > 1)) ?? ','
}

/** A row of two numbers or more counts in full; one with words among its numbers by half. */
function rowScore(cells: string[]): number {
  const filled = cells.filter((cell) => cell !== '')
  const numbers = filled.filter((cell) => numeralKind(cell) !== null).length
  if (numbers < 2) return 0
  return numbers === filled.length ? 1 : 0.5
}

function separated(text: string, lines: string[], separator: Exclude<TextSeparator, 'blank'>): RawRow[] {
  const quoted = text.includes('"') ? quotedRecords(text, separator) : null
  if (quoted) return quoted.map(({ line, cells }) => textRow(line, cells))
  return lines.map((line, i) => {
    const isComment = COMMENT.test(line)
    const bare = isComment ? line.replace(COMMENT, '') : line
    return { line: i + 1, cells: SEPARATOR_HINT.test(bare) ? [] : split(bare, separator), isComment }
  })
}

function textRow(line: number, cells: string[]): RawRow {
  const first = cells[0] ?? ''
  const isComment = COMMENT.test(first)
  return { line, cells: isComment ? [first.replace(COMMENT, ''), ...cells.slice(1)] : cells, isComment }
}

/** Records of a text with quoted cells, which may hold separators and line ends; null when its quotes do not pair. */
function quotedRecords(text: string, separator: string): { line: number; cells: string[] }[] | null {
  try {
    const records = parse(text, {
      delimiter: separator,
      record_delimiter: ['\r\n', '\n', '\r'],
      relax_quotes: true,
      relax_column_count: true,
      trim: true,
      info: true,
    }) as unknown as { record: string[]; info: { lines: number } }[]
    return records.map(({ record, info }) => ({
      line: info.lines,
      cells: record.map((cell) => cell.replace(/\s+/g, ' ')),
    }))
  } catch (error) {
    if (error instanceof CsvError) return null
    throw error
  }
}

function blankSeparated(lines: string[]): RawRow[] {
  const bare = lines.map((line) => ({ isComment: COMMENT.test(line), text: line.replace(COMMENT, '').trim() }))
  const width = usualWidth(bare.map(({ text, isComment }) => (isComment ? [] : split(text, 'blank'))))
  return bare.map(({ text, isComment }, i) => ({
    line: i + 1,
    isComment,
    cells: text === '' ? [] : isNumberFirst(text) ? split(text, 'blank') : headerCells(text, width),
  }))
}

const isNumberFirst = (text: string) => numeralKind(text.split(/\s/, 1)[0]!) !== null

function usualWidth(rows: string[][]): number {
  const counts = new Map<number, number>()
  for (const row of rows) if (rowScore(row) === 1) counts.set(row.length, (counts.get(row.length) ?? 0) + 1)
  return [...counts].sort((a, b) => b[1] - a[1])[0]?.[0] ?? 2
}

/** Headers between blanks hold blanks themselves: `Wavelength (nm)  EQE (%)`. The split that fits the data is taken. */
function headerCells(text: string, width: number): string[] {
  const wide = text.split(/\t+| {2,}/).map((cell) => cell.trim())
  const words = text.split(/\s+/)
  const joined = words.reduce<string[]>((cells, word) => {
    const open = cells.length > 0 && /^[([{]|^\/$/.test(word)
    const inside = cells.length > 0 && /[([{][^)\]}]*$/.test(cells.at(-1)!)
    if (open || inside) cells[cells.length - 1] += ` ${word}`
    else cells.push(word)
    return cells
  }, [])
  return [wide, words, joined].find((cells) => cells.length === width) ?? wide
}

/** `300,0,85` under a header of two columns: the comma separates cells and marks decimals, so no number is certain. */
function refuseCommaInTwoRoles(rows: RawRow[]): void {
  const first = rows.findIndex((row) => rowScore(row.cells.map(String)) === 1)
  const header = rows.slice(0, Math.max(first, 0)).findLast((row) => row.cells.some((cell) => cell !== ''))
  const data = rows[first]
  if (!data || !header || header.cells.length < 2 || data.cells.length <= header.cells.length) return
  const numbers = rows.slice(first).filter((row) => row.cells.some((cell) => cell !== ''))
  const isAllWhole = numbers.every((row) => row.cells.every((cell) => cell === '' || numeralKind(cell) === 'whole'))
  if (isAllWhole)
    throw new ReadingError(
      'mixed-separators',
      `Line ${data.line} splits into ${data.cells.length} cells under ${header.cells.length} headers: the comma seems ` +
        'to separate the columns and to mark the decimals too.',
      { line: data.line, expected: 'a semicolon or a tab between the columns, or decimal points' },
    )
}
