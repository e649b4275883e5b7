import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { AuditEvent } from '../../server/database/entities/AuditEvent.js'
import { MIGRATIONS } from '../../server/database/migrations/index.js'
import { OutboxMail } from '../../server/database/entities/OutboxMail.js'
import { User } from '../../server/database/entities/User.js'
import { startApplication, type Application } from '../support/application.js'

let application: Application
beforeAll(async () => {
  application = await startApplication()
})
afterAll(() => application?.stop())

const manager = () => application.dataSource.manager
const admin = () => application.as('administrator')
const change = (id: string, body: object) => admin().patch(`/api/administration/accounts/${id}`).send(body)

describe('accounts', () => {
  test('a new one gets a mail with a link that sets the first password', async () => {
    const email = 'fresh@lab.example'
    const reply = await admin()
      .post('/api/administration/accounts')
      .send({ name: 'Fresh Person', email: 'Fresh@Lab.example' })
    expect(reply.status).toBe(201)
    expect(reply.body).toMatchObject({
      name: 'Fresh Person',
      email,
      isAdministrator: false,
      disabled: false,
      projectCount: 0,
    })
    const user = await manager().findOneByOrFail(User, { email })
    expect(user.passwordHash).toBeNull()
    const browser = await application.open()
    expect((await browser.post('/api/session').send({ email, password: 'null' })).status).toBe(401)

    const [mail, ...others] = await manager().findBy(OutboxMail, { recipient: email })
    expect(others).toEqual([])
    const token = /reset-password\/([\w-]+)/.exec(mail!.text)![1]!
    await browser.put(`/api/password-resets/${token}`).send({ newPassword: 'my own password, long' }).expect(200)
    await browser.post('/api/session').send({ email, password: 'my own password, long' }).expect(200)
  })

  test('an address has one account', async () => {
    const { email } = application.people.lead
    const reply = await admin().post('/api/administration/accounts').send({ name: 'Again', email })
    expect(reply.body).toMatchObject({ status: 409, code: 'ALREADY_EXISTS', details: { field: 'email', value: email } })
    expect(await manager().countBy(User, { email })).toBe(1)
  })

  test('an address that two requests take at once has one account', async () => {
    const body = { name: 'Raced', email: 'raced@lab.example' }
    const replies = await Promise.all([1, 2].map(() => admin().post('/api/administration/accounts').send(body)))
    expect(replies.map((reply) => reply.status).sort()).toEqual([201, 409])
    expect(await manager().countBy(OutboxMail, { recipient: body.email })).toBe(1)
  })

  test('disabling ends the sessions, and enabling lets in again', async () => {
    const person = await application.addPerson('On And Off')
    const browser = await application.open(person.email)
    expect((await change(person.id, { disabled: true }).expect(200)).body.disabled).toBe(true)
    expect((await browser.get('/api/projects')).body.code).toBe('SIGN_IN_NEEDED')
    await change(person.id, { disabled: false }).expect(200)
    await application.open(person.email)
    const events = await manager().find(AuditEvent, { where: { subjectId: person.id }, order: { id: 'ASC' } })
    expect(events.map(({ action, actorName }) => [action, actorName])).toEqual([
      ['account.changed', 'Test administrator'],
      ['account.changed', 'Test administrator'],
    ])
  })

  test('the site role is no back door into projects', async () => {
    const person = await application.addPerson('Promoted')
    const browser = await application.open(person.email)
    await change(person.id, { isAdministrator: true }).expect(200)
    await browser.get('/api/administration/accounts').expect(200)
    expect((await browser.get(`/api/projects/${application.project.id}`)).status).toBe(404)
    await change(person.id, { isAdministrator: false }).expect(200)
    expect((await browser.get('/api/administration/accounts')).status).toBe(403)
  })

  test.each([{ disabled: true }, { isAdministrator: false }])('the last administrator stays: %o', async (body) => {
    const { id } = application.people.administrator
    expect((await change(id, body)).body).toMatchObject({ status: 409, details: { reason: 'last-administrator' } })
    expect(await manager().findOneByOrFail(User, { id })).toMatchObject({ disabled: false, isAdministrator: true })
  })

  test('of two administrators who disable each other at once, one stays', async () => {
    const rival = await application.addPerson('Rival')
    await change(rival.id, { isAdministrator: true }).expect(200)
    const browser = await application.open(rival.email)
    const { administrator } = application.people
    await Promise.all([
      change(rival.id, { disabled: true }),
      browser.patch(`/api/administration/accounts/${administrator.id}`).send({ disabled: true }),
    ])
    const active = await manager().findBy(User, { isAdministrator: true, disabled: false })
    expect(active).toHaveLength(1)
    await manager().update(User, { id: administrator.id }, { disabled: false })
    application.renew('administrator', await application.open(administrator.email))
    await manager().update(User, { id: rival.id }, { isAdministrator: false })
  })

  test('are listed by name with the number of their projects, page by page', async () => {
    const names: string[] = []
    const total = await manager().count(User)
    let cursor: string | null = ''
    while (cursor !== null) {
      const query = cursor === '' ? {} : { cursor }
      const page = await admin()
        .get('/api/administration/accounts')
        .query({ limit: 3, ...query })
      expect(page.body.total).toBe(total)
      for (const item of page.body.items) names.push(item.name)
      cursor = page.body.nextCursor
    }
    expect(names).toHaveLength(total)
    expect(names).toEqual([...names].sort((a, b) => a.localeCompare(b)))
    const all = await admin().get('/api/administration/accounts')
    const lead = all.body.items.find((item: { name: string }) => item.name === 'Test lead')
    expect(lead.projectCount).toBe(1)
    expect(JSON.stringify(all.body)).not.toContain('argon2')
  })
})

test('the outbox can be read by the administrator where no mail server is set', async () => {
  const invitation = { email: 'outbox@lab.example', roles: ['collaborator'] }
  await application.as('lead').post(`/api/projects/${application.project.id}/invitations`).send(invitation).expect(201)
  const reply = await admin().get('/api/administration/outbox?limit=1').expect(200)
  expect(reply.body.items).toMatchObject([
    { to: 'outbox@lab.example', kind: 'invitation', state: 'kept', attempts: 0, lastError: null, sentAt: null },
  ])
  expect(reply.body.items[0].text).toContain('http://tierlight.test/invitations/')
})

test('health tells versions, database, mail and storage', async () => {
  const reply = await admin().get('/api/administration/health').expect(200)
  expect(reply.body).toMatchObject({
    version: expect.stringMatching(/^\d+\.\d+\.\d+$/),
    database: { answers: true, version: expect.stringContaining('MariaDB'), migrations: MIGRATIONS.length },
    mail: { delivery: 'outbox', waiting: 0, failed: 0 },
    storage: { sourceFiles: 0, sourceFileBytes: 0, scans: 0 },
  })
})

test('the audit trail holds the whole site, newest first, and finds by person, action and time', async () => {
  const get = (query: object) => admin().get('/api/administration/audit-events').query(query)
  const before = new Date()
  const made = await application.as('designer').post('/api/projects').send({ name: 'Audited' }).expect(201)
  const all = await get({})
  expect(all.body.items[0]).toMatchObject({
    action: 'project.created',
    sentence: 'Test designer made the project Audited.',
  })
  expect(all.body.total).toBe(await manager().count(AuditEvent))
  const mine = await get({ actorId: application.people.designer.id, action: 'project.created' })
  expect(mine.body.items.map((item: { subject: { id: string } }) => item.subject.id)).toEqual([made.body.id])
  expect((await get({ to: before.toISOString(), actorId: application.people.designer.id })).body.total).toBe(0)
  expect((await get({ from: before.toISOString(), actorId: application.people.designer.id })).body.total).toBe(1)
})
