import { Router, type Request, type Response } from 'express'
import type { PassportStatic } from 'passport'
import * as routes from '../../shared/contract/account.js'
import { ApiError } from '../../shared/contract/errors.js'
import type { MakeRouter } from '../app.js'
import { newCsrfToken } from '../middleware/csrf.js'
import { limitAttempts } from '../middleware/rateLimits.js'
import { createFirstAdministrator } from '../services/accounts/createFirstAdministrator.js'
import { describeSession } from '../services/accounts/describeSession.js'
import { changePassword, endSession, listSessions, updateAccount } from '../services/accounts/ownAccount.js'
import { requestPasswordReset, resetPassword } from '../services/accounts/passwordLinks.js'
import type { Actor } from '../services/actor.js'
import { serve } from './serve.js'

export const accountRouter: MakeRouter = (parts) => {
  const { database, config } = parts
  const router = Router()
  router.post(routes.signIn.path, limitAttempts(config, 'sign-in'))
  router.post(routes.requestPasswordReset.path, limitAttempts(config, 'reset'))
  router.put(routes.resetPassword.path, limitAttempts(config, 'reset'))

  serve(router, routes.readSession, ({ actor, request }) => describe(actor, request))
  serve(router, routes.signIn, async ({ request, response }) => {
    const actor = await authenticate(request, response)
    if (!actor)
      throw new ApiError('SIGN_IN_FAILED', {}, 'The address and password do not match an account that is open.')
    return beginSession(request, actor)
  })
  serve(router, routes.signOut, async ({ request }) => {
    await renew(request)
    return describe(null, request)
  })
  serve(router, routes.createFirstAdministrator, async ({ request, body }) =>
    beginSession(request, await createFirstAdministrator(database, body)),
  )
  serve(router, routes.updateAccount, ({ actor, body }) => updateAccount(database, actor, body.name))
  serve(router, routes.changePassword, async ({ actor, body, request }) => {
    await changePassword(database, actor, request.sessionID, body)
    return beginSession(request, actor)
  })
  serve(router, routes.requestPasswordReset, async ({ body }) => {
    // Not awaited: the answer takes the same time whether or not the address is known.
    requestPasswordReset(parts, body.email).catch((error: unknown) => parts.log.error({ err: error }, 'reset mail'))
    return null
  })
  serve(router, routes.resetPassword, async ({ params, body }) => {
    await resetPassword(parts, params.token, body.newPassword)
    return null
  })
  serve(router, routes.listSessions, async ({ actor, request }) => ({
    items: await listSessions(database, actor, request.sessionID),
  }))
  serve(router, routes.endSession, async ({ actor, params }) => {
    await endSession(database, actor, params.sessionId)
    return null
  })
  return router

  function describe(actor: Actor | null, request: Request) {
    request.session.csrfToken ??= newCsrfToken()
    return describeSession(parts, actor, request.session.csrfToken)
  }

  /** A new session id for every sign-in, so that one planted before is worth nothing. */
  async function beginSession(request: Request, actor: Actor) {
    await renew(request)
    await new Promise<void>((resolve, reject) =>
      request.logIn(actor, { keepSessionInfo: true, session: true }, (error: unknown) =>
        error ? reject(error as Error) : resolve(),
      ),
    )
    return describe(actor, request)
  }
}

function authenticate(request: Request, response: Response): Promise<Actor | false> {
  const passport = request.app.get('authenticator') as PassportStatic
  return new Promise((resolve, reject) => {
    const middleware = passport.authenticate('local', (error: unknown, actor: Actor | false) =>
      error ? reject(error as Error) : resolve(actor),
    ) as (request: Request, response: Response, next: (error?: unknown) => void) => void
    middleware(request, response, (error) => (error ? reject(error as Error) : resolve(false)))
  })
}

function renew(request: Request): Promise<void> {
  const client = request.get('User-Agent') ?? ''
  return new Promise((resolve, reject) =>
    request.session.regenerate((error) => {
      if (error) return reject(error as Error)
      request.session.csrfToken = newCsrfToken()
      request.session.client = client
      resolve()
    }),
  )
}
