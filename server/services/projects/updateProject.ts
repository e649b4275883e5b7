import { ApiError } from '../../../shared/contract/errors.js'
import type { Project as ProjectReply } from '../../../shared/contract/projects.js'
import { lockedProject, saveProject } from '../../database/repositories/projects.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { restorableSince } from '../deletion.js'
import { memberOf, requireRight, type Member } from '../rights.js'
import { requireCurrentVersion } from '../staleVersion.js'
import { presentMembersProject } from './readProject.js'

export interface ProjectChange {
  version: number
  name?: string | undefined
  description?: string | undefined
  archived?: boolean | undefined
}

/** Renames, describes, archives or takes out of the archive. */
export async function updateProject(
  database: Database,
  actor: Actor,
  projectId: string,
  change: ProjectChange,
): Promise<ProjectReply> {
  return database.transaction(async (work) => {
    const member = await memberOf(work, actor, projectId)
    requireRight(member, 'manage-project')
    const project = (await lockedProject(work, projectId))!
    requireCurrentVersion(change.version, await presentMembersProject(work, { ...member, project }), 'the project')
    const changed = {
      ...project,
      name: change.name ?? project.name,
      description: change.description ?? project.description,
      archived: change.archived ?? project.archived,
      version: project.version + 1,
    }
    await saveProject(work, changed)
    await recordAudit(work, {
      actor,
      projectId,
      ...wordsFor(actor, project, changed),
      subject: { kind: 'project', id: projectId, name: changed.name },
    })
    return presentMembersProject(work, { ...member, project: changed })
  })
}

/** Restorable for thirty days. */
export async function deleteProject(database: Database, actor: Actor, projectId: string): Promise<ProjectReply> {
  return setDeletion(database, actor, projectId, { deleted: false }, () => new Date())
}

export async function restoreProject(database: Database, actor: Actor, projectId: string): Promise<ProjectReply> {
  return setDeletion(database, actor, projectId, { deleted: true }, ({ project }) => {
    if (!project.deletedAt)
      throw new ApiError('STATE_CONFLICT', { reason: 'not-deleted' }, 'The project is not deleted.')
    if (project.deletedAt <= restorableSince())
      throw new ApiError('NOT_FOUND', { what: 'project' }, 'The project was deleted more than thirty days ago.')
    return null
  })
}

async function setDeletion(
  database: Database,
  actor: Actor,
  projectId: string,
  find: { deleted: boolean },
  deletion: (member: Member) => Date | null,
): Promise<ProjectReply> {
  return database.transaction(async (work) => {
    const member = await memberOf(work, actor, projectId, find)
    requireRight(member, 'manage-project')
    const deletedAt = deletion(member)
    const project = { ...(await lockedProject(work, projectId))!, deletedAt }
    await saveProject(work, project)
    await recordAudit(work, {
      actor,
      projectId,
      action: deletedAt ? 'project.deleted' : 'project.restored',
      sentence: `${actor.name} ${deletedAt ? 'deleted' : 'restored'} the project ${project.name}.`,
      subject: { kind: 'project', id: projectId, name: project.name },
    })
    return presentMembersProject(work, { ...member, project })
  })
}

function wordsFor(
  actor: Actor,
  before: { name: string; archived: boolean },
  after: { name: string; archived: boolean },
): { action: string; sentence: string } {
  if (before.archived !== after.archived)
    return after.archived
      ? { action: 'project.archived', sentence: `${actor.name} archived the project ${after.name}.` }
      : { action: 'project.reopened', sentence: `${actor.name} took the project ${after.name} out of the archive.` }
  if (before.name !== after.name)
    return { action: 'project.renamed', sentence: `${actor.name} renamed the project ${before.name} to ${after.name}.` }
  return { action: 'project.described', sentence: `${actor.name} changed the description of ${after.name}.` }
}
