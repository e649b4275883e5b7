import type { FileReading, ReadingMapping } from '../../../shared/contract/scans.js'
import { bytesOfSourceFile } from '../../database/repositories/sourceFiles.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { requireMember } from '../rights.js'
import { findSourceFile } from './findSourceFile.js'
import { presentOneSourceFile } from './presentSourceFiles.js'
import { understandAs } from './understand.js'

/** The file under a corrected mapping; nothing is saved. */
export async function previewMapping(
  { work }: Database,
  actor: Actor,
  projectId: string,
  sourceFileId: string,
  mapping: ReadingMapping,
): Promise<FileReading> {
  await requireMember(work, actor, projectId, 'read')
  const file = await findSourceFile(work, projectId, sourceFileId)
  const understanding = await understandAs(await bytesOfSourceFile(work, file.id), file.name, mapping)
  return { file: await presentOneSourceFile(work, file), recognisedAs: null, ...understanding }
}
