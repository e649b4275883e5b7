import type { ReadingProblem } from '../../shared/contract/scans.js'
import type { FoundTable } from './readingResult.js'

export const READING_ERROR_CODES = [
  'empty',
  'too-large',
  'not-text',
  'damaged-workbook',
  'line-too-long',
  'too-many-lines',
  'too-many-columns',
  'no-table',
  'one-column',
  'too-few-rows',
  'mixed-decimal-marks',
  'mixed-separators',
  'not-a-number',
  'missing-value',
  'no-wavelength',
  'wavelength-not-positive',
  'wavelength-range',
  'repeated-wavelength',
  'unsorted-wavelength',
  'no-values',
  'raw-signals-only',
  'unknown-unit',
  'mapping-mismatch',
  'too-slow',
  'out-of-memory',
] as const
export type ReadingErrorCode = (typeof READING_ERROR_CODES)[number]

/** Where in the file it is, and what would be right. Lines count from 1, as an editor or a spreadsheet shows them. */
export interface ReadingErrorDetails {
  line?: number
  /** Header or letter of the column. */
  column?: string
  value?: string
  expected?: string
  /** The tables that were found before the trouble, so that a person can still correct the mapping. */
  tables?: FoundTable[]
  shape?: string
}

/** A file that cannot be read as it is: `message` is one sentence for a person. */
export class ReadingError extends Error {
  override readonly name = 'ReadingError'

  constructor(
    readonly code: ReadingErrorCode,
    message: string,
    readonly details: ReadingErrorDetails = {},
  ) {
    super(message)
  }

  /** As the contract describes it. */
  get problem(): ReadingProblem {
    const { line, column, value, expected } = this.details
    return {
      reason: this.message,
      line: line ?? null,
      column: column ?? null,
      value: value ?? null,
      expected: expected ?? null,
    }
  }
}

/** What of a ReadingError crosses the border of a worker thread. */
export interface PlainReadingError {
  code: ReadingErrorCode
  message: string
  details: ReadingErrorDetails
}

export const toPlainError = ({ code, message, details }: ReadingError): PlainReadingError => ({
  code,
  message,
  details,
})

export const fromPlainError = ({ code, message, details }: PlainReadingError): ReadingError =>
  new ReadingError(code, message, details)
