import { ApiError } from '../../../shared/contract/errors.js'
import type { Finding as FindingReply } from '../../../shared/contract/findings.js'
import type { BodyOf } from '../../../shared/contract/route.js'
import type { answerFinding as route } from '../../../shared/contract/scanChecks.js'
import type { Scan } from '../../database/entities/Scan.js'
import { saveAnswer } from '../../database/repositories/scanChecks.js'
import { lockedScan, scanOfProject } from '../../database/repositories/scans.js'
import type { Database, Work } from '../../database/transaction.js'
import { presentFinding } from '../../presenters/finding.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { foundScan } from '../scans/findScan.js'
import { findFinding } from './findFinding.js'

type Answer = BodyOf<typeof route>

/** Says that the scan was repeated, or why the finding is accepted. A later answer takes the place of an earlier one. */
export async function answerFinding(
  database: Database,
  actor: Actor,
  projectId: string,
  scanId: string,
  findingId: string,
  answer: Answer,
): Promise<FindingReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const scan = foundScan(await lockedScan(work, projectId, scanId))
    const finding = await findFinding(work, scanId, findingId)
    const repeat = answer.kind === 'repeated' ? await repeatOf(work, scan, answer.repeatedAsScanId) : null
    await saveAnswer(work, {
      id: findingId,
      answerKind: answer.kind,
      repeatedAsScanId: repeat?.id ?? null,
      answerReason: answer.reason,
      answeredById: actor.personId,
      answeredAt: new Date(),
    })
    const said = repeat
      ? `repeated as the scan ${repeat.label}`
      : `accepted because ${answer.reason.replace(/\.$/, '')}`
    await recordAudit(work, {
      actor,
      projectId,
      action: 'finding.answered',
      sentence: `${actor.name} answered “${finding.title}” on the scan ${scan.label} of ${scan.device.name}: ${said}.`,
      subject: { kind: 'scan', id: scanId, name: scan.label },
    })
    return presentFinding(await findFinding(work, scanId, findingId))
  })
}

async function repeatOf(work: Work, scan: Scan, repeatId: string): Promise<Scan> {
  const repeat = await scanOfProject(work, scan.projectId, repeatId)
  if (repeat && repeat.id !== scan.id && repeat.junctionId === scan.junctionId) return repeat
  const message =
    repeatId === scan.id
      ? 'A scan is not a repeat of itself; choose the later scan of this junction.'
      : 'The repeat must be another scan of the same junction.'
  throw new ApiError('INPUT_INVALID', { errors: [{ path: ['repeatedAsScanId'], message }] }, message)
}
