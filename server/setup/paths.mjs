import { createHash } from 'node:crypto'
import { accessSync, constants, existsSync, mkdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { dirname, join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'

/** Root of the project, wherever it was cloned to. */
export const ROOT = resolve(dirname(fileURLToPath(import.meta.url)), '../..')

/** Everything that start and test make: ignored by git, safe to delete with the data in it. */
export const PRIVATE_FOLDER = join(ROOT, '.tierlight')

/** Longest path of a Unix socket, in bytes, with room for its name. */
const SOCKET_PATH_LIMIT = 90

/**
 * Folder for one database server. It is inside the project where the server's user may reach it; a root's server runs
 * as the user mysql, which may not enter a home that only its owner can, and a socket's path must be short: then a
 * folder under /var/lib/tierlight is taken and its place is remembered.
 */
export function databaseFolder(name) {
  const inside = join(PRIVATE_FOLDER, name)
  const pointer = join(PRIVATE_FOLDER, `${name}.place`)
  if (existsSync(pointer)) return readFileSync(pointer, 'utf8').trim()
  mkdirSync(PRIVATE_FOLDER, { recursive: true })
  if (reachable(PRIVATE_FOLDER) && inside.length < SOCKET_PATH_LIMIT) return inside
  const key = createHash('sha256').update(ROOT).digest('hex').slice(0, 12)
  const outside = join(process.getuid?.() === 0 ? '/var/lib/tierlight' : '/tmp/tierlight', key, name)
  mkdirSync(dirname(outside), { recursive: true })
  writeFileSync(pointer, `${outside}\n`)
  return outside
}

/** Whether another user may pass through every folder on the way (root only has to ask). */
function reachable(folder) {
  if (process.getuid?.() !== 0) return writable(folder)
  for (let at = folder; ; at = dirname(at)) {
    if ((statSync(at).mode & 0o001) === 0) return false
    if (at === dirname(at)) return true
  }
}

function writable(folder) {
  try {
    accessSync(folder, constants.W_OK)
    return true
  } catch {
    return false
  }
}
