import { createHash } from 'node:crypto'
import type { ReadingMapping } from '../../shared/contract/scans.js'
import { applyMapping } from './applyMapping.js'
import { withChoice } from './columnChoice.js'
import { decodeText } from './decodeText.js'
import { delimitedTable } from './delimitedTable.js'
import { doubtsAbout } from './doubts.js'
import { isZip } from './fileKind.js'
import { findTables, foundTable, type WorkingTable } from './foundTables.js'
import { READING_LIMITS } from './limits.js'
import { proposeMapping } from './proposeMapping.js'
import type { RawGrid } from './rawGrid.js'
import { ReadingError } from './readingError.js'
import type { ColumnChoice, ReadingOptions, ReadingResult } from './readingResult.js'
import { workbookTable } from './workbookTable.js'

const PREVIEW_ROWS = 40

/**
 * From the bytes of a file to its scans: text or workbook, tables, columns with units, curves. The table itself is
 * looked at; no maker's format is known. Without `options.mapping` the reader proposes one and applies it.
 * @throws ReadingError with one sentence; `details.tables` holds what was found before, so that a person can correct.
 */
export function readMeasurementFile(bytes: Uint8Array, fileName: string, options: ReadingOptions = {}): ReadingResult {
  const { kind, grids, notes } = gridsOf(bytes, fileName)
  const tables = findTables(grids, { fileName, expected: options.expected ?? null })
  const found = tables.map((table) => foundTable(table, options.previewRows ?? PREVIEW_ROWS))
  const shape = shapeOfTables(grids, tables)
  try {
    const {
      mapping,
      table,
      notes: decided,
    } = options.mapping
      ? { mapping: options.mapping, table: mappedTable(tables, options.mapping), notes: [] }
      : options.choice
        ? chosen(tables, options.choice, fileName)
        : firstReadable(tables, fileName)
    const further: string[] = []
    const scans = applyMapping(table, mapping, further)
    const appendedTables = tables.filter((one) => one.repeats === table.tableIndex).map((one) => one.tableIndex)
    return {
      kind,
      tables: found,
      mapping,
      mappingOrigin: options.mapping ? 'given' : 'proposed',
      notes: [...notes, ...decided, ...further, ...doubtsAbout(scans), ...notesOnTables(tables, table, appendedTables)],
      scans,
      appendedTables,
      shape,
    }
  } catch (error) {
    if (error instanceof ReadingError)
      throw new ReadingError(error.code, error.message, { ...error.details, tables: found, shape })
    throw error
  }
}

/** Fingerprint of a file's shape, under which a mapping is remembered. */
export const shapeOf = (result: Pick<ReadingResult, 'shape'>): string => result.shape

function gridsOf(
  bytes: Uint8Array,
  fileName: string,
): { kind: ReadingResult['kind']; grids: RawGrid[]; notes: string[] } {
  if (bytes.length > READING_LIMITS.bytes)
    throw new ReadingError(
      'too-large',
      `${fileName} has ${Math.round(bytes.length / 1e6)} MB; at most ${READING_LIMITS.bytes / 1e6} MB are read.`,
    )
  if (isZip(bytes)) return { kind: 'workbook', grids: workbookTable(bytes, fileName), notes: [] }
  const { text, encoding } = decodeText(bytes, fileName)
  const notes = encoding === 'UTF-8' ? [] : [`The text is encoded in ${encoding}.`]
  return { kind: 'text', grids: [delimitedTable(text)], notes }
}

function mappedTable(tables: WorkingTable[], mapping: ReadingMapping): WorkingTable {
  const table = tables.find((one) => one.sheet === mapping.sheet && one.tableIndex === mapping.tableIndex)
  if (table) return table
  const where = mapping.sheet === null ? '' : ` on sheet ${mapping.sheet}`
  throw new ReadingError('mapping-mismatch', `The file has no table ${mapping.tableIndex + 1}${where}.`, {
    expected: 'a mapping made for a file of this shape',
  })
}

function chosen(tables: WorkingTable[], choice: ColumnChoice, fileName: string) {
  const table = tables[choice.tableIndex]
  if (!table) throw new ReadingError('mapping-mismatch', `The file has no table ${choice.tableIndex + 1}.`)
  return { ...proposeMapping(withChoice(table, choice), fileName, choice), table }
}

/** The first table that can be read; when none can, the trouble of the first. */
function firstReadable(tables: WorkingTable[], fileName: string) {
  let trouble: unknown
  for (const table of tables) {
    try {
      return { ...proposeMapping(table, fileName), table }
    } catch (error) {
      trouble ??= error
    }
  }
  throw trouble
}

function notesOnTables(tables: WorkingTable[], used: WorkingTable, appended: number[]): string[] {
  const lines = (table: WorkingTable) => `lines ${table.rows[0]!.line} to ${table.rows.at(-1)!.line}`
  if (appended.length > 0) {
    const others = appended.map((index) => lines(tables[index]!)).join(', ')
    return [
      `The file holds ${appended.length + 1} scans one after the other, every wavelength ${appended.length + 1} times. ` +
        `The first (${lines(used)}) was taken; choose the table for another (${others}).`,
    ]
  }
  if (tables.length < 2) return []
  return [
    `The file holds ${tables.length} tables; the ${used.tableIndex === 0 ? 'first' : 'one'} in ${lines(used)} was taken.`,
  ]
}

/**
 * Where a header states no unit, the size of the numbers belongs to the shape: files in percent and in fractions under
 * the same headers must not share a mapping.
 */
function shapeOfTables(grids: readonly RawGrid[], tables: readonly WorkingTable[]): string {
  const shape = [
    grids.map((grid) => grid.separator),
    tables.map((table) =>
      table.columns.map(({ index, header, role, unit, numbers }) => [
        index,
        header,
        unit,
        role !== 'ignored' && unit === null && numbers.some((value) => value !== null && value > 1.5),
      ]),
    ),
  ]
  return createHash('sha256').update(JSON.stringify(shape)).digest('hex')
}
