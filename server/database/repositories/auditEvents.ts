import { AuditEvent } from '../entities/AuditEvent.js'
import type { Work } from '../transaction.js'

export async function addAuditEvent(work: Work, event: AuditEvent): Promise<void> {
  await work.insert(AuditEvent, event)
}
