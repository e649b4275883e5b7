import express, { type Express, type Router } from 'express'
import helmet from 'helmet'
import { existsSync } from 'node:fs'
import type { Logger } from 'pino'
import { pinoHttp } from 'pino-http'
import type { Config } from './config.js'
import type { Database } from './database/transaction.js'
import { csrfProtection } from './middleware/csrf.js'
import { problems, unknownRoute } from './middleware/errors.js'
import { useSessions } from './middleware/session.js'
import { ROUTERS } from './routes/index.js'

/** What routes are built from. */
export interface Parts {
  config: Config
  database: Database
  log: Logger
}

export interface AppOptions extends Parts {
  /** Folder of the built client; none while Vite serves it in development. */
  clientFolder: string | null
  /** Parse every reply by the contract, as tests do. */
  checkReplies?: boolean
}

const JSON_LIMIT = '2mb'

/** The whole order of a request on one page: log, headers, body, session, token, routes, page, errors. */
export function buildApp({ config, database, log, clientFolder, checkReplies = false }: AppOptions): Express {
  const app = express()
  app.disable('x-powered-by')
  app.set('trust proxy', config.trustProxy)
  app.set('check replies', checkReplies)
  app.use(pinoHttp({ logger: log, autoLogging: { ignore: (request) => !request.url?.startsWith('/api/') } }))
  app.use(
    helmet({
      contentSecurityPolicy: {
        useDefaults: true,
        directives: {
          'script-src': ["'self'"],
          'style-src': ["'self'", "'unsafe-inline'"],
          'img-src': ["'self'", 'data:', 'blob:'],
          'font-src': ["'self'"],
          'worker-src': ["'self'"],
          'connect-src': ["'self'"],
          'upgrade-insecure-requests': config.secureCookie ? [] : null,
        },
      },
      strictTransportSecurity: config.secureCookie,
    }),
  )
  app.use(express.json({ limit: JSON_LIMIT }))
  useSessions(app, config, database)
  app.use('/api', csrfProtection)
  app.use('/api', (_request, response, next) => {
    response.setHeader('Cache-Control', 'no-store')
    next()
  })
  for (const makeRouter of ROUTERS) app.use(makeRouter({ config, database, log }))
  app.use('/api', unknownRoute)
  if (clientFolder && existsSync(clientFolder)) {
    app.use(express.static(clientFolder, { index: false, maxAge: '1h', setHeaders: keepHashedFiles }))
    app.get('/{*path}', (_request, response) => {
      response.sendFile('index.html', { root: clientFolder, headers: { 'Cache-Control': 'no-cache' } })
    })
  }
  app.use(problems(log))
  return app
}

/** Built files carry their hash in the name and never change. */
function keepHashedFiles(response: { setHeader(name: string, value: string): void }, path: string): void {
  if (/[/\\]assets[/\\]/.test(path)) response.setHeader('Cache-Control', 'public, max-age=31536000, immutable')
}

export type MakeRouter = (parts: Parts) => Router
