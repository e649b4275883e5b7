import * as routes from '../../shared/contract/administration.js'
import type { BodySent, QuerySent } from '../../shared/contract/route.js'
import { call } from './http.js'

export const listAccounts = (query: QuerySent<typeof routes.listAccounts>, signal?: AbortSignal) =>
  call(routes.listAccounts, { query, signal })
export const createAccount = (body: BodySent<typeof routes.createAccount>) => call(routes.createAccount, { body })
export const updateAccountByAdministrator = (
  personId: string,
  body: BodySent<typeof routes.updateAccountByAdministrator>,
) => call(routes.updateAccountByAdministrator, { params: { personId }, body })
export const listOutbox = (query: QuerySent<typeof routes.listOutbox>, signal?: AbortSignal) =>
  call(routes.listOutbox, { query, signal })
export const readHealth = (signal?: AbortSignal) => call(routes.readHealth, { signal })
export const listAuditEvents = (query: QuerySent<typeof routes.listAuditEvents>, signal?: AbortSignal) =>
  call(routes.listAuditEvents, { query, signal })
