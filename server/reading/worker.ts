import { readMeasurementFile } from './readMeasurementFile.js'
import { ReadingError, toPlainError, type PlainReadingError } from './readingError.js'
import type { ReadingOptions, ReadingResult } from './readingResult.js'

export interface ReadingTask {
  bytes: Uint8Array
  fileName: string
  options: ReadingOptions
}

export type ReadingAnswer = { result: ReadingResult } | { error: PlainReadingError }

/** Runs in a worker thread: an error class does not survive the way back, its plain form does. */
export default function read({ bytes, fileName, options }: ReadingTask): ReadingAnswer {
  try {
    return { result: readMeasurementFile(bytes, fileName, options) }
  } catch (error) {
    if (error instanceof ReadingError) return { error: toPlainError(error) }
    throw error
  }
}
