import type { Express, RequestHandler } from 'express'
import expressSession from 'express-session'
import passport from 'passport'
import { Strategy as LocalStrategy } from 'passport-local'
import type { Config } from '../config.js'
import type { Database } from '../database/transaction.js'
import { actorById, actorBySignIn } from '../services/accounts/signIn.js'
import type { Actor } from '../services/actor.js'
import { newCsrfToken } from './csrf.js'
import { DatabaseSessionStore } from './sessionStore.js'

const LIFETIME_MS = 7 * 86_400_000

/** Cookie, session and person of every request. */
export function useSessions(app: Express, config: Config, database: Database): void {
  const authenticator = new passport.Passport()
  authenticator.use(
    new LocalStrategy({ usernameField: 'email' }, (email, password, done) => {
      actorBySignIn(database, email, password).then((actor) => done(null, actor ?? false), done)
    }),
  )
  authenticator.serializeUser((actor, done) => done(null, (actor as Actor).personId))
  authenticator.deserializeUser((id: string, done) => {
    actorById(database, id).then((actor) => done(null, actor), done)
  })
  app.use(
    expressSession({
      name: 'tierlight.session',
      secret: config.sessionSecret,
      store: new DatabaseSessionStore(database),
      resave: false,
      saveUninitialized: false,
      rolling: true,
      cookie: { httpOnly: true, sameSite: 'lax', secure: config.secureCookie, maxAge: LIFETIME_MS },
    }),
  )
  app.use(authenticator.session())
  app.set('authenticator', authenticator)
  app.use(rememberClient)
}

/** Gives each session its token for changes and notes which browser it belongs to. */
const rememberClient: RequestHandler = (request, _response, next) => {
  if (request.path === '/api/session') {
    request.session.csrfToken ??= newCsrfToken()
    request.session.client ??= request.get('User-Agent') ?? ''
  }
  next()
}
