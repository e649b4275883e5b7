import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import express from 'express'
import { pino } from 'pino'
import supertest from 'supertest'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { ApiError, Problem } from '../../../shared/contract/errors.js'
import { buildApp } from '../../../server/app.js'
import { makeDataSource } from '../../../server/database/dataSource.js'
import { databaseOf } from '../../../server/database/transaction.js'
import { problems } from '../../../server/middleware/errors.js'
import { PASSWORD, startApplication, type Application } from '../../support/application.js'

let application: Application
beforeAll(async () => {
  application = await startApplication()
})
afterAll(() => application?.stop())

/** A request with the token, but with a body of any kind. */
async function sendRaw(path: string, contentType: string, body: string | Buffer, headers: Record<string, string> = {}) {
  const agent = supertest.agent(application.address)
  const token = (await agent.get('/api/session')).body.csrfToken as string
  return agent
    .post(path)
    .set({ 'X-CSRF-Token': token, 'Content-Type': contentType, ...headers })
    .send(body)
}

describe('every error is a problem document', () => {
  test.each([
    ['malformed JSON', '{"email": ', {}, 400, 'BODY_MALFORMED'],
    ['JSON that is no object', '"text"', {}, 400, 'BODY_MALFORMED'],
    ['an unknown character set', '{}', { 'Content-Type': 'application/json; charset=klingon' }, 400, 'BODY_MALFORMED'],
    ['an unknown content encoding', '{}', { 'Content-Encoding': 'secret' }, 400, 'BODY_MALFORMED'],
    ['another type of body', 'email=a', { 'Content-Type': 'text/plain' }, 400, 'INPUT_INVALID'],
    ['a body that is too large', JSON.stringify({ email: 'x'.repeat(2_100_000) }), {}, 413, 'BODY_TOO_LARGE'],
  ] as const)('%s', async (_, body, headers, status, code) => {
    const reply = await sendRaw('/api/session', 'application/json', body, headers)
    expect(reply.type).toBe('application/problem+json')
    expect(reply.body).toMatchObject({ status, code })
    expect(reply.status).toBe(status)
    expect(Problem.safeParse(reply.body).success).toBe(true)
  })

  test.each([
    ['/api/no-such-thing', 'ROUTE_NOT_FOUND'],
    ['/api/projects/not-a-uuid', 'NOT_FOUND'],
    ['/api/projects/%E0%A4%A', 'NOT_FOUND'],
    ['/api/projects?limit=many', 'INPUT_INVALID'],
    ['/api/projects?limit=0', 'INPUT_INVALID'],
  ])('GET %s', async (path, code) => {
    const reply = await application.as('lead').get(path)
    expect(reply.type).toBe('application/problem+json')
    expect(reply.body.code).toBe(code)
  })

  test('a form’s errors name the fields, also those that do not belong', async () => {
    const reply = await application
      .as('lead')
      .post('/api/projects')
      .send({ name: 'x'.repeat(121), colour: 'red' })
    expect(reply.body.errors).toEqual([
      { path: ['name'], message: 'A name has at most 120 characters.' },
      { path: [], message: 'Unrecognized key: "colour"' },
    ])
  })
})

test('a change without the token, or with another’s, is refused and does nothing', async () => {
  const agent = supertest.agent(application.address)
  const { lead } = application.people
  const stranger = (await supertest.agent(application.address).get('/api/session')).body.csrfToken as string
  await agent.get('/api/session')
  for (const headers of [{}, { 'X-CSRF-Token': '' }, { 'X-CSRF-Token': stranger }]) {
    const reply = await agent.post('/api/session').set(headers).send({ email: lead.email, password: PASSWORD })
    expect(reply.body).toMatchObject({ status: 403, code: 'CSRF_TOKEN_WRONG' })
  }
  expect((await agent.get('/api/session')).body.person).toBeNull()
})

test('replies carry a strict content security policy and are not kept by caches', async () => {
  const reply = await application.as('signed-out').get('/api/session')
  const policy = String(reply.headers['content-security-policy'])
  expect(policy).toContain("script-src 'self';")
  expect(policy).not.toContain('unsafe-eval')
  expect(reply.headers['cache-control']).toBe('no-store')
  expect(reply.headers['x-powered-by']).toBeUndefined()
  expect(reply.headers['x-content-type-options']).toBe('nosniff')
})

describe('an error that nobody foresaw', () => {
  test('gives a number that is in the log, and nothing of what happened', async () => {
    const lines: string[] = []
    const log = pino({ level: 'error' }, { write: (line: string) => void lines.push(line) })
    const app = express()
    app.get('/api/broken', () => {
      throw new TypeError('secret inside')
    })
    app.get('/api/meant', () => {
      throw new ApiError('STATE_CONFLICT', { reason: 'archived' })
    })
    app.use(problems(log))
    const reply = await supertest(app).get('/api/broken')
    expect(reply.status).toBe(500)
    expect(reply.text).not.toContain('secret')
    expect(reply.text).not.toContain('.ts')
    expect(lines).toHaveLength(1)
    expect(JSON.parse(lines[0]!)).toMatchObject({ id: reply.body.details.id, err: { message: 'secret inside' } })
    expect(reply.body.detail).toContain(reply.body.details.id)

    expect((await supertest(app).get('/api/meant')).body).toMatchObject({ status: 409, code: 'STATE_CONFLICT' })
    expect(lines).toHaveLength(1)
  })
})

test('a database that does not answer is said so', async () => {
  const gone = createServer()
  await new Promise<void>((resolve) => gone.listen(0, '127.0.0.1', resolve))
  const { port } = gone.address() as AddressInfo
  await new Promise((resolve) => gone.close(resolve))
  const away = makeDataSource(application.config.databaseUrl.replace(/:\d+\//, `:${port}/`))
  await expect(away.initialize()).rejects.toMatchObject({ code: 'ECONNREFUSED' })

  const log = pino({ level: 'silent' })
  const unreachable = { ...databaseOf(application.dataSource), transaction: () => away.initialize() as never }
  const app = buildApp({ config: application.config, database: unreachable, log, clientFolder: null })
  const agent = supertest.agent(app)
  const token = (await agent.get('/api/session')).body.csrfToken as string
  const body = { name: 'Ada', email: 'ada@lab.example', password: 'a password that is long enough' }
  const reply = await agent.post('/api/installation/administrator').set('X-CSRF-Token', token).send(body)
  expect(reply.body).toMatchObject({ status: 503, code: 'DATABASE_UNAVAILABLE' })
})
