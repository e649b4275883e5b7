import { Router } from 'express'
import * as routes from '../../shared/contract/administration.js'
import type { MakeRouter } from '../app.js'
import { createAccount, listAccounts, updateAccount } from '../services/administration/accounts.js'
import { listOutbox, readHealth } from '../services/administration/site.js'
import { listAuditEvents } from '../services/projects/listActivity.js'
import { serve } from './serve.js'

export const administrationRouter: MakeRouter = (parts) => {
  const { database } = parts
  const router = Router()
  serve(router, routes.listAccounts, ({ actor, query }) => listAccounts(database, actor, query))
  serve(router, routes.createAccount, ({ actor, body }) => createAccount(parts, actor, body))
  serve(router, routes.updateAccountByAdministrator, ({ actor, params, body }) =>
    updateAccount(database, actor, params.personId, body),
  )
  serve(router, routes.listOutbox, ({ actor, query }) => listOutbox(database, actor, query))
  serve(router, routes.readHealth, ({ actor }) => readHealth(parts, actor))
  serve(router, routes.listAuditEvents, ({ actor, query }) => listAuditEvents(database, actor, query))
  return router
}
