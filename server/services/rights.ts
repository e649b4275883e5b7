import { ApiError } from '../../shared/contract/errors.js'
import { hasRight, RIGHT_DESCRIPTIONS, type Right, type Role } from '../../shared/contract/rights.js'
import type { Project } from '../database/entities/Project.js'
import { membershipOf } from '../database/repositories/projects.js'
import type { Work } from '../database/transaction.js'
import type { Actor } from './actor.js'

/** A person in a project: what every use case of a project begins with. */
export interface Member {
  actor: Actor
  project: Project
  roles: readonly Role[]
}

/** Rights that still hold in an archived project. */
const IN_ARCHIVE: readonly Right[] = ['read', 'manage-project']

/**
 * The actor as a member of the project. Somebody outside gets NOT_FOUND, as for a project that does not exist; so does
 * everyone for a deleted project, unless `deleted` is asked for.
 */
export async function memberOf(
  work: Work,
  actor: Actor,
  projectId: string,
  options: { deleted?: boolean } = {},
): Promise<Member> {
  const membership = await membershipOf(work, projectId, actor.personId)
  const project = membership?.project
  if (!membership || !project || (project.deletedAt !== null && !options.deleted))
    throw new ApiError('NOT_FOUND', { what: 'project' }, 'There is no such project, or you are not a member of it.')
  return { actor, project, roles: membership.roles }
}

/** Throws RIGHT_MISSING unless one of the member's roles holds the right. */
export function requireRight(member: Member, right: Right): void {
  if (!hasRight(member.roles, right))
    throw new ApiError(
      'RIGHT_MISSING',
      { right },
      `None of your roles in this project may ${RIGHT_DESCRIPTIONS[right]}.`,
    )
  if (member.project.archived && !IN_ARCHIVE.includes(right))
    throw new ApiError(
      'STATE_CONFLICT',
      { reason: 'archived' },
      'The project is archived; take it out of the archive to change anything in it.',
    )
}

/** `memberOf` and `requireRight` in one: how most use cases begin. */
export async function requireMember(work: Work, actor: Actor, projectId: string, right: Right): Promise<Member> {
  const member = await memberOf(work, actor, projectId)
  requireRight(member, right)
  return member
}
