import { randomBytes } from 'node:crypto'
import { createConnection } from 'mysql2/promise'
import { inject } from 'vitest'

export interface EmptyDatabase {
  url: string
  drop(): Promise<void>
}

/** An empty database of its own on the test server. */
export async function emptyDatabase(): Promise<EmptyDatabase> {
  const server = inject('databaseUrl')
  const name = `test_${randomBytes(6).toString('hex')}`
  await run(`CREATE DATABASE ${name}`)
  const url = new URL(server)
  url.pathname = `/${name}`
  return { url: url.href, drop: () => run(`DROP DATABASE ${name}`) }

  async function run(statement: string): Promise<void> {
    const connection = await createConnection(server)
    await connection.query(statement)
    await connection.end()
  }
}
