import { useInfiniteQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import * as administration from '../api/administration.js'
import * as projects from '../api/projects.js'
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
