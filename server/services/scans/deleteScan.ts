import { lockedScan, markScanDeleted } from '../../database/repositories/scans.js'
import { refreshSourceFileState } from '../../database/repositories/sourceFiles.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { recheckDevice } from '../checks/recheckDevice.js'
import { requireMember } from '../rights.js'
import { foundScan } from './findScan.js'

/** The scan leaves every list and result; it can be brought back for thirty days. */
export async function deleteScan(database: Database, actor: Actor, projectId: string, scanId: string): Promise<null> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const scan = foundScan(await lockedScan(work, projectId, scanId))
    await markScanDeleted(work, scanId, new Date())
    await refreshSourceFileState(work, scan.sourceFileId)
    await recheckDevice(work, projectId, scan.deviceId)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'scan.deleted',
      sentence: `${actor.name} deleted the scan ${scan.label} of ${scan.device.name}.`,
      subject: { kind: 'scan', id: scanId, name: scan.label },
    })
    return null
  })
}
