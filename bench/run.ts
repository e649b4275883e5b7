import devicePage from './devicePage.bench.js'
import monteCarlo from './monteCarlo.bench.js'
import { NumpyMissing } from './numpy.js'
import type { Benchmark, BenchRow } from './rows.js'
import shortCircuitCurrent from './shortCircuitCurrent.bench.js'
import transferMatrix from './transferMatrix.bench.js'
import trustRates from './trustRates.bench.js'
import whatIf from './whatIf.bench.js'

const BENCHMARKS: readonly Benchmark[] = [
  shortCircuitCurrent,
  monteCarlo,
  whatIf,
  transferMatrix,
  trustRates,
  devicePage,
]

/** `npm run bench`, or `npm run bench -- WORD` for the benchmarks with the word in their name. */
const word = process.argv[2]?.toLowerCase() ?? ''
const chosen = BENCHMARKS.filter(({ name }) => name.toLowerCase().includes(word))
if (chosen.length === 0) {
  console.error(`No benchmark is called ${word}. There are: ${BENCHMARKS.map(({ name }) => name).join('; ')}.`)
  process.exitCode = 1
}
for (const benchmark of chosen) {
  console.log(`\n${benchmark.name}`)
  try {
    const rows = await benchmark.run()
    if (rows) for (const line of tableOf(rows)) console.log(`  ${line}`)
  } catch (error) {
    if (!(error instanceof NumpyMissing)) throw error
    console.log(`  skipped: ${error.message}`)
  }
}

function tableOf(rows: readonly BenchRow[]): string[] {
  const head = ['what', 'here / ms', 'peer / ms', 'peer : here', 'largest difference', 'peer']
  const cells = rows.map((row) => [
    row.name,
    row.oursMs.toPrecision(3),
    row.peerMs.toPrecision(3),
    (row.peerMs / row.oursMs).toPrecision(2),
    row.largestDifference.toExponential(1),
    row.peer,
  ])
  const widths = head.map((title, i) => Math.max(title.length, ...cells.map((line) => line[i]!.length)))
  const isText = (i: number): boolean => i === 0 || i === head.length - 1
  return [head, ...cells].map((line) =>
    line
      .map((cell, i) => (isText(i) ? cell.padEnd(widths[i]!) : cell.padStart(widths[i]!)))
      .join('  ')
      .trimEnd(),
  )
}
