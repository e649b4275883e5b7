import { spawn } from 'node:child_process'
import { fileURLToPath } from 'node:url'

export const ROOT = fileURLToPath(new URL('../..', import.meta.url))

export interface Ended {
  code: number | null
  out: string
  err: string
}

/** Runs the launcher as a person would, in a process of its own. */
export function tierlight(...args: string[]): Promise<Ended> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, ['cli/launch.mjs', ...args], { cwd: ROOT, stdio: ['ignore', 'pipe', 'pipe'] })
    const ended: Ended = { code: null, out: '', err: '' }
    child.stdout.setEncoding('utf8').on('data', (text: string) => (ended.out += text))
    child.stderr.setEncoding('utf8').on('data', (text: string) => (ended.err += text))
    child.on('error', reject)
    child.on('close', (code) => resolve({ ...ended, code }))
  })
}
