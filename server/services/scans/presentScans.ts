import type { Scan as ScanReply } from '../../../shared/contract/scans.js'
import type { Scan } from '../../database/entities/Scan.js'
import { scanHeadsOfDevices } from '../../database/repositories/scans.js'
import type { Work } from '../../database/transaction.js'
import { presentScan, type ScanStanding } from '../../presenters/scan.js'
import { findingsOfScans, unansweredRejects, worstOf } from '../checks/findingsOfScans.js'
import { scansInUse } from '../matching/scansInUse.js'

/** The scans with what their rows do not know: whether they are in use, and what the checks found. */
export async function presentScans(work: Work, scans: readonly Scan[]): Promise<ScanReply[]> {
  const heads = await scanHeadsOfDevices(work, [...new Set(scans.map((scan) => scan.deviceId))])
  const inUse = new Set(scansInUse(heads).map((head) => head.id))
  const found = await findingsOfScans(
    work,
    scans.map((scan) => scan.id),
  )
  return scans.map((scan) => {
    const findings = found.get(scan.id) ?? []
    const standing: ScanStanding = {
      inUse: inUse.has(scan.id),
      worstFinding: worstOf(findings),
      unansweredRejects: unansweredRejects(findings).length,
    }
    return presentScan(scan, standing)
  })
}

export async function presentOneScan(work: Work, scan: Scan): Promise<ScanReply> {
  const [reply] = await presentScans(work, [scan])
  return reply!
}
