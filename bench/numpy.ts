import { spawnSync } from 'node:child_process'
import { fileURLToPath } from 'node:url'

/** What a numpy peer prints: its fastest times in ms and its results, to be compared. */
export interface NumpyResult {
  readonly ms: Readonly<Record<string, number>>
  readonly arrays: Readonly<Record<string, readonly (readonly number[])[]>>
}

/** There is no peer on this machine: the comparison is skipped. */
export class NumpyMissing extends Error {
  override readonly name = 'NumpyMissing'
}

let isThere: boolean | null = null

/**
 * Runs a peer script of this folder with a job as JSON on its standard input.
 * @throws NumpyMissing where Python or its numpy is not installed, another Error when the script fails.
 */
export function runNumpy(script: string, job: unknown): NumpyResult {
  isThere ??= spawnSync('python3', ['-c', 'import numpy']).status === 0
  if (!isThere) throw new NumpyMissing('Python has no numpy here.')
  const env = { ...process.env }
  // These settings hold the matrix library below what the machine can do.
  delete env.OPENBLAS_CORETYPE
  delete env.OPENBLAS_L2_SIZE
  const path = fileURLToPath(new URL(script, import.meta.url))
  const child = spawnSync('python3', [path], { input: JSON.stringify(job), env, maxBuffer: 1 << 28, encoding: 'utf8' })
  if (child.status !== 0) throw new Error(`${script} failed: ${child.stderr || String(child.error)}`)
  return JSON.parse(child.stdout) as NumpyResult
}
