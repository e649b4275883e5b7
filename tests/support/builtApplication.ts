import { spawn, type ChildProcess } from 'node:child_process'
import { randomBytes } from 'node:crypto'
import { createServer, type AddressInfo } from 'node:net'
import { fileURLToPath } from 'node:url'
import { startThrowawayMariadb } from '../../server/setup/throwaway.mjs'

export interface BuiltApplication {
  address: string
  databaseUrl: string
  stop(): Promise<void>
}

const PROGRAM = fileURLToPath(new URL('../../dist/server/main.js', import.meta.url))

/** Starts `dist/server/main.js`, as `npm start` does, on a throw-away MariaDB and a free port. */
export async function startBuiltApplication(settings: Record<string, string> = {}): Promise<BuiltApplication> {
  const mariadb = await startThrowawayMariadb()
  const port = await freePort()
  const address = `http://127.0.0.1:${port}`
  const server = spawn(process.execPath, [PROGRAM], {
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
    env: {
      ...process.env,
      NODE_ENV: 'production',
      DATABASE_URL: mariadb.url,
      HOST: '127.0.0.1',
      PORT: String(port),
      PUBLIC_URL: address,
      SESSION_SECRET: randomBytes(48).toString('base64url'),
      LOG_LEVEL: 'warn',
      ...settings,
    },
  })
  try {
    await ready(server)
  } catch (error) {
    await mariadb.stop()
    throw error
  }
  return {
    address,
    databaseUrl: mariadb.url,
    async stop() {
      await ended(server)
      await mariadb.stop()
    },
  }
}

function ready(server: ChildProcess): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('message', () => resolve())
    server.once('error', reject)
    server.once('exit', (code) => reject(new Error(`The server ended with ${code} before it was ready.`)))
  })
}

async function ended(server: ChildProcess): Promise<void> {
  if (server.exitCode !== null || server.signalCode !== null) return
  const exit = new Promise((resolve) => server.once('exit', resolve))
  server.kill('SIGTERM')
  await exit
}

async function freePort(): Promise<number> {
  const probe = createServer()
  await new Promise<void>((resolve) => probe.listen(0, '127.0.0.1', resolve))
  const { port } = probe.address() as AddressInfo
  await new Promise((resolve) => probe.close(resolve))
  return port
}
