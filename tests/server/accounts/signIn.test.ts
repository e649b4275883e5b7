import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { SessionRecord } from '../../../server/database/entities/SessionRecord.js'
import { User } from '../../../server/database/entities/User.js'
import { PASSWORD, startApplication, type Application } from '../../support/application.js'

let application: Application
beforeAll(async () => {
  application = await startApplication()
})
afterAll(() => application?.stop())

const cookieOf = (reply: { headers: Record<string, unknown> }) => String(reply.headers['set-cookie'] ?? '')
const sessionsOf = (userId: string) => application.dataSource.manager.findBy(SessionRecord, { userId })

describe('signing in', () => {
  test('gives the person, and a new cookie and token, so that a planted session is worth nothing', async () => {
    const person = await application.addPerson('Sign In')
    const browser = await application.open()
    const before = await browser.get('/api/session')
    expect(before.body.person).toBeNull()

    const reply = await browser.post('/api/session').send({ email: person.email.toUpperCase(), password: PASSWORD })

    expect(reply.status).toBe(200)
    expect(reply.body.person).toEqual({ ...person, isAdministrator: false })
    expect(reply.body.csrfToken).not.toBe(before.body.csrfToken)
    expect(cookieOf(reply)).toMatch(/^tierlight\.session=.+; HttpOnly; SameSite=Lax$/)
    const user = await application.dataSource.manager.findOneByOrFail(User, { id: person.id })
    expect(user.lastSignInAt).toBeInstanceOf(Date)
    expect(user.passwordHash).toMatch(/^\$argon2id\$/)
  })

  test('ends the session that the browser had before', async () => {
    const person = await application.addPerson('Twice')
    const browser = await application.open(person.email)
    await browser.post('/api/session').send({ email: person.email, password: PASSWORD }).expect(200)
    expect(await sessionsOf(person.id)).toHaveLength(1)
  })

  test('says the same for a wrong password, an unknown address and a disabled account', async () => {
    const person = await application.addPerson('Disabled')
    await application.dataSource.manager.update(User, { id: person.id }, { disabled: true })
    const browser = await application.open()
    const attempts = [
      { email: application.people.lead.email, password: 'not the password' },
      { email: 'nobody@lab.example', password: PASSWORD },
      { email: person.email, password: PASSWORD },
    ]
    const replies = []
    for (const attempt of attempts) replies.push(await browser.post('/api/session').send(attempt))
    expect(replies.map((reply) => reply.status)).toEqual([401, 401, 401])
    expect(new Set(replies.map((reply) => JSON.stringify(reply.body))).size).toBe(1)
    expect(replies[0]!.body.code).toBe('SIGN_IN_FAILED')
  })

  test('of an account that is disabled later ends at the next request', async () => {
    const person = await application.addPerson('Disabled Later')
    const browser = await application.open(person.email)
    await application.dataSource.manager.update(User, { id: person.id }, { disabled: true })
    const reply = await browser.get('/api/projects')
    expect(reply.body.code).toBe('SIGN_IN_NEEDED')
  })
})

describe('signing out', () => {
  test('removes the session from the database', async () => {
    const person = await application.addPerson('Sign Out')
    const browser = await application.open(person.email)
    expect(await sessionsOf(person.id)).toHaveLength(1)
    const reply = await browser.delete('/api/session').expect(200)
    expect(reply.body.person).toBeNull()
    expect(await sessionsOf(person.id)).toHaveLength(0)
    expect((await browser.get('/api/session')).body.person).toBeNull()
  })
})

describe('the list of one’s own sessions', () => {
  test('names the current one, gives no cookie away, and ends another', async () => {
    const person = await application.addPerson('Two Browsers')
    const here = await application.open(person.email)
    const there = await application.open(person.email)
    const { items } = (await here.get('/api/account/sessions').expect(200)).body
    expect(items).toHaveLength(2)
    expect(items.filter((item: { current: boolean }) => item.current)).toHaveLength(1)
    const records = await sessionsOf(person.id)
    for (const item of items) expect(records.map((record) => record.id)).not.toContain(item.id)

    const other = items.find((item: { current: boolean }) => !item.current)
    await here.delete(`/api/account/sessions/${other.id}`).expect(200)
    expect((await there.get('/api/account/sessions')).body.code).toBe('SIGN_IN_NEEDED')
    await here.get('/api/account/sessions').expect(200)
  })

  test('does not reach the sessions of others', async () => {
    const person = await application.addPerson('Curious')
    const [mine] = (await application.as('lead').get('/api/account/sessions')).body.items
    const browser = await application.open(person.email)
    const reply = await browser.delete(`/api/account/sessions/${mine.id}`)
    expect(reply.status).toBe(404)
    await application.as('lead').get('/api/account/sessions').expect(200)
  })

  test('does not hold sessions that have expired, and those are no longer let in', async () => {
    const person = await application.addPerson('Expired')
    const browser = await application.open(person.email)
    await application.dataSource.manager.update(SessionRecord, { userId: person.id }, { expiresAt: new Date(0) })
    expect((await browser.get('/api/account/sessions')).body.code).toBe('SIGN_IN_NEEDED')
  })
})

test('limits the attempts from one address and says when to try again', async () => {
  const limited = await startApplication({ RATE_LIMITS: 'on' })
  try {
    const browser = await limited.open()
    const attempt = () => browser.post('/api/session').send({ email: 'nobody@lab.example', password: 'guess' })
    let reply = await attempt()
    for (let i = 0; i < 30 && reply.status === 401; i++) reply = await attempt()
    expect(reply.status).toBe(429)
    expect(reply.body.code).toBe('TOO_MANY_REQUESTS')
    const seconds = reply.body.details.retryAfterSeconds
    expect(seconds).toBeGreaterThan(0)
    expect(reply.headers['retry-after']).toBe(String(seconds))
    await browser.get('/api/session').expect(200)
  } finally {
    await limited.stop()
  }
})
