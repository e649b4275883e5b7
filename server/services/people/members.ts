import { ApiError } from '../../../shared/contract/errors.js'
import type { Page, PageQuery } from '../../../shared/contract/primitives.js'
import type { Member as MemberReply } from '../../../shared/contract/projects.js'
import type { Role } from '../../../shared/contract/rights.js'
import type { Membership } from '../../database/entities/Membership.js'
import { lockedMemberships, membersOf, removeMembership, saveMembership } from '../../database/repositories/projects.js'
import { userById } from '../../database/repositories/users.js'
import type { Database } from '../../database/transaction.js'
import { presentMember } from '../../presenters/project.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { cursorAfter, namePosition } from '../cursor.js'
import { memberOf, requireMember, requireRight } from '../rights.js'

export async function listMembers(
  { work }: Database,
  actor: Actor,
  projectId: string,
  query: PageQuery,
): Promise<Page<MemberReply>> {
  await requireMember(work, actor, projectId, 'read')
  const { members, total } = await membersOf(work, projectId, namePosition(query.cursor), query.limit)
  return {
    items: members.map(presentMember),
    total,
    nextCursor: cursorAfter(members, query.limit, ({ user }) => ({ name: user.name, id: user.id })),
  }
}

export async function updateMember(
  database: Database,
  actor: Actor,
  projectId: string,
  personId: string,
  roles: Role[],
): Promise<MemberReply> {
  return database.transaction(async (work) => {
    requireRight(await memberOf(work, actor, projectId), 'manage-project')
    const members = await lockedMemberships(work, projectId)
    const membership = requireMembership(members, personId)
    const unique = [...new Set(roles)]
    if (!unique.includes('lead')) requireAnotherLead(members, personId)
    await saveMembership(work, { ...membership, roles: unique })
    const user = (await userById(work, personId))!
    await recordAudit(work, {
      actor,
      projectId,
      action: 'member.changed',
      sentence: `${actor.name} made ${user.name} ${unique.join(' and ')}.`,
      subject: { kind: 'person', id: user.id, name: user.name },
    })
    return presentMember({ ...membership, roles: unique, user })
  })
}

export async function removeMember(
  database: Database,
  actor: Actor,
  projectId: string,
  personId: string,
): Promise<void> {
  await database.transaction(async (work) => {
    requireRight(await memberOf(work, actor, projectId), 'manage-project')
    const members = await lockedMemberships(work, projectId)
    requireMembership(members, personId)
    requireAnotherLead(members, personId)
    await removeMembership(work, projectId, personId)
    const user = (await userById(work, personId))!
    await recordAudit(work, {
      actor,
      projectId,
      action: 'member.removed',
      sentence: `${actor.name} removed ${user.name} from the project.`,
      subject: { kind: 'person', id: user.id, name: user.name },
    })
  })
}

function requireMembership(members: readonly Membership[], personId: string): Membership {
  const membership = members.find((one) => one.userId === personId)
  if (!membership) throw new ApiError('NOT_FOUND', { what: 'member' }, 'This person is not a member of the project.')
  return membership
}

/** A project without a lead could never be managed again. */
function requireAnotherLead(members: readonly Membership[], personId: string): void {
  if (members.some((one) => one.userId !== personId && one.roles.includes('lead'))) return
  throw new ApiError(
    'STATE_CONFLICT',
    { reason: 'last-lead' },
    'This is the only lead of the project. Make somebody else a lead first.',
  )
}
