import { v7 as uuid } from 'uuid'
import { ApiError } from '../../../shared/contract/errors.js'
import type { Page, PageQuery } from '../../../shared/contract/primitives.js'
import type { Invitation as InvitationReply } from '../../../shared/contract/projects.js'
import type { Role } from '../../../shared/contract/rights.js'
import {
  addInvitation,
  invitationOfProject,
  invitationsNewestFirst,
  noteInvitation,
} from '../../database/repositories/invitations.js'
import { membershipOf } from '../../database/repositories/projects.js'
import { userByEmail } from '../../database/repositories/users.js'
import type { Database } from '../../database/transaction.js'
import { invitationMessage } from '../../mail/messages.js'
import { writeMail } from '../../mail/outbox.js'
import { presentInvitation } from '../../presenters/project.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import type { Context } from '../context.js'
import { cursorAfter, timePosition } from '../cursor.js'
import { memberOf, requireMember, requireRight } from '../rights.js'
import { newToken } from '../tokens.js'

const VALID_DAYS = 14

export async function createInvitation(
  { database, config }: Context,
  actor: Actor,
  projectId: string,
  input: { email: string; roles: Role[] },
): Promise<InvitationReply> {
  return database.transaction(async (work) => {
    const member = await memberOf(work, actor, projectId)
    requireRight(member, 'manage-project')
    const user = await userByEmail(work, input.email)
    if (user && (await membershipOf(work, projectId, user.id)))
      throw new ApiError(
        'ALREADY_EXISTS',
        { what: 'member', field: 'email', value: input.email },
        `${user.name} is a member of this project already.`,
      )
    const { token, tokenHash } = newToken()
    const createdAt = new Date()
    const roles = [...new Set(input.roles)]
    const id = uuid()
    await addInvitation(work, {
      id,
      projectId,
      email: input.email,
      roles,
      tokenHash,
      invitedById: actor.personId,
      createdAt,
      expiresAt: new Date(createdAt.getTime() + VALID_DAYS * 86_400_000),
      acceptedAt: null,
      withdrawnAt: null,
    })
    await writeMail(
      work,
      config,
      invitationMessage({
        recipient: input.email,
        inviter: actor.name,
        projectName: member.project.name,
        roles,
        link: `${config.publicUrl}/invitations/${token}`,
        validDays: VALID_DAYS,
      }),
    )
    await recordAudit(work, {
      actor,
      projectId,
      action: 'member.invited',
      sentence: `${actor.name} invited ${input.email} as ${roles.join(' and ')}.`,
      subject: { kind: 'invitation', id, name: input.email },
    })
    return presentInvitation((await invitationOfProject(work, projectId, id))!)
  })
}

export async function listInvitations(
  { work }: Database,
  actor: Actor,
  projectId: string,
  query: PageQuery,
): Promise<Page<InvitationReply>> {
  await requireMember(work, actor, projectId, 'manage-project')
  const after = timePosition(query.cursor)
  const { invitations, total } = await invitationsNewestFirst(work, projectId, after, query.limit)
  return {
    items: invitations.map((one) => presentInvitation(one)),
    total,
    nextCursor: cursorAfter(invitations, query.limit, ({ createdAt, id }) => ({ at: createdAt, id })),
  }
}

export async function withdrawInvitation(
  database: Database,
  actor: Actor,
  projectId: string,
  invitationId: string,
): Promise<InvitationReply> {
  return database.transaction(async (work) => {
    requireRight(await memberOf(work, actor, projectId), 'manage-project')
    const invitation = await invitationOfProject(work, projectId, invitationId)
    if (!invitation) throw new ApiError('NOT_FOUND', { what: 'invitation' }, 'There is no such invitation.')
    const { state } = presentInvitation(invitation)
    if (state !== 'open')
      throw new ApiError('STATE_CONFLICT', { reason: state }, `The invitation cannot be withdrawn: it is ${state}.`)
    const withdrawnAt = new Date()
    await noteInvitation(work, invitation.id, { withdrawnAt })
    await recordAudit(work, {
      actor,
      projectId,
      action: 'member.invitation-withdrawn',
      sentence: `${actor.name} withdrew the invitation of ${invitation.email}.`,
      subject: { kind: 'invitation', id: invitation.id, name: invitation.email },
    })
    return presentInvitation({ ...invitation, withdrawnAt })
  })
}
