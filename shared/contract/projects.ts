import { z } from 'zod'
import { Person } from './account.js'
import {
  EmailAddress,
  Id,
  LongText,
  Name,
  NewPassword,
  Nothing,
  PageQuery,
  PersonReference,
  Timestamp,
  Version,
  pageOf,
} from './primitives.js'
import { Role } from './rights.js'
import { defineRoute } from './route.js'

export const ProjectParams = z.object({ projectId: Id })

export const Project = z
  .object({
    id: Id,
    name: z.string(),
    description: z.string(),
    archived: z.boolean(),
    deletedAt: Timestamp.nullable(),
    version: Version,
    createdAt: Timestamp,
    myRoles: z.array(Role),
    deviceCount: z.int(),
    scanCount: z.int(),
    lastScanAt: Timestamp.nullable(),
    memberCount: z.int(),
  })
  .meta({ id: 'Project' })
export type Project = z.infer<typeof Project>

export const Member = z.object({ person: Person, roles: z.array(Role), since: Timestamp }).meta({ id: 'Member' })
export type Member = z.infer<typeof Member>

export const Invitation = z
  .object({
    id: Id,
    email: z.string(),
    roles: z.array(Role),
    invitedBy: PersonReference,
    createdAt: Timestamp,
    expiresAt: Timestamp,
    state: z.enum(['open', 'accepted', 'withdrawn', 'expired']),
  })
  .meta({ id: 'Invitation' })
export type Invitation = z.infer<typeof Invitation>

export const InvitationView = z
  .object({
    projectName: z.string(),
    invitedBy: z.string(),
    email: z.string(),
    roles: z.array(Role),
    accountExists: z.boolean(),
    expiresAt: Timestamp,
  })
  .meta({ id: 'InvitationView' })
export type InvitationView = z.infer<typeof InvitationView>

export const Activity = z
  .object({
    id: Id,
    at: Timestamp,
    actor: PersonReference.nullable(),
    action: z.string().meta({ description: 'Plain dotted name, for example scan.accepted' }),
    sentence: z.string(),
    subject: z.object({ kind: z.string(), id: z.string(), name: z.string() }).nullable(),
  })
  .meta({ id: 'Activity' })
export type Activity = z.infer<typeof Activity>

/** Filters of the activity list and of the audit trail. */
export const ActivityQuery = PageQuery.extend({
  actorId: Id.optional(),
  action: z.string().max(80).optional(),
  from: Timestamp.optional(),
  to: Timestamp.optional(),
})

const roles = z.array(Role).min(1, 'Choose at least one role.').max(4)
const group = 'Projects'
const people = 'People'

export const listProjects = defineRoute({
  id: 'listProjects',
  method: 'get',
  path: '/api/projects',
  group,
  summary: 'The projects one is a member of',
  access: 'signed-in',
  query: PageQuery.extend({ include: z.enum(['active', 'archived', 'deleted']).default('active') }),
  reply: pageOf(Project),
})

export const createProject = defineRoute({
  id: 'createProject',
  method: 'post',
  path: '/api/projects',
  group,
  summary: 'Make a project; its maker becomes lead, designer and experimentalist',
  access: 'signed-in',
  body: z.strictObject({ name: Name, description: LongText.default('') }),
  reply: Project,
  status: 201,
})

export const readProject = defineRoute({
  id: 'readProject',
  method: 'get',
  path: '/api/projects/:projectId',
  group,
  summary: 'One project',
  access: { right: 'read' },
  params: ProjectParams,
  reply: Project,
})

export const updateProject = defineRoute({
  id: 'updateProject',
  method: 'patch',
  path: '/api/projects/:projectId',
  group,
  summary: 'Rename, describe, archive or take out of the archive',
  access: { right: 'manage-project' },
  params: ProjectParams,
  body: z.strictObject({
    version: Version,
    name: Name.optional(),
    description: LongText.optional(),
    archived: z.boolean().optional(),
  }),
  reply: Project,
})

export const deleteProject = defineRoute({
  id: 'deleteProject',
  method: 'delete',
  path: '/api/projects/:projectId',
  group,
  summary: 'Delete a project; it can be restored for thirty days',
  access: { right: 'manage-project' },
  params: ProjectParams,
  reply: Project,
})

export const restoreProject = defineRoute({
  id: 'restoreProject',
  method: 'post',
  path: '/api/projects/:projectId/restoration',
  group,
  summary: 'Bring a deleted project back',
  access: { right: 'manage-project' },
  params: ProjectParams,
  reply: Project,
})

export const listMembers = defineRoute({
  id: 'listMembers',
  method: 'get',
  path: '/api/projects/:projectId/members',
  group: people,
  summary: 'The members and their roles',
  access: { right: 'read' },
  params: ProjectParams,
  query: PageQuery,
  reply: pageOf(Member),
})

export const updateMember = defineRoute({
  id: 'updateMember',
  method: 'put',
  path: '/api/projects/:projectId/members/:personId',
  group: people,
  summary: 'Change a member’s roles; a project keeps at least one lead',
  access: { right: 'manage-project' },
  params: ProjectParams.extend({ personId: Id }),
  body: z.strictObject({ roles }),
  reply: Member,
})

export const removeMember = defineRoute({
  id: 'removeMember',
  method: 'delete',
  path: '/api/projects/:projectId/members/:personId',
  group: people,
  summary: 'Remove a member; what they did stays under their name',
  access: { right: 'manage-project' },
  params: ProjectParams.extend({ personId: Id }),
  reply: Nothing,
})

export const listInvitations = defineRoute({
  id: 'listInvitations',
  method: 'get',
  path: '/api/projects/:projectId/invitations',
  group: people,
  summary: 'Invitations and what became of them',
  access: { right: 'manage-project' },
  params: ProjectParams,
  query: PageQuery,
  reply: pageOf(Invitation),
})

export const createInvitation = defineRoute({
  id: 'createInvitation',
  method: 'post',
  path: '/api/projects/:projectId/invitations',
  group: people,
  summary: 'Invite a person by mail',
  access: { right: 'manage-project' },
  params: ProjectParams,
  body: z.strictObject({ email: EmailAddress, roles }),
  reply: Invitation,
  status: 201,
})

export const withdrawInvitation = defineRoute({
  id: 'withdrawInvitation',
  method: 'delete',
  path: '/api/projects/:projectId/invitations/:invitationId',
  group: people,
  summary: 'Withdraw an open invitation',
  access: { right: 'manage-project' },
  params: ProjectParams.extend({ invitationId: Id }),
  reply: Invitation,
})

const InvitationToken = z.object({ token: z.string().min(20).max(200) })

export const readInvitation = defineRoute({
  id: 'readInvitation',
  method: 'get',
  path: '/api/invitations/:token',
  group: people,
  summary: 'What an invitation link offers',
  access: 'public',
  params: InvitationToken,
  reply: InvitationView,
})

export const acceptInvitation = defineRoute({
  id: 'acceptInvitation',
  method: 'post',
  path: '/api/invitations/:token/acceptance',
  group: people,
  summary: 'Accept: a new person gives name and password, a known one the password',
  access: 'public',
  params: InvitationToken,
  body: z.strictObject({ name: Name.optional(), password: z.string().min(1).max(200) }),
  reply: z.object({ projectId: Id }),
})

/** The rule for the password of a person who is new; `acceptInvitation` applies it when no account exists. */
export const InvitationPassword = NewPassword

export const listActivity = defineRoute({
  id: 'listActivity',
  method: 'get',
  path: '/api/projects/:projectId/activity',
  group,
  summary: 'Who did what in the project, newest first',
  access: { right: 'read' },
  params: ProjectParams,
  query: ActivityQuery,
  reply: pageOf(Activity),
})
