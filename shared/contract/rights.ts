import { z } from 'zod'

/** Roles in a project; a person holds one or more and has the union of their rights. */
export const ROLES = ['lead', 'designer', 'experimentalist', 'collaborator'] as const
export const Role = z.enum(ROLES).meta({ id: 'Role' })
export type Role = z.infer<typeof Role>

/** What a member may do, and which roles may. Enforced in the services, shown in the client, tested route by role. */
export const RIGHTS = {
  read: ['lead', 'designer', 'experimentalist', 'collaborator'],
  comment: ['lead', 'designer', 'experimentalist', 'collaborator'],
  'resolve-any-thread': ['lead', 'designer', 'experimentalist'],
  'edit-devices': ['lead', 'designer', 'experimentalist'],
  'edit-scans': ['lead', 'experimentalist'],
  'run-analyses': ['lead', 'designer'],
  'write-reports': ['lead', 'designer', 'experimentalist'],
  'decide-reports': ['lead'],
  'edit-library': ['lead', 'designer', 'experimentalist'],
  'manage-project': ['lead'],
} as const satisfies Record<string, readonly Role[]>
export type Right = keyof typeof RIGHTS

export const RIGHT_DESCRIPTIONS: Record<Right, string> = {
  read: 'read the project, export what is readable',
  comment: 'comment; resolve own threads',
  'resolve-any-thread': 'resolve any thread',
  'edit-devices': 'add and edit devices and stacks',
  'edit-scans': 'upload scans, edit conditions, accept or exclude scans',
  'run-analyses': 'run analyses, save and edit scenarios',
  'write-reports': 'write and submit reports',
  'decide-reports': "approve or return a report, never one's own",
  'edit-library': 'spectra, light sources, materials of the project',
  'manage-project': 'invite, change roles, archive, delete',
}

export function rightsOf(roles: readonly Role[]): Right[] {
  return (Object.keys(RIGHTS) as Right[]).filter((right) => hasRight(roles, right))
}

export function hasRight(roles: readonly Role[], right: Right): boolean {
  const allowed: readonly Role[] = RIGHTS[right]
  return roles.some((role) => allowed.includes(role))
}
