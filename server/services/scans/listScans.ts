import type { Page } from '../../../shared/contract/primitives.js'
import type { QueryOf } from '../../../shared/contract/route.js'
import type { Scan as ScanReply, listScans as route } from '../../../shared/contract/scans.js'
import { scansOfProject } from '../../database/repositories/scans.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { cursorAfter, timePosition } from '../cursor.js'
import { restorableSince } from '../deletion.js'
import { requireMember } from '../rights.js'
import { presentScans } from './presentScans.js'

export async function listScans(
  { work }: Database,
  actor: Actor,
  projectId: string,
  { deviceId, deleted, cursor, limit }: QueryOf<typeof route>,
): Promise<Page<ScanReply>> {
  await requireMember(work, actor, projectId, 'read')
  const filter = { deviceId, deletedSince: deleted === 'yes' ? restorableSince() : null }
  const { scans, total } = await scansOfProject(work, projectId, filter, timePosition(cursor), limit)
  const nextCursor = cursorAfter(scans, limit, ({ uploadedAt, id }) => ({ at: uploadedAt, id }))
  return { items: await presentScans(work, scans), total, nextCursor }
}
