import type {
  Activity,
  Invitation as InvitationReply,
  Member,
  Project as ProjectReply,
} from '../../shared/contract/projects.js'
import type { Role } from '../../shared/contract/rights.js'
import type { AuditEvent } from '../database/entities/AuditEvent.js'
import type { Invitation } from '../database/entities/Invitation.js'
import type { Membership } from '../database/entities/Membership.js'
import type { Project } from '../database/entities/Project.js'
import type { ProjectCounts } from '../database/repositories/projects.js'

export function presentProject(project: Project, myRoles: readonly Role[], counts: ProjectCounts): ProjectReply {
  return {
    id: project.id,
    name: project.name,
    description: project.description,
    archived: project.archived,
    deletedAt: project.deletedAt?.toISOString() ?? null,
    version: project.version,
    createdAt: project.createdAt.toISOString(),
    myRoles: [...myRoles],
    deviceCount: counts.deviceCount,
    scanCount: counts.scanCount,
    lastScanAt: counts.lastScanAt?.toISOString() ?? null,
    memberCount: counts.memberCount,
  }
}

/** Needs the relation `user`. */
export function presentMember(membership: Membership): Member {
  const { id, name, email, isAdministrator } = membership.user
  return {
    person: { id, name, email, isAdministrator },
    roles: membership.roles,
    since: membership.since.toISOString(),
  }
}

/** Needs the relation `invitedBy`. */
export function presentInvitation(invitation: Invitation, now = new Date()): InvitationReply {
  return {
    id: invitation.id,
    email: invitation.email,
    roles: invitation.roles,
    invitedBy: { id: invitation.invitedBy.id, name: invitation.invitedBy.name },
    createdAt: invitation.createdAt.toISOString(),
    expiresAt: invitation.expiresAt.toISOString(),
    state: invitation.acceptedAt
      ? 'accepted'
      : invitation.withdrawnAt
        ? 'withdrawn'
        : invitation.expiresAt <= now
          ? 'expired'
          : 'open',
  }
}

export function presentActivity(event: AuditEvent): Activity {
  return {
    id: event.id,
    at: event.at.toISOString(),
    actor: event.actorId && event.actorName ? { id: event.actorId, name: event.actorName } : null,
    action: event.action,
    sentence: event.sentence,
    subject:
      event.subjectKind && event.subjectId
        ? { kind: event.subjectKind, id: event.subjectId, name: event.subjectName ?? '' }
        : null,
  }
}
