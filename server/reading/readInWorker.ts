import { existsSync } from 'node:fs'
import { createRequire } from 'node:module'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { Piscina } from 'piscina'
import { WORKER_LIMITS } from './limits.js'
import { fromPlainError, ReadingError } from './readingError.js'
import type { ReadingOptions, ReadingResult } from './readingResult.js'
import type { ReadingAnswer, ReadingTask } from './worker.js'

export interface WorkerLimits {
  timeMs?: number
  heapMb?: number
}

/** The bundle keeps the worker beside the server's chunks; in development it is the source beside this file. */
const CANDIDATES = ['./worker.ts', './worker.js', './reading/worker.js', '../reading/worker.js']

let pool: Piscina<ReadingTask, ReadingAnswer> | null = null

/**
 * `readMeasurementFile` in a worker thread, with a limit of time and of memory: a file that exceeds one is refused and
 * its thread ended, the server goes on. @throws ReadingError as the reader, or 'too-slow', 'out-of-memory'.
 */
export async function readInWorker(
  bytes: Uint8Array,
  fileName: string,
  options: ReadingOptions = {},
  limits: WorkerLimits = {},
): Promise<ReadingResult> {
  const isOwn = limits.heapMb !== undefined
  const workers = isOwn ? createPool(limits.heapMb!) : (pool ??= createPool(WORKER_LIMITS.heapMb))
  const timeMs = limits.timeMs ?? WORKER_LIMITS.timeMs
  try {
    const answer = await workers.run({ bytes, fileName, options }, { signal: AbortSignal.timeout(timeMs) })
    if ('error' in answer) throw fromPlainError(answer.error)
    return answer.result
  } catch (error) {
    throw limitError(error, fileName, timeMs) ?? error
  } finally {
    if (isOwn) await workers.destroy()
  }
}

/** Ends the threads; the next reading starts new ones. */
export async function closeReadingWorkers(): Promise<void> {
  const closing = pool
  pool = null
  await closing?.destroy()
}

function createPool(heapMb: number): Piscina<ReadingTask, ReadingAnswer> {
  const file = CANDIDATES.map((path) => fileURLToPath(new URL(path, import.meta.url))).find((path) => existsSync(path))
  if (!file) throw new Error('The worker that reads files is missing from the build.')
  return new Piscina<ReadingTask, ReadingAnswer>({
    filename: file,
    minThreads: 0,
    maxThreads: 2,
    idleTimeout: 30_000,
    resourceLimits: { maxOldGenerationSizeMb: heapMb },
    execArgv: file.endsWith('.ts') ? ['--import', typeScriptLoader()] : [],
  })
}

const typeScriptLoader = (): string => pathToFileURL(createRequire(import.meta.url).resolve('tsx')).href

function limitError(error: unknown, fileName: string, timeMs: number): ReadingError | null {
  if (!(error instanceof Error)) return null
  const code = 'code' in error ? error.code : undefined
  if (error.name === 'AbortError' || error.name === 'TimeoutError')
    return new ReadingError('too-slow', `${fileName} could not be read within ${timeMs / 1000} s.`, {
      expected: 'a smaller file, or the sheet with the scan alone',
    })
  if (code === 'ERR_WORKER_OUT_OF_MEMORY')
    return new ReadingError('out-of-memory', `${fileName} needs more memory to be read than a file may take.`, {
      expected: 'a smaller file, or the sheet with the scan alone',
    })
  return null
}
