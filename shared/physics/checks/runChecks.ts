import { assertCurve } from '../curve.js'
import { DomainError } from '../errors.js'
import type { Check, ScanInContext } from './check.js'
import type { Finding, Severity } from './finding.js'
import { CHECKS } from './registry.js'

/** Thresholds by check and name; what is left out keeps its default. */
export type ThresholdSettings = Readonly<Record<string, Readonly<Record<string, number>>>>

export interface CheckReport {
  /** Worst first, then in the order of the registry. */
  readonly findings: Finding[]
  /** Names of the checks that had their inputs and did not fire. */
  readonly passed: string[]
  /** Checks that lacked an input, and which. */
  readonly notChecked: { readonly check: string; readonly title: string; readonly reason: string }[]
}

const RANK: Record<Severity, number> = { reject: 0, caution: 1, note: 2 }

/**
 * Runs every check of the registry on a scan. Nothing is changed; a check without its inputs is listed with the reason.
 * @throws DomainError for a scan that is no curve, a junction index outside the device, or a threshold that no check
 * has. Cost: some milliseconds, the fits of the leakage and second-order checks most of it.
 */
export function runChecks(
  context: ScanInContext,
  settings: ThresholdSettings = {},
  checks: readonly Check[] = CHECKS,
): CheckReport {
  assertCurve(context.scan, 'scan')
  if (!context.junctions[context.junctionIndex])
    throw new DomainError(
      'junctionIndex',
      `junctionIndex is ${context.junctionIndex}; the device has ${context.junctions.length} junctions, from 0.`,
    )
  assertSettings(settings, checks)
  const report: CheckReport = { findings: [], passed: [], notChecked: [] }
  for (const check of checks) {
    const result = check.run(context, thresholdsOf(check, settings[check.name]))
    if (result.outcome === 'fired') report.findings.push(result.finding)
    else if (result.outcome === 'passed') report.passed.push(check.name)
    else report.notChecked.push({ check: check.name, title: check.title, reason: result.reason })
  }
  report.findings.sort((a, b) => RANK[a.severity] - RANK[b.severity])
  return report
}

/** The thresholds that a check runs with: its defaults, replaced where the settings name another value. */
export function thresholdsOf(check: Check, settings: Readonly<Record<string, number>> = {}): Record<string, number> {
  const defaults = Object.entries(check.defaultThresholds).map(([name, { value }]) => [name, value])
  return { ...Object.fromEntries(defaults), ...settings }
}

function assertSettings(settings: ThresholdSettings, checks: readonly Check[]): void {
  for (const [name, values] of Object.entries(settings)) {
    const check = checks.find((c) => c.name === name)
    if (!check) throw new DomainError(`thresholds.${name}`, `There is no check named ${name}.`)
    for (const [threshold, value] of Object.entries(values)) {
      const where = `thresholds.${name}.${threshold}`
      if (!check.defaultThresholds[threshold])
        throw new DomainError(
          where,
          `${name} has no threshold ${threshold}; it has ${Object.keys(check.defaultThresholds).join(', ')}.`,
        )
      if (!Number.isFinite(value)) throw new DomainError(where, `${where} is ${value}; it must be a finite number.`)
    }
  }
}
