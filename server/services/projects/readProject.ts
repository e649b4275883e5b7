import type { Project as ProjectReply } from '../../../shared/contract/projects.js'
import { countsOfProjects } from '../../database/repositories/projects.js'
import type { Database, Work } from '../../database/transaction.js'
import { presentProject } from '../../presenters/project.js'
import type { Actor } from '../actor.js'
import { memberOf, requireRight, type Member } from '../rights.js'

export async function readProject({ work }: Database, actor: Actor, projectId: string): Promise<ProjectReply> {
  const member = await memberOf(work, actor, projectId)
  requireRight(member, 'read')
  return presentMembersProject(work, member)
}

/** The project as the member sees it, with what it holds. */
export async function presentMembersProject(work: Work, { project, roles }: Member): Promise<ProjectReply> {
  const counts = await countsOfProjects(work, [project.id])
  return presentProject(project, roles, counts.get(project.id)!)
}
