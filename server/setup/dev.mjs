import { spawn } from 'node:child_process'
import { randomBytes } from 'node:crypto'
import { join } from 'node:path'
import { startMariadb } from './mariadb.mjs'
import { ROOT } from './paths.mjs'
import { checkNode, ensurePackages, ensurePrograms, keptSecret } from './prepare.mjs'

/** `npm run dev`: the client with hot reload and the API restarted on every change, on the database of `npm start`. */
checkNode()
ensurePrograms([{ program: 'mariadbd', package: 'mariadb-server' }])
ensurePackages()
const mariadb = await startMariadb('database')
const apiPort = process.env.PORT ?? '4180'
const env = {
  LOG_LEVEL: 'info',
  DEMONSTRATION: 'yes',
  SESSION_SECRET: keptSecret('session.secret', () => randomBytes(48).toString('base64url')),
  ...process.env,
  DATABASE_URL: process.env.DATABASE_URL ?? mariadb.url,
  PORT: apiPort,
}
const bin = (name) => join(ROOT, 'node_modules', '.bin', name)
const children = [
  spawn(bin('tsx'), ['watch', '--tsconfig', 'tsconfig.server.json', 'server/main.ts'], {
    cwd: ROOT,
    stdio: 'inherit',
    env,
  }),
  spawn(bin('vite'), ['--host', '127.0.0.1'], {
    cwd: ROOT,
    stdio: 'inherit',
    env: { ...env, TIERLIGHT_API_ADDRESS: `http://127.0.0.1:${apiPort}` },
  }),
]
let stopping = false
async function stop() {
  if (stopping) return
  stopping = true
  for (const child of children) child.kill('SIGTERM')
  await mariadb.stop()
  process.exit(0)
}
process.on('SIGINT', () => void stop())
process.on('SIGTERM', () => void stop())
for (const child of children) child.on('exit', () => void stop())
