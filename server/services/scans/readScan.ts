import type { CurveData } from '../../../shared/contract/primitives.js'
import type { Scan as ScanReply } from '../../../shared/contract/scans.js'
import { scanOfProject } from '../../database/repositories/scans.js'
import type { Database } from '../../database/transaction.js'
import { presentCurve } from '../../presenters/curve.js'
import type { Actor } from '../actor.js'
import { requireMember } from '../rights.js'
import { foundScan } from './findScan.js'
import { presentOneScan } from './presentScans.js'

export async function readScan(
  { work }: Database,
  actor: Actor,
  projectId: string,
  scanId: string,
): Promise<{ scan: ScanReply; curve: CurveData }> {
  await requireMember(work, actor, projectId, 'read')
  const scan = foundScan(await scanOfProject(work, projectId, scanId))
  return { scan: await presentOneScan(work, scan), curve: presentCurve(scan) }
}
