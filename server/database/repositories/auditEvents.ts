import { AuditEvent } from '../entities/AuditEvent.js'
import type { Work } from '../transaction.js'
import type { TimePosition } from './position.js'

export interface AuditFilters {
  projectId: string | null
  actorId: string | null
  /** An action, or the first part of it: `scan` finds `scan.accepted`. */
  action: string | null
  from: Date | null
  to: Date | null
}

export async function addAuditEvent(work: Work, event: AuditEvent): Promise<void> {
  await work.insert(AuditEvent, event)
}

export async function auditEventsNewestFirst(
  work: Work,
  filters: AuditFilters,
  after: TimePosition | null,
  limit: number,
): Promise<{ events: AuditEvent[]; total: number }> {
  const query = work.createQueryBuilder(AuditEvent, 'event').where('1 = 1')
  const { projectId, actorId, action, from, to } = filters
  if (projectId) query.andWhere('event.projectId = :projectId', { projectId })
  if (actorId) query.andWhere('event.actorId = :actorId', { actorId })
  if (action)
    query.andWhere('(event.action = :action OR event.action LIKE :actions)', {
      action,
      actions: `${action.replace(/[\\%_]/g, '\\$&')}.%`,
    })
  if (from) query.andWhere('event.at >= :from', { from })
  if (to) query.andWhere('event.at <= :to', { to })
  const total = await query.getCount()
  if (after) query.andWhere('(event.at < :at OR (event.at = :at AND event.id < :id))', after)
  const events = await query.orderBy('event.at', 'DESC').addOrderBy('event.id', 'DESC').take(limit).getMany()
  return { events, total }
}
