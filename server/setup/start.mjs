import { spawn } from 'node:child_process'
import { randomBytes } from 'node:crypto'
import { createServer } from 'node:net'
import { join } from 'node:path'
import { startMariadb } from './mariadb.mjs'
import { ROOT } from './paths.mjs'
import { checkNode, ensureBuild, ensurePackages, ensurePrograms, keptSecret } from './prepare.mjs'

/** `npm start`: everything from a fresh clone to an address to open. Ctrl-C stops it all; a killed start is taken over. */
const HOST = process.env.HOST ?? '127.0.0.1'
const OWN_DATABASE = !process.env.DATABASE_URL
const say = (text) => process.stdout.write(`${text}\n`)

checkNode()
if (OWN_DATABASE) ensurePrograms([{ program: 'mariadbd', package: 'mariadb-server' }])
ensurePackages()
ensureBuild()

const mariadb = OWN_DATABASE ? await startMariadb('database') : null
const port = process.env.PORT ? Number(process.env.PORT) : await firstFreePort(4180)
const publicUrl = process.env.PUBLIC_URL ?? `http://${HOST}:${port}`
const server = spawn(process.execPath, [join(ROOT, 'dist/server/main.js')], {
  cwd: ROOT,
  stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  env: {
    LOG_LEVEL: 'warn',
    DEMONSTRATION: mariadb ? 'yes' : 'no',
    SESSION_SECRET: keptSecret('session.secret', () => randomBytes(48).toString('base64url')),
    ...process.env,
    NODE_ENV: 'production',
    HOST,
    PORT: String(port),
    PUBLIC_URL: publicUrl,
    DATABASE_URL: mariadb ? mariadb.url : process.env.DATABASE_URL,
  },
})

server.on('message', async (message) => {
  if (!message?.ready) return
  say(`\nTierlight is at ${publicUrl}\n`)
  const { installation } = await (await fetch(`http://${HOST}:${port}/api/session`)).json()
  if (installation.demonstrationPeople.length > 0) {
    say('Sign in to the demonstration as one of these; the password is the same for all:')
    for (const person of installation.demonstrationPeople)
      say(`  ${person.email.padEnd(32)} ${person.password.padEnd(24)} ${person.role}`)
    say('')
  }
  if (installation.needsFirstAdministrator) say('Open it to make the first administrator.\n')
  say('Stop with Ctrl-C.')
})

let stopping = false
async function stop(code) {
  if (stopping) return
  stopping = true
  if (server.exitCode === null && server.signalCode === null) {
    const ended = new Promise((resolve) => server.once('exit', resolve))
    server.kill('SIGTERM')
    await ended
  }
  await mariadb?.stop()
  process.exit(code)
}
process.on('SIGINT', () => void stop(0))
process.on('SIGTERM', () => void stop(0))
server.on('exit', (code) => void stop(code ?? 1))

async function firstFreePort(from) {
  for (let port = from; ; port++) {
    const free = await new Promise((resolve) => {
      const probe = createServer()
      probe.once('error', () => resolve(false))
      probe.listen({ host: HOST, port }, () => probe.close(() => resolve(true)))
    })
    if (free) return port
  }
}
