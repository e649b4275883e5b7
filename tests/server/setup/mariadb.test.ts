import { readFileSync, rmSync } from 'node:fs'
import { createConnection } from 'mysql2/promise'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { startMariadb } from '../../../server/setup/mariadb.mjs'
import { PRIVATE_FOLDER, databaseFolder } from '../../../server/setup/paths.mjs'

const name = `recovery-${process.pid}`
let folder: string
let server: Awaited<ReturnType<typeof startMariadb>>

beforeAll(async () => {
  folder = databaseFolder(name)
  server = await startMariadb(name)
})
afterAll(async () => {
  await server?.stop()
  rmSync(folder, { recursive: true, force: true })
  rmSync(`${PRIVATE_FOLDER}/${name}.place`, { force: true })
})

async function query(statement: string): Promise<unknown> {
  const connection = await createConnection(server.url)
  try {
    return (await connection.query(statement))[0]
  } finally {
    await connection.end()
  }
}
const processId = () => Number(readFileSync(`${folder}/mariadb.pid`, 'utf8'))

test('listens on loopback only, on a port of its own, in a folder of its own', async () => {
  const url = new URL(server.url)
  expect(url.hostname).toBe('127.0.0.1')
  expect(url.port).not.toBe('3306')
  expect(
    await query('SELECT @@bind_address AS address, @@datadir AS folder, @@character_set_server AS charset'),
  ).toEqual([{ address: '127.0.0.1', folder: `${folder}/data/`, charset: 'utf8mb4' }])
})

test('needs the generated password', async () => {
  const url = new URL(server.url)
  expect(url.password.length).toBeGreaterThan(20)
  url.password = 'guess'
  await expect(createConnection(url.href)).rejects.toMatchObject({ code: 'ER_ACCESS_DENIED_ERROR' })
})

test('one that runs already is taken over, not started twice', async () => {
  const before = processId()
  const again = await startMariadb(name)
  expect(again.url).toBe(server.url)
  expect(processId()).toBe(before)
})

test('comes back with its data and its password after a kill', async () => {
  await query('CREATE TABLE kept (value int)')
  await query('INSERT INTO kept VALUES (42)')
  const { password } = new URL(server.url)
  const killed = processId()
  process.kill(killed, 'SIGKILL')

  server = await startMariadb(name)

  expect(processId()).not.toBe(killed)
  expect(new URL(server.url).password).toBe(password)
  expect(await query('SELECT value FROM kept')).toEqual([{ value: 42 }])
})
