import { useInfiniteQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import * as administration from '../api/administration.js'
import * as projects from '../api/projects.js'
import { useAddressState } from './addressState.js'
import { queryKeys } from './queryKeys.js'

export interface ActivityFilter {
  actorId?: string | undefined
  action?: string | undefined
  from?: string | undefined
  to?: string | undefined
}

/** Who did what in a project, newest first, a page at a time. */
export function useActivity(projectId: MaybeRefOrGetter<string>, filter: MaybeRefOrGetter<ActivityFilter>) {
  return useInfiniteQuery({
    queryKey: computed(() => queryKeys.activity(toValue(projectId), toValue(filter))),
    queryFn: ({ pageParam, signal }) =>
      projects.listActivity(toValue(projectId), { ...toValue(filter), cursor: pageParam, limit: 50 }, signal),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  })
}

/** The audit trail of the site, for administrators. */
export function useAuditTrail(filter: MaybeRefOrGetter<ActivityFilter>) {
  return useInfiniteQuery({
    queryKey: computed(() => queryKeys.audit(toValue(filter))),
    queryFn: ({ pageParam, signal }) =>
      administration.listAuditEvents({ ...toValue(filter), cursor: pageParam, limit: 50 }, signal),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  })
}

/** The filter of an activity list, kept in the address; days are those of the reader's zone. */
export function useActivityFilter() {
  const actor = useAddressState('who')
  const action = useAddressState('what')
  const from = useAddressState('from')
  const to = useAddressState('to')
  const filter = computed<ActivityFilter>(() => ({
    actorId: actor.value || undefined,
    action: action.value || undefined,
    from: startOfDay(from.value, 0),
    to: startOfDay(to.value, 1),
  }))
  return { actor, action, from, to, filter }
}

function startOfDay(day: string, later: number): string | undefined {
  const parts = /^(\d{4})-(\d{2})-(\d{2})$/.exec(day)
  if (!parts) return undefined
  return new Date(Number(parts[1]), Number(parts[2]) - 1, Number(parts[3]) + later).toISOString()
}
