import type { BodyOf } from '../../../shared/contract/route.js'
import type { Scan as ScanReply, ScanState, decideScan as route } from '../../../shared/contract/scans.js'
import { lockedScan, saveScanDecision } from '../../database/repositories/scans.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { recheckDevice } from '../checks/recheckDevice.js'
import { requireMember } from '../rights.js'
import { requireCurrentVersion } from '../staleVersion.js'
import { foundScan } from './findScan.js'
import { presentOneScan } from './presentScans.js'

const DEED: Record<ScanState, string> = {
  accepted: 'accepted',
  excluded: 'excluded',
  checked: 'took back the decision on',
}
const ACTION: Record<ScanState, string> = {
  accepted: 'scan.accepted',
  excluded: 'scan.excluded',
  checked: 'scan.decision-taken-back',
}

/** Accepts or excludes a scan; `checked` takes an earlier decision back and with it its reason. */
export async function decideScan(
  database: Database,
  actor: Actor,
  projectId: string,
  scanId: string,
  { version, state, reason }: BodyOf<typeof route>,
): Promise<ScanReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const scan = foundScan(await lockedScan(work, projectId, scanId))
    requireCurrentVersion(version, await presentOneScan(work, scan), `the scan ${scan.label}`)
    const isDecision = state !== 'checked'
    const decision = {
      state,
      decidedById: isDecision ? actor.personId : null,
      decidedAt: isDecision ? new Date() : null,
      decisionReason: isDecision ? reason : '',
      version: scan.version + 1,
    }
    await saveScanDecision(work, { id: scanId, ...decision })
    await recheckDevice(work, projectId, scan.deviceId)
    const because = reason === '' ? '' : `: ${reason}`
    await recordAudit(work, {
      actor,
      projectId,
      action: ACTION[state],
      sentence: `${actor.name} ${DEED[state]} the scan ${scan.label} of ${scan.device.name}${because}.`.replace(
        '..',
        '.',
      ),
      subject: { kind: 'scan', id: scanId, name: scan.label },
    })
    return presentOneScan(work, foundScan(await lockedScan(work, projectId, scanId)))
  })
}
