import { spawnSync } from 'node:child_process'
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { PRIVATE_FOLDER, ROOT } from './paths.mjs'
import { checkNode, ensureBuild, ensurePackages, ensurePrograms } from './prepare.mjs'

/**
 * `npm test`: prepares the machine, then type check, lint, format, and every layer of tests, and ends with the counts
 * of all of them. Each of the three static checks counts as one test. Arguments name stages to run alone.
 */
checkNode()
ensurePrograms([
  { program: 'mariadbd', package: 'mariadb-server' },
  { program: 'chromium', package: 'chromium' },
  { program: 'pdftotext', package: 'poppler-utils' },
])
ensurePackages()

const reports = join(PRIVATE_FOLDER, 'reports')
mkdirSync(reports, { recursive: true })
const bin = (name) => join(ROOT, 'node_modules', '.bin', name)
const total = { passed: 0, failed: 0, skipped: 0 }

const STAGES = {
  types: () => check('Type check', bin('vue-tsc'), ['-b']),
  lint: () => check('Lint', bin('eslint'), ['.']),
  format: () => check('Format', bin('prettier'), ['--check', '--log-level', 'warn', '.']),
  unit: () => vitest(['engine', 'reading', 'cli']),
  server: () => vitest(['server']),
  client: () => vitest(['client']),
  browser: () => playwright(),
}

const asked = process.argv.slice(2)
const unknown = asked.filter((name) => !(name in STAGES))
if (unknown.length > 0) {
  process.stderr.write(`There is no stage ${unknown.join(', ')}; there are ${Object.keys(STAGES).join(', ')}.\n`)
  process.exit(2)
}
for (const [name, run] of Object.entries(STAGES)) if (asked.length === 0 || asked.includes(name)) run()

const skipped = total.skipped > 0 ? `, ${total.skipped} skipped` : ''
process.stdout.write(`\n${total.passed} passed, ${total.failed} failed${skipped}\n`)
process.exit(total.failed > 0 ? 1 : 0)

function run(title, command, args, env = {}) {
  process.stdout.write(`\n── ${title} ──\n`)
  return spawnSync(command, args, {
    cwd: ROOT,
    stdio: ['ignore', 'inherit', 'inherit'],
    env: { ...process.env, ...env },
  }).status
}

function check(title, command, args) {
  if (run(title, command, args) === 0) total.passed++
  else total.failed++
}

function vitest(projects) {
  const file = join(reports, `vitest-${projects.join('-')}.json`)
  rmSync(file, { force: true })
  const chosen = projects.flatMap((project) => ['--project', project])
  const args = ['run', ...chosen, '--reporter=default', '--reporter=json', `--outputFile.json=${file}`]
  const status = run(`Tests: ${projects.join(', ')}`, bin('vitest'), args)
  const report = readReport(file)
  const failed = report?.numFailedTests ?? 0
  // A file that does not even load has no test of its own to count.
  const unloaded = (report?.testResults ?? []).filter(
    (one) => one.status === 'failed' && one.assertionResults.length === 0,
  )
  count(report?.numPassedTests ?? 0, failed + unloaded.length, report?.numPendingTests ?? 0, status)
}

function playwright() {
  ensureBuild()
  const file = join(reports, 'playwright.json')
  rmSync(file, { force: true })
  const status = run('Tests: browser', bin('playwright'), ['test', '--reporter=list,json'], {
    PLAYWRIGHT_JSON_OUTPUT_NAME: file,
  })
  const stats = readReport(file)?.stats
  count((stats?.expected ?? 0) + (stats?.flaky ?? 0), stats?.unexpected ?? 0, stats?.skipped ?? 0, status)
}

/** A stage that ended badly without a failed test (it crashed, or never began) counts as one failure. */
function count(passed, failed, skipped, status) {
  total.passed += passed
  total.failed += failed === 0 && status !== 0 ? 1 : failed
  total.skipped += skipped
}

function readReport(file) {
  return existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : null
}
