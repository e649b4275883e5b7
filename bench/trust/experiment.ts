import { biasPhotocurrents } from '../../shared/physics/measurement/biasLight.js'
import { makeCurve, valueAt } from '../../shared/physics/curve.js'
import { shortCircuitCurrentDensity } from '../../shared/physics/currents.js'
import { runChecks } from '../../shared/physics/checks/runChecks.js'
import type { Finding } from '../../shared/physics/checks/finding.js'
import { unmixScans } from '../../shared/physics/measurement/unmixing.js'
import { seededRandom } from '../../shared/physics/numerics/random.js'
import { randomDevice } from './devices.js'
import { FAULTS, withShunt, type Fault } from './faults.js'
import { measure, planNight, SPECTRUM, type MeasuredScan } from './measuring.js'

export interface TrustRates {
  readonly devices: number
  readonly scans: number
  readonly faults: number
  readonly found: number
  /** Scans with a reject that the truth does not bear out. */
  readonly falseRejects: number
  /** Scans with a caution that neither a fault nor the truth explains. */
  readonly falseCautions: number
  /** By check: how often the fault was there, and found. */
  readonly byCheck: Readonly<
    Record<string, { readonly faults: number; readonly found: number; readonly unexplained: number }>
  >
  /** Wall time of the checks of one device, ms. */
  readonly msPerDevice: number
}

/** Random devices with none, one or two random faults each; does every check name its fault, and nothing else? */
export function trustRates(devices: number, seed: number): TrustRates {
  const random = seededRandom(seed)
  const byCheck: Record<string, { faults: number; found: number; unexplained: number }> = Object.fromEntries(
    FAULTS.map((f) => [f.check, { faults: 0, found: 0, unexplained: 0 }]),
  )
  let scans = 0
  let falseRejects = 0
  let falseCautions = 0
  let elapsed = 0
  for (let n = 0; n < devices; n++) {
    const planned = planNight(randomDevice(random), random)
    const faults: { fault: Fault; k: number }[] = []
    for (let i = 0; i < n % 3; i++) {
      const fault = FAULTS[random.below(FAULTS.length)]!
      const k = random.below(planned.scans.length)
      const isFree = faults.every((f) => f.k !== k && f.fault.check !== fault.check)
      if (isFree && fault.apply(planned, k, random)) faults.push({ fault, k })
    }
    const measured = measure(planned)
    const started = performance.now()
    const reports = measured.map(({ context }) => runChecks(context))
    elapsed += performance.now() - started
    for (const { fault, k } of faults) {
      // The smallest current belongs to the device, wherever it is reported.
      const places = fault.check === 'disagrees-with-jv' ? reports : [reports[k]!]
      byCheck[fault.check]!.faults++
      if (places.some((r) => r.findings.some((f) => f.check === fault.check))) byCheck[fault.check]!.found++
    }
    reports.forEach((report, k) => {
      scans++
      const unexplained = report.findings.filter((f) => f.severity !== 'note' && !isExplained(f, measured, k, faults))
      for (const f of unexplained) byCheck[f.check]!.unexplained++
      if (unexplained.some((f) => f.severity === 'reject')) falseRejects++
      if (unexplained.some((f) => f.severity === 'caution')) falseCautions++
    })
  }
  const totals = Object.values(byCheck)
  return {
    devices,
    scans,
    faults: totals.reduce((sum, t) => sum + t.faults, 0),
    found: totals.reduce((sum, t) => sum + t.found, 0),
    falseRejects,
    falseCautions,
    byCheck,
    msPerDevice: elapsed / devices,
  }
}

/** Does the truth, a fault of this scan, or one of the device that reaches this scan, account for a finding? */
function isExplained(
  finding: Finding,
  measured: readonly MeasuredScan[],
  k: number,
  faults: readonly { readonly fault: Fault; readonly k: number }[],
): boolean {
  const { simulated, context } = measured[k]!
  const { truth } = simulated
  if (finding.check === 'sum-above-absorptance' && measured.some((m) => m.largestTrueSum > 1)) return true
  if (finding.check === 'leakage') {
    const largest = Math.max(...truth.selectivities.filter((_, j) => j !== k))
    return largest > (finding.severity === 'reject' ? 0.05 : 0.01) * 0.95
  }
  if (finding.check === 'bias-light-too-weak') {
    const currents = truth.biasPhotocurrentsMaCm2
    const margin = Math.min(...currents.filter((_, j) => j !== k)) / currents[k]! - 1
    return margin <= (finding.severity === 'reject' ? 0 : 0.2)
  }
  if (finding.check === 'bias-voltage-off') {
    const scans = context.junctions.map((j) => j.scan!)
    const seen = biasPhotocurrents(scans, context.conditions.biasLight ?? [])
    if (seen.some((j, i) => i !== k && Math.abs(j / truth.biasPhotocurrentsMaCm2[i]! - 1) > 0.2)) return true
  }
  return faults.some(
    (f) =>
      (f.k === k && (f.fault.check === finding.check || f.fault.entails.includes(finding.check))) ||
      (isOfDevice(finding) && (f.fault.check === finding.check || f.fault.entails.includes(finding.check))),
  )
}

/** These compare several scans: the fault may be in another one. */
const isOfDevice = (finding: Finding): boolean => ['sum-above-absorptance', 'disagrees-with-jv'].includes(finding.check)

export interface UnmixingError {
  readonly share: number
  /** Unmixed J_sc over the true one, less one. */
  readonly relative: number
  /** The same before unmixing. */
  readonly before: number
}

/** Devices with one leaky junction, up to a fifth of foreign response: how far is the unmixed current from the truth? */
export function unmixingErrors(devices: number, seed: number): UnmixingError[] {
  const random = seededRandom(seed)
  const errors: UnmixingError[] = []
  while (errors.length < devices) {
    const device = randomDevice(random)
    const planned = planNight(device, random)
    const k = random.below(planned.scans.length)
    if (!withShunt(planned.scans, k, random.between(0.005, 0.195))) continue
    const measured = measure(planned)
    const scan = measured[k]!.simulated.scan
    // The share that falls on the series resistance follows from the diode parameters; no scan shows it.
    const resistiveShares = measured.map((m) => 1 - m.simulated.truth.selectivities.reduce((sum, w) => sum + w, 0))
    const corrected = unmixScans(
      measured.map((m) => m.simulated.scan),
      { resistiveShares: resistiveShares.map((share) => Math.max(0, share)) },
    )[k]!.corrected
    const truth = shortCircuitCurrentDensity(
      makeCurve(
        scan.wavelengthNm,
        scan.wavelengthNm.map((nm) => valueAt(device.stack.eqes[k]!, nm)),
      ),
      SPECTRUM,
    )
    errors.push({
      share: 1 - measured[k]!.simulated.truth.selectivities[k]!,
      relative: shortCircuitCurrentDensity(corrected, SPECTRUM) / truth - 1,
      before: shortCircuitCurrentDensity(scan, SPECTRUM) / truth - 1,
    })
  }
  return errors
}
