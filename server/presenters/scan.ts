import type { Severity } from '../../shared/contract/findings.js'
import type { Scan as ScanReply, SourceFile as SourceFileReply } from '../../shared/contract/scans.js'
import type { Scan } from '../database/entities/Scan.js'
import type { SourceFile } from '../database/entities/SourceFile.js'

/** What the scan's own row does not know. */
export interface ScanStanding {
  inUse: boolean
  worstFinding: Severity | null
  unansweredRejects: number
}

/** Needs the relations `sourceFile`, `uploadedBy` and `decidedBy`. */
export function presentScan(scan: Scan, standing: ScanStanding): ScanReply {
  return {
    id: scan.id,
    projectId: scan.projectId,
    deviceId: scan.deviceId,
    junctionId: scan.junctionId,
    quantity: scan.quantity,
    label: scan.label,
    points: scan.points,
    rangeNm: [scan.firstNm, scan.lastNm],
    conditions: scan.conditions,
    state: scan.state,
    decision:
      scan.decidedBy && scan.decidedAt
        ? {
            by: { id: scan.decidedBy.id, name: scan.decidedBy.name },
            at: scan.decidedAt.toISOString(),
            reason: scan.decisionReason,
          }
        : null,
    inUse: standing.inUse,
    worstFinding: standing.worstFinding,
    unansweredRejects: standing.unansweredRejects,
    origin: scan.origin,
    parentScanIds: scan.parentScanIds,
    biasSeriesId: scan.biasSeriesId,
    sourceFile: { id: scan.sourceFile.id, name: scan.sourceFile.name, sha256: scan.sourceFile.sha256 },
    mapping: scan.mapping,
    uploadedAt: scan.uploadedAt.toISOString(),
    uploadedBy: { id: scan.uploadedBy.id, name: scan.uploadedBy.name },
    version: scan.version,
    deletedAt: scan.deletedAt?.toISOString() ?? null,
  }
}

/** Needs the relation `uploadedBy`; `scanIds` are the scans that were made of the file and are not deleted. */
export function presentSourceFile(file: SourceFile, scanIds: string[]): SourceFileReply {
  return {
    id: file.id,
    name: file.name,
    sizeBytes: file.sizeBytes,
    sha256: file.sha256,
    uploadedAt: file.uploadedAt.toISOString(),
    uploadedBy: { id: file.uploadedBy.id, name: file.uploadedBy.name },
    state: file.state,
    scanIds,
  }
}
