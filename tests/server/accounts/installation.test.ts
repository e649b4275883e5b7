import { afterEach, beforeEach, expect, test } from 'vitest'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { User } from '../../../server/database/entities/User.js'
import { startApplication, type Application } from '../../support/application.js'

let application: Application
beforeEach(async () => {
  application = await startApplication()
  await application.dataSource.manager.createQueryBuilder().delete().from(User).execute()
})
afterEach(() => application?.stop())

const first = { name: 'Ada First', email: 'ada@lab.example', password: 'a password that is long enough' }

test('an empty installation takes its first administrator, signed in at once', async () => {
  const browser = await application.open()
  expect((await browser.get('/api/session')).body.installation.needsFirstAdministrator).toBe(true)

  const reply = await browser.post('/api/installation/administrator').send(first)

  expect(reply.status).toBe(201)
  expect(reply.body.person).toMatchObject({ name: 'Ada First', isAdministrator: true })
  expect(reply.body.installation.needsFirstAdministrator).toBe(false)
  await browser.get('/api/administration/accounts').expect(200)
  const [event] = await application.dataSource.manager.findBy(AuditEvent, { action: 'installation.begun' })
  expect(event).toMatchObject({ actorName: 'Ada First', sentence: 'Ada First became the first administrator.' })
})

test('of several who try at once, one becomes it', async () => {
  const browsers = await Promise.all([1, 2, 3, 4].map(() => application.open()))
  const replies = await Promise.all(
    browsers.map((browser, i) =>
      browser.post('/api/installation/administrator').send({ ...first, email: `ada${i}@lab.example` }),
    ),
  )
  expect(replies.map((reply) => reply.status).sort()).toEqual([201, 409, 409, 409])
  expect(await application.dataSource.manager.count(User)).toBe(1)
})

test('an installation with people takes none', async () => {
  await application.addPerson('Somebody')
  const browser = await application.open()
  const reply = await browser.post('/api/installation/administrator').send(first)
  expect(reply.body).toMatchObject({ status: 409, code: 'STATE_CONFLICT', details: { reason: 'installed' } })
  expect(await application.dataSource.manager.countBy(User, { isAdministrator: true })).toBe(0)
})
