import { saveAnswer } from '../../database/repositories/scanChecks.js'
import { lockedScan } from '../../database/repositories/scans.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { foundScan } from '../scans/findScan.js'
import { findFinding } from './findFinding.js'

export async function withdrawAnswer(
  database: Database,
  actor: Actor,
  projectId: string,
  scanId: string,
  findingId: string,
): Promise<null> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const scan = foundScan(await lockedScan(work, projectId, scanId))
    const finding = await findFinding(work, scanId, findingId)
    await saveAnswer(work, {
      id: findingId,
      answerKind: null,
      repeatedAsScanId: null,
      answerReason: '',
      answeredById: null,
      answeredAt: null,
    })
    await recordAudit(work, {
      actor,
      projectId,
      action: 'finding.answer-withdrawn',
      sentence: `${actor.name} took back the answer to “${finding.title}” on the scan ${scan.label} of ${scan.device.name}.`,
      subject: { kind: 'scan', id: scanId, name: scan.label },
    })
    return null
  })
}
