import type { ReadingMapping } from '../../../shared/contract/scans.js'
import type { Work } from '../transaction.js'
import { ReadingMemory } from '../entities/ReadingMemory.js'

/** The mapping that was last confirmed in the project for a file of this shape. */
export async function rememberedMapping(work: Work, projectId: string, shape: string): Promise<ReadingMapping | null> {
  const memory = await work.findOneBy(ReadingMemory, { projectId, shape })
  return memory?.mapping ?? null
}

export async function rememberMapping(
  work: Work,
  projectId: string,
  shape: string,
  mapping: ReadingMapping,
  confirmedAt: Date,
): Promise<void> {
  await work.upsert(ReadingMemory, { projectId, shape, mapping, confirmedAt }, ['projectId', 'shape'])
}
