import type { BodyOf } from '../../../shared/contract/route.js'
import type { Scan as ScanReply, updateConditions as route } from '../../../shared/contract/scans.js'
import { lockedScan, saveScanConditions } from '../../database/repositories/scans.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { recheckDevice } from '../checks/recheckDevice.js'
import { requireMember } from '../rights.js'
import { requireCurrentVersion } from '../staleVersion.js'
import { foundScan } from './findScan.js'
import { presentOneScan } from './presentScans.js'

export async function updateConditions(
  database: Database,
  actor: Actor,
  projectId: string,
  scanId: string,
  { version, label, conditions }: BodyOf<typeof route>,
): Promise<ScanReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const scan = foundScan(await lockedScan(work, projectId, scanId))
    requireCurrentVersion(version, await presentOneScan(work, scan), `the scan ${scan.label}`)
    const saved = { ...scan, label, conditions, version: scan.version + 1 }
    await saveScanConditions(work, saved)
    await recheckDevice(work, projectId, scan.deviceId)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'scan.conditions-updated',
      sentence: `${actor.name} corrected the conditions of the scan ${label} of ${scan.device.name}.`,
      subject: { kind: 'scan', id: scanId, name: label },
    })
    return presentOneScan(work, saved)
  })
}
