import { existsSync } from 'node:fs'
import { createRequire } from 'node:module'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { Piscina } from 'piscina'
import type { CheckReport } from '../../shared/physics/checks/index.js'
import type { RunChecks } from '../services/checks/recheckDevice.js'
import type { ChecksTask } from './checksWorker.js'

/** The bundle keeps the worker beside the server's chunks; in development it is the source beside this file. */
const CANDIDATES = ['./checksWorker.ts', './checksWorker.js', './jobs/checksWorker.js', '../jobs/checksWorker.js']

let pool: Piscina<ChecksTask, CheckReport[]> | null = null

/** The checks in a worker thread, so that hundreds of scans leave the server free to answer. */
export const checksInWorker: RunChecks = (scans, thresholds) => (pool ??= createPool()).run({ scans, thresholds })

/** Ends the thread; the next checks start a new one. */
export async function closeChecksWorkers(): Promise<void> {
  const closing = pool
  pool = null
  await closing?.destroy()
}

function createPool(): Piscina<ChecksTask, CheckReport[]> {
  const file = CANDIDATES.map((path) => fileURLToPath(new URL(path, import.meta.url))).find((path) => existsSync(path))
  if (!file) throw new Error('The worker that checks scans is missing from the build.')
  const loader = (): string => pathToFileURL(createRequire(import.meta.url).resolve('tsx')).href
  return new Piscina<ChecksTask, CheckReport[]>({
    filename: file,
    minThreads: 0,
    maxThreads: 1,
    idleTimeout: 30_000,
    execArgv: file.endsWith('.ts') ? ['--import', loader()] : [],
  })
}
