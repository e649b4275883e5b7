import * as routes from '../../shared/contract/account.js'
import type { BodySent } from '../../shared/contract/route.js'
import { call } from './http.js'

export const readSession = (signal?: AbortSignal) => call(routes.readSession, { signal })
export const signIn = (body: BodySent<typeof routes.signIn>) => call(routes.signIn, { body })
export const signOut = () => call(routes.signOut)
export const createFirstAdministrator = (body: BodySent<typeof routes.createFirstAdministrator>) =>
  call(routes.createFirstAdministrator, { body })
export const updateAccount = (body: BodySent<typeof routes.updateAccount>) => call(routes.updateAccount, { body })
export const changePassword = (body: BodySent<typeof routes.changePassword>) => call(routes.changePassword, { body })
export const requestPasswordReset = (body: BodySent<typeof routes.requestPasswordReset>) =>
  call(routes.requestPasswordReset, { body })
export const resetPassword = (token: string, body: BodySent<typeof routes.resetPassword>) =>
  call(routes.resetPassword, { params: { token }, body })
export const listSessions = (signal?: AbortSignal) => call(routes.listSessions, { signal })
export const endSession = (sessionId: string) => call(routes.endSession, { params: { sessionId } })
