import { afterAll, beforeAll, expect, test } from 'vitest'
import { makeDataSource } from '../../server/database/dataSource.js'
import { MIGRATIONS } from '../../server/database/migrations/index.js'
import { emptyDatabase, type EmptyDatabase } from '../support/database.js'

let database: EmptyDatabase
let dataSource: ReturnType<typeof makeDataSource>

beforeAll(async () => {
  database = await emptyDatabase()
  dataSource = await makeDataSource(database.url).initialize()
})

afterAll(async () => {
  await dataSource?.destroy()
  await database?.drop()
})

const tables = async () => {
  const rows: { name: string }[] = await dataSource.query(
    'SELECT table_name AS name FROM information_schema.tables WHERE table_schema = database() ORDER BY name',
  )
  return rows.map(({ name }) => name).filter((name) => name !== 'migrations')
}
const drift = async () => (await dataSource.driver.createSchemaBuilder().log()).upQueries.map(({ query }) => query)

test('the migrations lead from nothing to the schema of the entities, back to nothing, and there again', async () => {
  expect(await tables()).toEqual([])

  await dataSource.runMigrations()
  const names = dataSource.entityMetadatas.map(({ tableName }) => tableName).sort()
  expect(await tables()).toEqual(names)
  expect(await drift()).toEqual([])

  for (const _ of MIGRATIONS) await dataSource.undoLastMigration()
  expect(await tables()).toEqual([])

  await dataSource.runMigrations()
  expect(await tables()).toEqual(names)
  expect(await drift()).toEqual([])
})

test('a schema that lacks a column is seen as drift', async () => {
  await dataSource.query('ALTER TABLE project DROP COLUMN description')
  expect(await drift()).toEqual([expect.stringContaining('ADD `description` text NOT NULL')])
})
