import { execFileSync, spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { PRIVATE_FOLDER, ROOT } from './paths.mjs'

/** What has to be there before anything of the project can run. Plain Node, no packages. */
const say = (text) => process.stderr.write(`${text}\n`)

export function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number)
  if (major < 20 || (major === 20 && minor < 19)) {
    say(`Tierlight needs Node 20.19 or later; this is ${process.versions.node}.`)
    process.exit(1)
  }
}

/** Installs Debian packages whose programs are missing, where that is allowed; otherwise says the one line to run. */
export function ensurePrograms(wanted) {
  const missing = wanted.filter(({ program }) => !onPath(program))
  if (missing.length === 0) return
  const packages = missing.map((one) => one.package)
  const prefix = process.getuid?.() === 0 ? [] : onPath('sudo') && canSudo() ? ['sudo', '-n'] : null
  if (!prefix || !onPath('apt-get')) {
    say(`Missing: ${packages.join(', ')}. Install with: sudo apt-get install ${packages.join(' ')}`)
    process.exit(1)
  }
  say(`Installing ${packages.join(', ')} …`)
  const apt = (...parts) =>
    spawnSync([...prefix, 'apt-get', ...parts][0], [...prefix, 'apt-get', ...parts].slice(1), {
      stdio: ['ignore', 'ignore', 'inherit'],
      env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    }).status
  apt('update')
  if (apt('install', '-y', '--no-install-recommends', ...packages) !== 0) {
    say(`Could not install ${packages.join(', ')}. Install them by hand and start again.`)
    process.exit(1)
  }
}

/** `npm ci` when node_modules is missing or belongs to another lock file. */
export function ensurePackages() {
  const stamp = join(ROOT, 'node_modules', '.tierlight-lock')
  const lock = createHash('sha256')
    .update(readFileSync(join(ROOT, 'package-lock.json')))
    .digest('hex')
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === lock) return
  if (!existsSync(stamp) && existsSync(join(ROOT, 'node_modules', '.package-lock.json')) && sameAsLock()) {
    writeFileSync(stamp, lock)
    return
  }
  say('Installing packages …')
  execFileSync('npm', ['ci', '--no-audit', '--no-fund'], { cwd: ROOT, stdio: ['ignore', 'ignore', 'inherit'] })
  writeFileSync(stamp, lock)
}

/** Whether what npm installed is what the lock file asks for. */
function sameAsLock() {
  const versions = (file) =>
    Object.entries(JSON.parse(readFileSync(file, 'utf8')).packages)
      .filter(([path, one]) => path !== '' && !one.optional)
      .map(([path, one]) => `${path}@${one.version}`)
  const installed = new Set(versions(join(ROOT, 'node_modules', '.package-lock.json')))
  return versions(join(ROOT, 'package-lock.json')).every((one) => installed.has(one))
}

/** Builds client and server when a source is newer than what was built. */
export function ensureBuild() {
  const built = join(ROOT, 'dist', 'built')
  const sources = [
    'src',
    'server',
    'shared',
    'public',
    'index.html',
    'vite.config.ts',
    'vite.server.config.ts',
    'package-lock.json',
  ]
  const newest = Math.max(...sources.map((path) => newestChange(join(ROOT, path))))
  if (existsSync(built) && statSync(built).mtimeMs >= newest) return
  say('Building …')
  for (const config of ['vite.config.ts', 'vite.server.config.ts'])
    execFileSync(
      process.execPath,
      [join(ROOT, 'node_modules/vite/bin/vite.js'), 'build', '--config', config, '--logLevel', 'warn'],
      {
        cwd: ROOT,
        stdio: ['ignore', 'ignore', 'inherit'],
      },
    )
  mkdirSync(join(ROOT, 'dist'), { recursive: true })
  writeFileSync(built, new Date().toISOString())
}

/** A file of the private folder, made once: for example the secret that signs cookies. */
export function keptSecret(name, make) {
  mkdirSync(PRIVATE_FOLDER, { recursive: true })
  const file = join(PRIVATE_FOLDER, name)
  if (!existsSync(file)) writeFileSync(file, make(), { mode: 0o600 })
  return readFileSync(file, 'utf8')
}

function newestChange(path) {
  if (!existsSync(path)) return 0
  const stat = statSync(path)
  if (!stat.isDirectory()) return stat.mtimeMs
  return Math.max(0, ...readdirSync(path).map((name) => newestChange(join(path, name))))
}

function onPath(program) {
  return (
    spawnSync('sh', ['-c', `command -v ${program}`], { stdio: 'ignore' }).status === 0 ||
    existsSync(`/usr/sbin/${program}`)
  )
}

function canSudo() {
  return spawnSync('sudo', ['-n', 'true'], { stdio: 'ignore' }).status === 0
}
