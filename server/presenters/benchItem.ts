import type { BenchContents, BenchItem, BenchKind } from '../database/entities/BenchItem.js'

/** Needs the relation `updatedBy`. */
export function presentBenchItem<Kind extends BenchKind>(item: BenchItem<Kind>) {
  return {
    id: item.id,
    projectId: item.projectId,
    name: item.name,
    content: item.content as BenchContents[Kind],
    version: item.version,
    createdAt: item.createdAt.toISOString(),
    updatedAt: item.updatedAt.toISOString(),
    updatedBy: { id: item.updatedBy.id, name: item.updatedBy.name },
  }
}
export type PresentedBenchItem<Kind extends BenchKind> = ReturnType<typeof presentBenchItem<Kind>>
