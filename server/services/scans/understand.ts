import { ApiError } from '../../../shared/contract/errors.js'
import type { FileReading, ReadingMapping, ReadingProblem } from '../../../shared/contract/scans.js'
import { rememberedMapping } from '../../database/repositories/readingMemories.js'
import type { Work } from '../../database/transaction.js'
import { presentCurve } from '../../presenters/curve.js'
import { readInWorker } from '../../reading/readInWorker.js'
import { ReadingError } from '../../reading/readingError.js'
import type { FoundTable, ReadingResult } from '../../reading/readingResult.js'

/** What the reader makes of a file, as the contract tells it. */
export type Understanding = Omit<FileReading, 'file' | 'recognisedAs'>

/** Reads a file as the project last confirmed files of its shape, or as the reader proposes. */
export async function understand(work: Work, projectId: string, bytes: Buffer, name: string): Promise<Understanding> {
  const proposed = await reading(bytes, name)
  const shape = proposed instanceof ReadingError ? proposed.details.shape : proposed.shape
  const remembered = shape === undefined ? null : await rememberedMapping(work, projectId, shape)
  if (remembered) {
    const again = await reading(bytes, name, remembered)
    if (!(again instanceof ReadingError)) return understood(again, 'remembered')
  }
  return proposed instanceof ReadingError
    ? notUnderstood(proposed, proposed.details.tables ?? [])
    : understood(proposed, 'proposed')
}

/** Reads a file under a mapping that a person corrected. */
export async function understandAs(bytes: Buffer, name: string, mapping: ReadingMapping): Promise<Understanding> {
  const corrected = await reading(bytes, name, mapping)
  if (!(corrected instanceof ReadingError)) return understood(corrected, 'corrected')
  const tables = corrected.details.tables ?? tablesOf(await reading(bytes, name))
  return { ...notUnderstood(corrected, tables), mapping, mappingOrigin: 'corrected' }
}

/** Reads a file for good under a confirmed mapping. @throws ApiError FILE_UNREADABLE with the reader's sentence. */
export async function readAsConfirmed(bytes: Buffer, name: string, mapping: ReadingMapping): Promise<ReadingResult> {
  const result = await reading(bytes, name, mapping)
  if (result instanceof ReadingError) throw fileUnreadable(name, result.problem)
  return result
}

export function fileUnreadable(fileName: string, problem: ReadingProblem): ApiError {
  const { reason, line, column, value, expected } = problem
  return new ApiError(
    'FILE_UNREADABLE',
    {
      fileName,
      reason,
      line: line ?? undefined,
      column: column ?? undefined,
      value: value ?? undefined,
      expected: expected ?? undefined,
    },
    reason.includes(fileName) ? reason : `${fileName}: ${reason}`,
  )
}

async function reading(bytes: Buffer, name: string, mapping?: ReadingMapping): Promise<ReadingResult | ReadingError> {
  try {
    return await readInWorker(bytes, name, mapping ? { mapping } : {})
  } catch (error) {
    if (error instanceof ReadingError) return error
    throw error
  }
}

function tablesOf(result: ReadingResult | ReadingError): FoundTable[] {
  return result instanceof ReadingError ? (result.details.tables ?? []) : result.tables
}

function understood(result: ReadingResult, mappingOrigin: Understanding['mappingOrigin']): Understanding {
  return {
    tables: result.tables.map(presentTable),
    mapping: result.mapping,
    mappingOrigin,
    series: result.scans.map(({ label, quantity, column, ...curve }) => ({
      label,
      quantity,
      column,
      curve: presentCurve(curve),
    })),
    notes: result.notes,
    problem: null,
  }
}

function notUnderstood(error: ReadingError, tables: readonly FoundTable[]): Understanding {
  return {
    tables: tables.map(presentTable),
    mapping: null,
    mappingOrigin: null,
    series: [],
    notes: [],
    problem: error.problem,
  }
}

function presentTable({ columns, ...table }: FoundTable): Understanding['tables'][number] {
  return {
    ...table,
    columns: columns.map(({ index, header, role, unit, why }) => ({ index, header, role, unit, why })),
  }
}
