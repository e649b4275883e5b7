import { v7 as uuid } from 'uuid'
import type { Project as ProjectReply } from '../../../shared/contract/projects.js'
import type { Role } from '../../../shared/contract/rights.js'
import { addProject, saveMembership } from '../../database/repositories/projects.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { readProject } from './readProject.js'

/** In a small laboratory who makes a project measures and designs as well. */
const MAKERS_ROLES: Role[] = ['lead', 'designer', 'experimentalist']

export async function createProject(
  database: Database,
  actor: Actor,
  input: { name: string; description: string },
): Promise<ProjectReply> {
  const id = uuid()
  await database.transaction(async (work) => {
    const now = new Date()
    await addProject(work, { id, ...input, archived: false, version: 1, createdAt: now, deletedAt: null })
    await saveMembership(work, { projectId: id, userId: actor.personId, roles: MAKERS_ROLES, since: now })
    await recordAudit(work, {
      actor,
      projectId: id,
      action: 'project.created',
      sentence: `${actor.name} made the project ${input.name}.`,
      subject: { kind: 'project', id, name: input.name },
    })
  })
  return readProject(database, actor, id)
}
