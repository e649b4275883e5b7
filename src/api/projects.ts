import * as routes from '../../shared/contract/projects.js'
import type { BodySent, QuerySent } from '../../shared/contract/route.js'
import { call } from './http.js'

export const listProjects = (query: QuerySent<typeof routes.listProjects>, signal?: AbortSignal) =>
  call(routes.listProjects, { query, signal })
export const createProject = (body: BodySent<typeof routes.createProject>) => call(routes.createProject, { body })
export const readProject = (projectId: string, signal?: AbortSignal) =>
  call(routes.readProject, { params: { projectId }, signal })
export const updateProject = (projectId: string, body: BodySent<typeof routes.updateProject>) =>
  call(routes.updateProject, { params: { projectId }, body })
export const deleteProject = (projectId: string) => call(routes.deleteProject, { params: { projectId } })
export const restoreProject = (projectId: string) => call(routes.restoreProject, { params: { projectId } })

export const listMembers = (projectId: string, query: QuerySent<typeof routes.listMembers>, signal?: AbortSignal) =>
  call(routes.listMembers, { params: { projectId }, query, signal })
export const updateMember = (projectId: string, personId: string, body: BodySent<typeof routes.updateMember>) =>
  call(routes.updateMember, { params: { projectId, personId }, body })
export const removeMember = (projectId: string, personId: string) =>
  call(routes.removeMember, { params: { projectId, personId } })

export const listInvitations = (
  projectId: string,
  query: QuerySent<typeof routes.listInvitations>,
  signal?: AbortSignal,
) => call(routes.listInvitations, { params: { projectId }, query, signal })
export const createInvitation = (projectId: string, body: BodySent<typeof routes.createInvitation>) =>
  call(routes.createInvitation, { params: { projectId }, body })
export const withdrawInvitation = (projectId: string, invitationId: string) =>
  call(routes.withdrawInvitation, { params: { projectId, invitationId } })
export const readInvitation = (token: string, signal?: AbortSignal) =>
  call(routes.readInvitation, { params: { token }, signal })
export const acceptInvitation = (token: string, body: BodySent<typeof routes.acceptInvitation>) =>
  call(routes.acceptInvitation, { params: { token }, body })

export const listActivity = (projectId: string, query: QuerySent<typeof routes.listActivity>, signal?: AbortSignal) =>
  call(routes.listActivity, { params: { projectId }, query, signal })
