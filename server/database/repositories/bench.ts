import { BenchItem, type BenchKind } from '../entities/BenchItem.js'
import { isDuplicateKey } from '../databaseErrors.js'
import type { Work } from '../transaction.js'

export type BenchItemRow<Kind extends BenchKind> = Omit<BenchItem<Kind>, 'project' | 'updatedBy'>

/** By name. */
export async function benchItems<Kind extends BenchKind>(
  work: Work,
  projectId: string,
  kind: Kind,
): Promise<BenchItem<Kind>[]> {
  const rows = await work.find(BenchItem, {
    where: { projectId, kind },
    relations: { updatedBy: true },
    order: { name: 'ASC' },
  })
  return rows as BenchItem<Kind>[]
}

export async function benchItem<Kind extends BenchKind>(
  work: Work,
  projectId: string,
  kind: Kind,
  id: string,
): Promise<BenchItem<Kind> | null> {
  const row = await work.findOne(BenchItem, { where: { id, projectId, kind }, relations: { updatedBy: true } })
  return row as BenchItem<Kind> | null
}

export async function lockBenchItem(work: Work, projectId: string, id: string): Promise<void> {
  await work.findOne(BenchItem, {
    select: { id: true },
    where: { id, projectId },
    lock: { mode: 'pessimistic_write' },
  })
}

/** False where the project has one of this kind and name already; then nothing is saved. */
export async function saveBenchItemOnce<Kind extends BenchKind>(work: Work, row: BenchItemRow<Kind>): Promise<boolean> {
  try {
    await work.save(BenchItem, row)
    return true
  } catch (error) {
    if (isDuplicateKey(error)) return false
    throw error
  }
}

export async function removeBenchItem(work: Work, id: string): Promise<void> {
  await work.delete(BenchItem, { id })
}
