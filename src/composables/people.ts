import { useQuery, useQueryClient } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import type { Role } from '../../shared/contract/rights.js'
import type { acceptInvitation, createInvitation } from '../../shared/contract/projects.js'
import type { BodySent } from '../../shared/contract/route.js'
import { everyItem } from '../api/pages.js'
import * as api from '../api/projects.js'
import { useSessionStore } from '../stores/session.js'
import { useChange } from './change.js'
import { queryKeys } from './queryKeys.js'
import { useRefresh } from './refresh.js'

export function useMembers(projectId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => queryKeys.members(toValue(projectId))),
    queryFn: ({ signal }) => everyItem((cursor) => api.listMembers(toValue(projectId), { cursor, limit: 200 }, signal)),
  })
}

/** Invitations and what became of them; only those who manage the project may read them. */
export function useInvitations(projectId: MaybeRefOrGetter<string>, enabled: MaybeRefOrGetter<boolean> = true) {
  return useQuery({
    queryKey: computed(() => queryKeys.invitations(toValue(projectId))),
    queryFn: ({ signal }) =>
      everyItem((cursor) => api.listInvitations(toValue(projectId), { cursor, limit: 200 }, signal)),
    enabled: () => toValue(enabled),
  })
}

export function useUpdateMember(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (input: { personId: string; roles: Role[] }) =>
      api.updateMember(toValue(projectId), input.personId, { roles: input.roles }),
    () => refresh.project(toValue(projectId)),
  )
}

export function useRemoveMember(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (personId: string) => api.removeMember(toValue(projectId), personId),
    () => refresh.project(toValue(projectId)),
  )
}

export function useCreateInvitation(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (body: BodySent<typeof createInvitation>) => api.createInvitation(toValue(projectId), body),
    () => refresh.project(toValue(projectId)),
  )
}

export function useWithdrawInvitation(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (invitationId: string) => api.withdrawInvitation(toValue(projectId), invitationId),
    () => refresh.project(toValue(projectId)),
  )
}

/** What an invitation link offers. */
export function useInvitationLink(token: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => queryKeys.invitationLink(toValue(token))),
    queryFn: ({ signal }) => api.readInvitation(toValue(token), signal),
    staleTime: Infinity,
  })
}

/** Accepts, then signs in with the same password, so that the project opens at once; nothing read as someone else stays. */
export function useAcceptInvitation(token: MaybeRefOrGetter<string>) {
  const client = useQueryClient()
  const session = useSessionStore()
  return useChange(async ({ email, ...body }: { email: string } & BodySent<typeof acceptInvitation>) => {
    const reply = await api.acceptInvitation(toValue(token), body)
    await session.enter({ email, password: body.password })
    client.removeQueries()
    return reply
  })
}
