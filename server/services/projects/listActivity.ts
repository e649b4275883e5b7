import type { Page } from '../../../shared/contract/primitives.js'
import type { Activity, ActivityQuery } from '../../../shared/contract/projects.js'
import type { z } from 'zod'
import { auditEventsNewestFirst } from '../../database/repositories/auditEvents.js'
import type { Database, Work } from '../../database/transaction.js'
import { presentActivity } from '../../presenters/project.js'
import type { Actor } from '../actor.js'
import { requireAdministrator } from '../actor.js'
import { cursorAfter, timePosition } from '../cursor.js'
import { requireMember } from '../rights.js'

type Filters = z.output<typeof ActivityQuery>

/** Who did what in a project. */
export async function listActivity(
  { work }: Database,
  actor: Actor,
  projectId: string,
  query: Filters,
): Promise<Page<Activity>> {
  await requireMember(work, actor, projectId, 'read')
  return pageOfEvents(work, query, projectId)
}

/** The audit trail of the whole site. */
export async function listAuditEvents({ work }: Database, actor: Actor, query: Filters): Promise<Page<Activity>> {
  requireAdministrator(actor)
  return pageOfEvents(work, query, null)
}

async function pageOfEvents(work: Work, query: Filters, projectId: string | null): Promise<Page<Activity>> {
  const filters = {
    projectId,
    actorId: query.actorId ?? null,
    action: query.action ?? null,
    from: query.from ? new Date(query.from) : null,
    to: query.to ? new Date(query.to) : null,
  }
  const { events, total } = await auditEventsNewestFirst(work, filters, timePosition(query.cursor), query.limit)
  return {
    items: events.map(presentActivity),
    total,
    nextCursor: cursorAfter(events, query.limit, ({ at, id }) => ({ at, id })),
  }
}
