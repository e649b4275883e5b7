import type { Page } from '../../../shared/contract/primitives.js'
import type { QueryOf } from '../../../shared/contract/route.js'
import type { SourceFile as SourceFileReply, listSourceFiles as route } from '../../../shared/contract/scans.js'
import { sourceFilesOfProject } from '../../database/repositories/sourceFiles.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { cursorAfter, timePosition } from '../cursor.js'
import { requireMember } from '../rights.js'
import { presentSourceFiles } from './presentSourceFiles.js'

export async function listSourceFiles(
  { work }: Database,
  actor: Actor,
  projectId: string,
  { state, cursor, limit }: QueryOf<typeof route>,
): Promise<Page<SourceFileReply>> {
  await requireMember(work, actor, projectId, 'read')
  const { files, total } = await sourceFilesOfProject(work, projectId, state, timePosition(cursor), limit)
  const nextCursor = cursorAfter(files, limit, ({ uploadedAt, id }) => ({ at: uploadedAt, id }))
  return { items: await presentSourceFiles(work, files), total, nextCursor }
}
