import { Membership } from '../entities/Membership.js'
import type { Work } from '../transaction.js'

/** The person's membership with its project, a deleted project too. */
export function membershipOf(work: Work, projectId: string, userId: string): Promise<Membership | null> {
  return work.findOne(Membership, { where: { projectId, userId }, relations: { project: true } })
}
