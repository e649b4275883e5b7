import { trustRates, unmixingErrors } from './trust/experiment.js'

const SEED = 2026
const DEVICES = 200
const percent = (part: number, whole: number): string => (whole === 0 ? '–' : `${((100 * part) / whole).toFixed(1)} %`)

/** Prints how often the checks name what is wrong, and how often they blame what is not, on devices of known truth. */
export function run(): void {
  const rates = trustRates(DEVICES, SEED)
  console.log(`Trust findings on ${rates.devices} random devices (${rates.scans} scans, seed ${SEED})`)
  console.log(
    `  faults found        ${rates.found} of ${rates.faults} (${percent(rates.found, rates.faults)}; at least 95 %)`,
  )
  console.log(
    `  false rejects       ${rates.falseRejects} of ${rates.scans} scans (${percent(rates.falseRejects, rates.scans)}; at most 2 %)`,
  )
  console.log(
    `  false cautions      ${rates.falseCautions} of ${rates.scans} scans (${percent(rates.falseCautions, rates.scans)})`,
  )
  console.log(`  checks of a device  ${rates.msPerDevice.toFixed(1)} ms (under 20 ms)`)
  console.log('  check                     faults  found  unexplained')
  for (const [check, counts] of Object.entries(rates.byCheck))
    console.log(
      `  ${check.padEnd(24)}  ${String(counts.faults).padStart(6)}  ${String(counts.found).padStart(5)}  ${String(counts.unexplained).padStart(11)}`,
    )
  const errors = unmixingErrors(DEVICES, SEED).map((e) => Math.abs(e.relative))
  const before = unmixingErrors(DEVICES, SEED).map((e) => Math.abs(e.before))
  const within = errors.filter((e) => e < 0.005).length
  console.log(
    `  unmixed Jsc         largest error ${percent(Math.max(...errors), 1)} below 20 % leakage; within 0.5 %: ${within} of ${DEVICES}`,
  )
  console.log(`  before unmixing     largest error ${percent(Math.max(...before), 1)}`)
}

export default { name: 'trustRates', run }
