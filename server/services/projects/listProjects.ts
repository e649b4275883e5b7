import type { Page, PageQuery } from '../../../shared/contract/primitives.js'
import type { Project as ProjectReply } from '../../../shared/contract/projects.js'
import { countsOfProjects, membershipsOf } from '../../database/repositories/projects.js'
import type { Database } from '../../database/transaction.js'
import { presentProject } from '../../presenters/project.js'
import type { Actor } from '../actor.js'
import { cursorAfter, namePosition } from '../cursor.js'
import { restorableSince } from '../deletion.js'

/** The projects that the actor is a member of. */
export async function listProjects(
  { work }: Database,
  actor: Actor,
  query: PageQuery & { include: 'active' | 'archived' | 'deleted' },
): Promise<Page<ProjectReply>> {
  const selection =
    query.include === 'deleted' ? { kind: query.include, since: restorableSince() } : { kind: query.include }
  const after = namePosition(query.cursor)
  const { memberships, total } = await membershipsOf(work, actor.personId, selection, after, query.limit)
  const counts = await countsOfProjects(
    work,
    memberships.map((one) => one.projectId),
  )
  return {
    items: memberships.map(({ project, roles }) => presentProject(project, roles, counts.get(project.id)!)),
    total,
    nextCursor: cursorAfter(memberships, query.limit, ({ project }) => ({ name: project.name, id: project.id })),
  }
}
