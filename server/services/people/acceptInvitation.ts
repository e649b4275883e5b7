import { v7 as uuid } from 'uuid'
import { ApiError } from '../../../shared/contract/errors.js'
import { InvitationPassword, type InvitationView } from '../../../shared/contract/projects.js'
import type { Invitation } from '../../database/entities/Invitation.js'
import type { User } from '../../database/entities/User.js'
import { invitationByToken, lockInvitation, noteInvitation } from '../../database/repositories/invitations.js'
import { membershipOf, saveMembership } from '../../database/repositories/projects.js'
import { addUser, userByEmail } from '../../database/repositories/users.js'
import type { Database, Work } from '../../database/transaction.js'
import { presentInvitation } from '../../presenters/project.js'
import { actorOf } from '../accounts/signIn.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { hashPassword, isPassword } from '../passwords.js'
import { hashToken } from '../tokens.js'

/** What the link of an invitation offers. */
export async function readInvitation({ work }: Database, token: string): Promise<InvitationView> {
  const invitation = await requireOpen(work, token)
  return {
    projectName: invitation.project.name,
    invitedBy: invitation.invitedBy.name,
    email: invitation.email,
    roles: invitation.roles,
    accountExists: (await userByEmail(work, invitation.email)) !== null,
    expiresAt: invitation.expiresAt.toISOString(),
  }
}

/** Joins the project: a new person gets an account, a known one proves who they are by the password. */
export async function acceptInvitation(
  database: Database,
  token: string,
  input: { name?: string | undefined; password: string },
): Promise<{ projectId: string; actor: Actor }> {
  return database.transaction(async (work) => {
    const { id } = await requireOpen(work, token)
    await lockInvitation(work, id)
    const invitation = await requireOpen(work, token)
    const user = await personFor(work, invitation, input)
    const { projectId } = invitation
    const before = await membershipOf(work, projectId, user.id)
    await saveMembership(work, {
      projectId,
      userId: user.id,
      roles: [...new Set([...(before?.roles ?? []), ...invitation.roles])],
      since: before?.since ?? new Date(),
    })
    await noteInvitation(work, invitation.id, { acceptedAt: new Date() })
    const actor = actorOf(user)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'member.joined',
      sentence: `${user.name} joined the project as ${invitation.roles.join(' and ')}.`,
      subject: { kind: 'person', id: user.id, name: user.name },
    })
    return { projectId, actor }
  })
}

async function requireOpen(work: Work, token: string): Promise<Invitation> {
  const invitation = await invitationByToken(work, hashToken(token))
  if (!invitation || invitation.project.deletedAt)
    throw new ApiError('NOT_FOUND', { what: 'invitation' }, 'There is no such invitation.')
  const { state } = presentInvitation(invitation)
  if (state !== 'open')
    throw new ApiError(
      'LINK_EXPIRED',
      { what: 'invitation' },
      `This invitation is ${state}. Ask ${invitation.invitedBy.name} for a new one.`,
    )
  return invitation
}

async function personFor(
  work: Work,
  invitation: Invitation,
  input: { name?: string | undefined; password: string },
): Promise<User> {
  const known = await userByEmail(work, invitation.email)
  if (known) {
    if (known.disabled || !(await isPassword(known.passwordHash, input.password)))
      throw new ApiError('PASSWORD_WRONG', {}, 'This is not the password of your account.')
    return known
  }
  const password = InvitationPassword.safeParse(input.password)
  const errors = [
    ...(input.name ? [] : [{ path: ['name'], message: 'Say what you are called.' }]),
    ...(password.success ? [] : [{ path: ['password'], message: password.error.issues[0]!.message }]),
  ]
  if (errors.length > 0) throw new ApiError('INPUT_INVALID', { errors }, errors.map((error) => error.message).join(' '))
  const user = {
    id: uuid(),
    name: input.name!,
    email: invitation.email,
    passwordHash: await hashPassword(input.password),
    isAdministrator: false,
    disabled: false,
    createdAt: new Date(),
    lastSignInAt: null,
  }
  await addUser(work, user)
  return user
}
