import { existsSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { lives, startMariadb, stopLeftBehind } from './mariadb.mjs'
import { databaseFolder, PRIVATE_FOLDER } from './paths.mjs'

const PREFIX = 'throwaway-'

/** A database server for one run of tests: empty, on a free port, gone with its data when it is stopped. */
export async function startThrowawayMariadb() {
  await removeLeftovers()
  const name = `${PREFIX}${process.pid}`
  const server = await startMariadb(name)
  return {
    url: server.url,
    urlOf: server.urlOf,
    async stop() {
      await server.stop()
      remove(name)
    },
  }
}

/** Servers of runs that were killed before they could clean up. */
async function removeLeftovers() {
  if (!existsSync(PRIVATE_FOLDER)) return
  const names = new Set(
    readdirSync(PRIVATE_FOLDER)
      .filter((name) => name.startsWith(PREFIX))
      .map((name) => name.replace('.place', '')),
  )
  for (const name of names) {
    if (lives(Number(name.slice(PREFIX.length)))) continue
    await stopLeftBehind(name)
    remove(name)
  }
}

function remove(name) {
  const pointer = join(PRIVATE_FOLDER, `${name}.place`)
  const folder = existsSync(pointer) ? readFileSync(pointer, 'utf8').trim() : databaseFolder(name)
  rmSync(folder, { recursive: true, force: true })
  rmSync(pointer, { force: true })
}
