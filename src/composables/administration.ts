import { useInfiniteQuery, useQuery } from '@tanstack/vue-query'
import type { createAccount, updateAccountByAdministrator } from '../../shared/contract/administration.js'
import type { BodySent } from '../../shared/contract/route.js'
import * as api from '../api/administration.js'
import { everyItem } from '../api/pages.js'
import { useChange } from './change.js'
import { queryKeys } from './queryKeys.js'
import { useRefresh } from './refresh.js'

export function useAccounts() {
  return useQuery({
    queryKey: queryKeys.accounts,
    queryFn: ({ signal }) => everyItem((cursor) => api.listAccounts({ cursor, limit: 200 }, signal)),
  })
}

export function useCreateAccount() {
  const refresh = useRefresh()
  return useChange(
    (body: BodySent<typeof createAccount>) => api.createAccount(body),
    () => refresh.administration(),
  )
}

export function useUpdateAccountByAdministrator() {
  const refresh = useRefresh()
  return useChange(
    (input: { personId: string; body: BodySent<typeof updateAccountByAdministrator> }) =>
      api.updateAccountByAdministrator(input.personId, input.body),
    () => refresh.administration(),
  )
}

/** Mail that was written, newest first, a page at a time. */
export function useOutbox() {
  return useInfiniteQuery({
    queryKey: queryKeys.outbox,
    queryFn: ({ pageParam, signal }) => api.listOutbox({ cursor: pageParam, limit: 50 }, signal),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  })
}

export function useHealth() {
  return useQuery({
    queryKey: queryKeys.health,
    queryFn: ({ signal }) => api.readHealth(signal),
    refetchInterval: 30_000,
  })
}
