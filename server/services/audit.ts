import { v7 as uuid } from 'uuid'
import { addAuditEvent } from '../database/repositories/auditEvents.js'
import type { Work } from '../database/transaction.js'
import type { Actor } from './actor.js'

export interface AuditEntry {
  /** Null for what the server does of itself. */
  actor: Pick<Actor, 'personId' | 'name'> | null
  projectId?: string | null
  /** Plain dotted name, for example scan.accepted. */
  action: string
  sentence: string
  subject?: { kind: string; id: string; name: string }
}

/** Writes down who did what, in the transaction of the deed. */
export async function recordAudit(work: Work, entry: AuditEntry): Promise<void> {
  await addAuditEvent(work, {
    id: uuid(),
    at: new Date(),
    actorId: entry.actor?.personId ?? null,
    actorName: entry.actor?.name ?? null,
    projectId: entry.projectId ?? null,
    action: entry.action,
    sentence: entry.sentence.slice(0, 1000),
    subjectKind: entry.subject?.kind ?? null,
    subjectId: entry.subject?.id ?? null,
    subjectName: entry.subject?.name.slice(0, 200) ?? null,
  })
}
