import { createHash } from 'node:crypto'
import { v7 as uuid } from 'uuid'
import type { Right } from '../../../shared/contract/rights.js'
import type { FileReading } from '../../../shared/contract/scans.js'
import { keepSourceFile } from '../../database/repositories/sourceFiles.js'
import type { Database, Work } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { findSourceFile } from './findSourceFile.js'
import { presentOneSourceFile } from './presentSourceFiles.js'
import { fileUnreadable, understand, type Understanding } from './understand.js'

export interface UploadedFile {
  name: string
  bytes: Buffer
}

/**
 * Takes files in, reads them, and keeps them byte for byte; none becomes a scan yet. All of a request are kept or none:
 * a file in which the reader finds no table at all is refused with its sentence (FILE_UNREADABLE), and nothing of the
 * request is saved, since no correction could make a scan of it. A file whose table the proposed mapping cannot read is
 * kept, its sentence in `problem`, for the person to correct the mapping. Bytes that the project has are not kept twice.
 * `receive` takes the bytes in; it is called once it is known that the actor may upload.
 */
export async function uploadFiles(
  database: Database,
  actor: Actor,
  projectId: string,
  right: Extract<Right, 'edit-scans' | 'edit-library'>,
  receive: () => Promise<UploadedFile[]>,
): Promise<{ items: FileReading[] }> {
  await requireMember(database.work, actor, projectId, right)
  const uploads = (await receive()).map((file) => ({ ...file, sha256: sha256Of(file.bytes) }))
  const understandings: Understanding[] = []
  for (const { bytes, name } of uploads)
    understandings.push(await understandWithTable(database.work, projectId, bytes, name))

  const kept = await database.transaction((work) => keepAll(work, actor, projectId, uploads))
  const items: FileReading[] = []
  for (const [i, { id, isKnown }] of kept.entries()) {
    const file = await presentOneSourceFile(database.work, await findSourceFile(database.work, projectId, id))
    items.push({ file, recognisedAs: isKnown ? file : null, ...understandings[i]! })
  }
  return { items }
}

/** What the reader makes of a file; one without a table is refused. */
async function understandWithTable(work: Work, projectId: string, bytes: Buffer, name: string): Promise<Understanding> {
  const understanding = await understand(work, projectId, bytes, name)
  if (understanding.problem && understanding.tables.length === 0) throw fileUnreadable(name, understanding.problem)
  return understanding
}

function sha256Of(bytes: Buffer): string {
  return createHash('sha256').update(bytes).digest('hex')
}

async function keepAll(
  work: Work,
  actor: Actor,
  projectId: string,
  uploads: readonly (UploadedFile & { sha256: string })[],
): Promise<{ id: string; isKnown: boolean }[]> {
  const kept: { id: string; isKnown: boolean }[] = []
  for (const { name, bytes, sha256 } of uploads) {
    const file = await keepSourceFile(work, {
      id: uuid(),
      projectId,
      name,
      sizeBytes: bytes.length,
      sha256,
      bytes,
      state: 'uploaded',
      uploadedAt: new Date(),
      uploadedById: actor.personId,
    })
    kept.push(file)
    if (file.isKnown) continue
    await recordAudit(work, {
      actor,
      projectId,
      action: 'source-file.uploaded',
      sentence: `${actor.name} uploaded ${name} (SHA-256 ${sha256.slice(0, 12)}…).`,
      subject: { kind: 'source-file', id: file.id, name },
    })
  }
  return kept
}
