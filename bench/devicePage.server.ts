import express from 'express'
import { createPool, type RowDataPacket } from 'mysql2/promise'
import { createServer, type RequestListener, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { pino } from 'pino'
import { buildApp } from '../server/app.js'
import { readConfig } from '../server/config.js'
import { makeDataSource } from '../server/database/dataSource.js'
import { Device } from '../server/database/entities/Device.js'
import { databaseOf } from '../server/database/transaction.js'
import { decodeFloat64 } from '../server/database/transformers.js'
import { DEMONSTRATION_PASSWORD } from '../server/demonstration/signIns.js'
import { seedDemonstration } from '../server/demonstration/seed.js'
import { closeReadingWorkers } from '../server/reading/readInWorker.js'
import { startThrowawayMariadb } from '../server/setup/throwaway.mjs'

/** Run as a child process: the application and its bare peer on one throw-away database with the demonstration in it. */
export interface BenchServers {
  oursUrl: string
  peerUrl: string
  projectId: string
  deviceId: string
  email: string
  password: string
}

const POOL_SIZE = 12

const mariadb = await startThrowawayMariadb()
const config = readConfig({
  DATABASE_URL: mariadb.url,
  SESSION_SECRET: 'a secret for the benchmark only, long enough',
  RATE_LIMITS: 'off',
  LOG_LEVEL: 'silent',
})
const dataSource = await makeDataSource(config.databaseUrl).initialize()
await dataSource.runMigrations()
const database = databaseOf(dataSource)
await seedDemonstration(database)
await closeReadingWorkers()
const device = await dataSource.manager.findOneByOrFail(Device, { name: 'Split 480 nm' })
const pool = createPool({ uri: config.databaseUrl, connectionLimit: POOL_SIZE, timezone: 'Z' })
const ours = await listen(buildApp({ config, database, log: pino({ level: 'silent' }), clientFolder: null }))
const peer = await listen(bareApp())
const servers: BenchServers = {
  oursUrl: ours.url,
  peerUrl: peer.url,
  projectId: device.projectId,
  deviceId: device.id,
  email: 'oskar@fennmoor.example',
  password: DEMONSTRATION_PASSWORD,
}
process.send?.(servers)
process.once('disconnect', () => void stop())

/** Reads the rows that the device page rests on and sends them: no session, no rights, no contract, no engine. */
function bareApp(): RequestListener {
  const app = express()
  app.get('/devices/:deviceId', async (request, response) => {
    const { deviceId } = request.params
    const [devices] = await pool.query<RowDataPacket[]>('SELECT * FROM device WHERE id = ?', [deviceId])
    const [junctions] = await pool.query<RowDataPacket[]>(
      'SELECT * FROM junction WHERE deviceId = ? ORDER BY position',
      [deviceId],
    )
    const [layers] = await pool.query<RowDataPacket[]>('SELECT * FROM layer WHERE deviceId = ? ORDER BY position', [
      deviceId,
    ])
    const [scans] = await pool.query<RowDataPacket[]>(
      "SELECT * FROM scan WHERE deviceId = ? AND deletedAt IS NULL AND state = 'accepted'",
      [deviceId],
    )
    response.json({
      device: devices[0],
      junctions,
      layers,
      scans: scans.map((scan) => ({
        ...scan,
        wavelengthNm: [...decodeFloat64(scan['wavelengthNm'] as Buffer)],
        values: [...decodeFloat64(scan['values'] as Buffer)],
      })),
    })
  })
  return app
}

async function listen(app: RequestListener): Promise<{ url: string; server: Server }> {
  const server = createServer(app)
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  return { url: `http://127.0.0.1:${(server.address() as AddressInfo).port}`, server }
}

async function stop(): Promise<void> {
  for (const { server } of [ours, peer]) {
    server.closeAllConnections()
    server.close()
  }
  await pool.end()
  await dataSource.destroy()
  await mariadb.stop()
  process.exit(0)
}
