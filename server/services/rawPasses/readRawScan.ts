import type { RawScan } from '../../../shared/contract/rawPasses.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { requireMember } from '../rights.js'
import { presentRawScan } from './presentRawScan.js'

export async function readRawScan(
  { work }: Database,
  actor: Actor,
  projectId: string,
  scanId: string,
): Promise<RawScan> {
  await requireMember(work, actor, projectId, 'read')
  return presentRawScan(work, projectId, scanId)
}
