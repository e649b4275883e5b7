import { Invitation } from '../entities/Invitation.js'
import type { Work } from '../transaction.js'
import type { TimePosition } from './position.js'

export async function addInvitation(work: Work, invitation: Omit<Invitation, 'project' | 'invitedBy'>): Promise<void> {
  await work.insert(Invitation, invitation)
}

export async function noteInvitation(
  work: Work,
  id: string,
  change: Partial<Pick<Invitation, 'acceptedAt' | 'withdrawnAt'>>,
): Promise<void> {
  await work.update(Invitation, { id }, change)
}

export function invitationOfProject(work: Work, projectId: string, id: string): Promise<Invitation | null> {
  return work.findOne(Invitation, { where: { id, projectId }, relations: { invitedBy: true } })
}

/** The invitation of a link with its project and inviter. */
export function invitationByToken(work: Work, tokenHash: string): Promise<Invitation | null> {
  return work.findOne(Invitation, { where: { tokenHash }, relations: { project: true, invitedBy: true } })
}

/** Keeps the invitation from being accepted twice at once. */
export async function lockInvitation(work: Work, id: string): Promise<Invitation | null> {
  return work.findOne(Invitation, { where: { id }, lock: { mode: 'pessimistic_write' } })
}

export async function invitationsNewestFirst(
  work: Work,
  projectId: string,
  after: TimePosition | null,
  limit: number,
): Promise<{ invitations: Invitation[]; total: number }> {
  const query = work
    .createQueryBuilder(Invitation, 'invitation')
    .innerJoinAndSelect('invitation.invitedBy', 'inviter')
    .where('invitation.projectId = :projectId', { projectId })
  const total = await query.getCount()
  if (after)
    query.andWhere('(invitation.createdAt < :at OR (invitation.createdAt = :at AND invitation.id < :id))', after)
  const invitations = await query
    .orderBy('invitation.createdAt', 'DESC')
    .addOrderBy('invitation.id', 'DESC')
    .take(limit)
    .getMany()
  return { invitations, total }
}
