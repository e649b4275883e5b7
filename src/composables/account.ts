import { useQuery } from '@tanstack/vue-query'
import * as api from '../api/account.js'
import { useSessionStore } from '../stores/session.js'
import { useChange } from './change.js'
import { queryKeys } from './queryKeys.js'
import { useRefresh } from './refresh.js'

export const useSignIn = () => useChange(useSessionStore().enter)
export const useSignOut = () => useChange<void, void>(useSessionStore().leave)
export const useFirstAdministrator = () => useChange(useSessionStore().enterAsFirst)
export const useRequestPasswordReset = () => useChange(api.requestPasswordReset)

export function useResetPassword() {
  return useChange((input: { token: string; newPassword: string }) =>
    api.resetPassword(input.token, { newPassword: input.newPassword }),
  )
}

export function useUpdateAccount() {
  const session = useSessionStore()
  return useChange(api.updateAccount, (person) => session.rename(person.name))
}

export function useChangePassword() {
  const session = useSessionStore()
  const refresh = useRefresh()
  return useChange(api.changePassword, (next) => {
    session.replace(next)
    return refresh.sessions()
  })
}

export function useActiveSessions() {
  return useQuery({
    queryKey: queryKeys.sessions,
    queryFn: async ({ signal }) => (await api.listSessions(signal)).items,
  })
}

export function useEndSession() {
  const refresh = useRefresh()
  return useChange(api.endSession, () => refresh.sessions())
}
