import { SEVERITIES, type Finding, type Severity } from '../../../shared/contract/findings.js'
import { findingsWithAnswers } from '../../database/repositories/scanChecks.js'
import type { Work } from '../../database/transaction.js'
import { presentFinding } from '../../presenters/finding.js'

/** What the checks found on these scans, by scan; a scan without findings is not in the map. */
export async function findingsOfScans(work: Work, scanIds: string[]): Promise<Map<string, Finding[]>> {
  const found = new Map<string, Finding[]>()
  for (const row of await findingsWithAnswers(work, scanIds)) {
    const list = found.get(row.scanId) ?? []
    list.push(presentFinding(row))
    found.set(row.scanId, list)
  }
  return found
}

export function worstOf(findings: readonly { severity: Severity }[]): Severity | null {
  const worst = Math.max(...findings.map((finding) => SEVERITIES.indexOf(finding.severity)))
  return SEVERITIES[worst] ?? null
}

/** The rejects that nobody has answered: while there is one, the scan cannot be used in a report. */
export function unansweredRejects<One extends Pick<Finding, 'severity' | 'answer'>>(findings: readonly One[]): One[] {
  return findings.filter((finding) => finding.severity === 'reject' && finding.answer === null)
}
