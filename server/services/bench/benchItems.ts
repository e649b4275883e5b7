import { v7 as uuid } from 'uuid'
import { ApiError } from '../../../shared/contract/errors.js'
import type { BenchContents, BenchItem, BenchKind } from '../../database/entities/BenchItem.js'
import {
  benchItem,
  benchItems,
  lockBenchItem,
  removeBenchItem,
  saveBenchItemOnce,
  type BenchItemRow,
} from '../../database/repositories/bench.js'
import { refreshSourceFileState } from '../../database/repositories/sourceFiles.js'
import type { Database, Work } from '../../database/transaction.js'
import { presentBenchItem, type PresentedBenchItem } from '../../presenters/benchItem.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { requireCurrentVersion } from '../staleVersion.js'

/** How people call what is kept at the bench. */
const CALLED: Record<BenchKind, string> = {
  'set-up': 'measurement set-up',
  'light-source': 'light source',
  detector: 'reference detector',
}

/** What a person sends becomes what is kept: spectra and calibrations are looked up and copied. */
export type MakeContent<Kind extends BenchKind> = () => Promise<BenchContents[Kind]>

export async function listBenchItems<Kind extends BenchKind>(
  { work }: Database,
  actor: Actor,
  projectId: string,
  kind: Kind,
): Promise<{ items: PresentedBenchItem<Kind>[] }> {
  await requireMember(work, actor, projectId, 'read')
  return { items: (await benchItems(work, projectId, kind)).map((item) => presentBenchItem(item)) }
}

export async function createBenchItem<Kind extends BenchKind>(
  database: Database,
  actor: Actor,
  projectId: string,
  kind: Kind,
  name: string,
  makeContent: MakeContent<Kind>,
): Promise<PresentedBenchItem<Kind>> {
  await requireMember(database.work, actor, projectId, 'edit-library')
  const content = await makeContent()
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-library')
    const at = new Date()
    const row: BenchItemRow<Kind> = {
      id: uuid(),
      projectId,
      kind,
      name,
      content,
      version: 1,
      createdAt: at,
      updatedAt: at,
      updatedById: actor.personId,
    }
    await save(work, row)
    await record(work, actor, row, 'added')
    return presentBenchItem(await findBenchItem(work, projectId, kind, row.id))
  })
}

export async function updateBenchItem<Kind extends BenchKind>(
  database: Database,
  actor: Actor,
  projectId: string,
  kind: Kind,
  id: string,
  { version, name }: { version: number; name: string },
  makeContent: MakeContent<Kind>,
): Promise<PresentedBenchItem<Kind>> {
  await requireMember(database.work, actor, projectId, 'edit-library')
  await findBenchItem(database.work, projectId, kind, id)
  const content = await makeContent()
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-library')
    await lockBenchItem(work, projectId, id)
    const { updatedBy, ...before } = await findBenchItem(work, projectId, kind, id)
    requireCurrentVersion(version, presentBenchItem({ ...before, updatedBy }), `the ${CALLED[kind]} ${before.name}`)
    const row: BenchItemRow<Kind> = {
      ...before,
      name,
      content,
      version: version + 1,
      updatedAt: new Date(),
      updatedById: actor.personId,
    }
    await save(work, row)
    await record(work, actor, row, 'changed')
    return presentBenchItem(await findBenchItem(work, projectId, kind, id))
  })
}

export async function deleteBenchItem(
  database: Database,
  actor: Actor,
  projectId: string,
  kind: BenchKind,
  id: string,
): Promise<null> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-library')
    const item = await findBenchItem(work, projectId, kind, id)
    await removeBenchItem(work, id)
    if ('sourceFileId' in item.content) await refreshSourceFileState(work, item.content.sourceFileId)
    await record(work, actor, item, 'deleted')
    return null
  })
}

export async function findBenchItem<Kind extends BenchKind>(
  work: Work,
  projectId: string,
  kind: Kind,
  id: string,
): Promise<BenchItem<Kind>> {
  const item = await benchItem(work, projectId, kind, id)
  if (!item)
    throw new ApiError('NOT_FOUND', { what: CALLED[kind] }, `There is no such ${CALLED[kind]} in this project.`)
  return item
}

async function save<Kind extends BenchKind>(work: Work, row: BenchItemRow<Kind>): Promise<void> {
  if (await saveBenchItemOnce(work, row)) {
    if ('sourceFileId' in row.content) await refreshSourceFileState(work, row.content.sourceFileId)
    return
  }
  throw new ApiError(
    'ALREADY_EXISTS',
    { what: CALLED[row.kind], field: 'name', value: row.name },
    `The project has a ${CALLED[row.kind]} called ${row.name} already; choose another name.`,
  )
}

async function record(
  work: Work,
  actor: Actor,
  { id, projectId, kind, name }: Pick<BenchItem, 'id' | 'projectId' | 'kind' | 'name'>,
  deed: 'added' | 'changed' | 'deleted',
): Promise<void> {
  await recordAudit(work, {
    actor,
    projectId,
    action: `${kind}.${deed}`,
    sentence: `${actor.name} ${deed} the ${CALLED[kind]} ${name}.`,
    subject: { kind, id, name },
  })
}
