import type { FileReading } from '../../../shared/contract/scans.js'
import { bytesOfSourceFile } from '../../database/repositories/sourceFiles.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { requireMember } from '../rights.js'
import { findSourceFile } from './findSourceFile.js'
import { presentOneSourceFile } from './presentSourceFiles.js'
import { understand } from './understand.js'

/** What the reader makes of a file that was uploaded earlier. */
export async function readSourceFile(
  { work }: Database,
  actor: Actor,
  projectId: string,
  sourceFileId: string,
): Promise<FileReading> {
  await requireMember(work, actor, projectId, 'read')
  const file = await findSourceFile(work, projectId, sourceFileId)
  const understanding = await understand(work, projectId, await bytesOfSourceFile(work, file.id), file.name)
  return { file: await presentOneSourceFile(work, file), recognisedAs: null, ...understanding }
}
