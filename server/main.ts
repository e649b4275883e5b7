import { createServer } from 'node:http'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { pino } from 'pino'
import { buildApp } from './app.js'
import { readConfig } from './config.js'
import { makeDataSource } from './database/dataSource.js'
import { databaseOf } from './database/transaction.js'
import { seedDemonstration } from './demonstration/seed.js'
import { startBackgroundWork } from './jobs/background.js'

/** Reads the configuration, connects, migrates, listens; stops cleanly on a signal. */
async function main(): Promise<void> {
  const config = readConfig()
  const log = pino({ level: config.logLevel })
  const dataSource = await makeDataSource(config.databaseUrl).initialize()
  await dataSource.runMigrations({ transaction: 'each' })
  const database = databaseOf(dataSource)
  if (config.demonstration) await seedDemonstration(database)

  const clientFolder = join(dirname(fileURLToPath(import.meta.url)), '../client')
  const server = createServer(buildApp({ config, database, log, clientFolder }))
  const background = startBackgroundWork({ config, database, log })
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject)
    server.listen(config.port, config.host, resolve)
  })
  log.info(`Tierlight answers at ${config.publicUrl}`)
  process.send?.({ ready: true, url: config.publicUrl })

  let stopping = false
  const stop = async (): Promise<void> => {
    if (stopping) return
    stopping = true
    server.close()
    server.closeIdleConnections()
    setTimeout(() => server.closeAllConnections(), 3000).unref()
    await background.stop()
    await dataSource.destroy()
    process.exit(0)
  }
  process.on('SIGTERM', () => void stop())
  process.on('SIGINT', () => void stop())
  // Whoever started this process is gone, perhaps killed.
  process.on('disconnect', () => void stop())
}

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`)
  process.exit(1)
})
