import { createServer, type Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { pino } from 'pino'
import supertest, { type Test } from 'supertest'
import { v7 as uuid } from 'uuid'
import { ROLES, type Role } from '../../shared/contract/rights.js'
import { buildApp } from '../../server/app.js'
import { readConfig, type Config } from '../../server/config.js'
import { makeDataSource } from '../../server/database/dataSource.js'
import { Membership } from '../../server/database/entities/Membership.js'
import { Project } from '../../server/database/entities/Project.js'
import { User } from '../../server/database/entities/User.js'
import { databaseOf, type Database } from '../../server/database/transaction.js'
import { hashPassword } from '../../server/services/passwords.js'
import { emptyDatabase } from './database.js'

/** Who calls: a member with one role, somebody with an account but no membership, the site's administrator, nobody. */
export const CALLERS = [...ROLES, 'outsider', 'administrator', 'signed-out'] as const
export type CallerName = (typeof CALLERS)[number]
type PersonName = Exclude<CallerName, 'signed-out'>

export const PASSWORD = 'a password for tests only'

export interface TestPerson {
  id: string
  name: string
  email: string
}

/** A browser: keeps its cookie and sends the token with every change. */
export interface Caller {
  get(path: string): Test
  post(path: string): Test
  put(path: string): Test
  patch(path: string): Test
  delete(path: string): Test
}

export interface Application {
  config: Config
  database: Database
  dataSource: ReturnType<typeof makeDataSource>
  /** Address of the server, without a slash at the end. */
  address: string
  project: { id: string; name: string }
  people: Record<PersonName, TestPerson>
  /** Calls as somebody who is signed in already (or as nobody). */
  as(who: CallerName): Caller
  /** Lets another browser stand for somebody, after the first was signed out. */
  renew(who: CallerName, browser: Caller): void
  /** A new browser, signed in with address and password; without them, signed out. */
  open(email?: string, password?: string): Promise<Caller>
  /** Another project with the same members in the same roles. */
  addProject(name: string): Promise<{ id: string; name: string }>
  /** Adds a person with `PASSWORD`, and a membership of the first project where roles are given. */
  addPerson(name: string, roles?: Role[]): Promise<TestPerson>
  /** A second server on the same database. */
  startSecondServer(): Promise<{ address: string; open: Application['open'] }>
  stop(): Promise<void>
}

/**
 * The application as it runs, on a database of its own: a project with a member of each role, an outsider and an
 * administrator, all signed in. Replies are checked against the contract.
 */
export async function startApplication(settings: Record<string, string> = {}): Promise<Application> {
  const empty = await emptyDatabase()
  const config = readConfig({
    DATABASE_URL: empty.url,
    SESSION_SECRET: 'a secret for tests only, long enough to be taken',
    PUBLIC_URL: 'http://tierlight.test',
    RATE_LIMITS: 'off',
    LOG_LEVEL: 'silent',
    ...settings,
  })
  const dataSource = await makeDataSource(config.databaseUrl).initialize()
  await dataSource.runMigrations()
  const servers: Server[] = []
  const first = await startServer()

  const passwordHash = await hashPassword(PASSWORD)
  const people = {} as Record<PersonName, TestPerson>
  const browsers = { 'signed-out': await first.open() } as Record<CallerName, Caller>
  for (const who of CALLERS) {
    if (who === 'signed-out') continue
    people[who] = await addAccount(`Test ${who}`, who === 'administrator')
    browsers[who] = await first.open(people[who].email)
  }
  const project = await addProject('Test project')

  return {
    config,
    database: databaseOf(dataSource),
    dataSource,
    address: first.address,
    project,
    people,
    as: (who) => browsers[who],
    renew: (who, browser) => void (browsers[who] = browser),
    open: first.open,
    addProject,
    addPerson: async (name, roles) => {
      const person = await addAccount(name)
      if (roles) await addMember(project.id, person.id, roles)
      return person
    },
    startSecondServer: startServer,
    async stop() {
      for (const server of servers) {
        server.closeAllConnections()
        await new Promise((resolve) => server.close(resolve))
      }
      await dataSource.destroy()
      await empty.drop()
    },
  }

  async function startServer() {
    const log = pino({ level: config.logLevel })
    const server = createServer(
      buildApp({ config, database: databaseOf(dataSource), log, clientFolder: null, checkReplies: true }),
    )
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
    servers.push(server)
    const address = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
    return {
      address,
      open: (email?: string, password = PASSWORD) => openBrowser(address, email && { email, password }),
    }
  }

  async function addProject(name: string) {
    const id = uuid()
    const row = { id, name, description: '', archived: false, version: 1, createdAt: new Date(), deletedAt: null }
    await dataSource.manager.insert(Project, row)
    for (const role of ROLES) await addMember(id, people[role].id, [role])
    return { id, name }
  }

  async function addMember(projectId: string, userId: string, roles: Role[]): Promise<void> {
    await dataSource.manager.insert(Membership, { projectId, userId, roles, since: new Date() })
  }

  async function addAccount(name: string, isAdministrator = false): Promise<TestPerson> {
    const person = { id: uuid(), name, email: `${name.toLowerCase().replaceAll(' ', '.')}@lab.example` }
    const account = { passwordHash, isAdministrator, disabled: false, createdAt: new Date(), lastSignInAt: null }
    await dataSource.manager.insert(User, { ...person, ...account })
    return person
  }
}

/** Opens a browser on any server and signs it in where a person is given. */
export async function openBrowser(
  address: string,
  person?: { email: string; password: string } | '' | undefined,
): Promise<Caller> {
  const agent = supertest.agent(address)
  const session = await agent.get('/api/session').expect(200)
  let token = String(session.body.csrfToken)
  const change = (method: 'post' | 'put' | 'patch' | 'delete') => (path: string) =>
    agent[method](path)
      .set('X-CSRF-Token', token)
      .on('response', (response: { body?: { csrfToken?: unknown } | null }) => {
        if (typeof response.body?.csrfToken === 'string') token = response.body.csrfToken
      })
  const caller: Caller = {
    get: (path) => agent.get(path),
    post: change('post'),
    put: change('put'),
    patch: change('patch'),
    delete: change('delete'),
  }
  if (person) await caller.post('/api/session').send(person).expect(200)
  return caller
}
