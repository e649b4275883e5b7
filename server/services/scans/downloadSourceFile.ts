import { bytesOfSourceFile } from '../../database/repositories/sourceFiles.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { requireMember } from '../rights.js'
import { findSourceFile } from './findSourceFile.js'

/** The file as it was uploaded, byte for byte. */
export async function downloadSourceFile(
  { work }: Database,
  actor: Actor,
  projectId: string,
  sourceFileId: string,
): Promise<{ name: string; bytes: Buffer }> {
  await requireMember(work, actor, projectId, 'read')
  const file = await findSourceFile(work, projectId, sourceFileId)
  return { name: file.name, bytes: await bytesOfSourceFile(work, file.id) }
}
