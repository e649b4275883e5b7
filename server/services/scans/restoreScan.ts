import { ApiError } from '../../../shared/contract/errors.js'
import type { Scan as ScanReply } from '../../../shared/contract/scans.js'
import { lockedScan, markScanDeleted } from '../../database/repositories/scans.js'
import { refreshSourceFileState } from '../../database/repositories/sourceFiles.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { restorableSince } from '../deletion.js'
import { recheckDevice } from '../checks/recheckDevice.js'
import { requireMember } from '../rights.js'
import { foundScan } from './findScan.js'
import { presentOneScan } from './presentScans.js'

export async function restoreScan(
  database: Database,
  actor: Actor,
  projectId: string,
  scanId: string,
): Promise<ScanReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const scan = foundScan(await lockedScan(work, projectId, scanId, restorableSince()))
    if (scan.device.deletedAt !== null)
      throw new ApiError(
        'STATE_CONFLICT',
        { reason: 'device-deleted' },
        `The device ${scan.device.name} is deleted; bring it back first.`,
      )
    if (scan.quantity === 'eqe' && scan.junctionId === null)
      throw new ApiError(
        'STATE_CONFLICT',
        { reason: 'junction-gone' },
        `The junction of the scan ${scan.label} was taken out of ${scan.device.name}; make the scan again from its file.`,
      )
    await markScanDeleted(work, scanId, null)
    await refreshSourceFileState(work, scan.sourceFileId)
    await recheckDevice(work, projectId, scan.deviceId)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'scan.restored',
      sentence: `${actor.name} brought the scan ${scan.label} of ${scan.device.name} back.`,
      subject: { kind: 'scan', id: scanId, name: scan.label },
    })
    return presentOneScan(work, { ...scan, deletedAt: null })
  })
}
