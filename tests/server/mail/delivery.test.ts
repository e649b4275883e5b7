import type { AddressInfo } from 'node:net'
import { pino } from 'pino'
import { SMTPServer } from 'smtp-server'
import { afterAll, afterEach, beforeAll, beforeEach, expect, test } from 'vitest'
import { OutboxMail } from '../../../server/database/entities/OutboxMail.js'
import { sendDueMail } from '../../../server/mail/transport.js'
import { startApplication, type Application } from '../../support/application.js'

interface Received {
  from: string
  to: string[]
  raw: string
}

let application: Application
let server: SMTPServer
let received: Received[]
let refuses: string | null
let port: number

beforeAll(async () => {
  const probe = await listen(newServer(), 0)
  port = probe.port
  await close(probe.server)
  application = await startApplication({
    SMTP_URL: `smtp://127.0.0.1:${port}`,
    MAIL_FROM: 'Tierlight <tierlight@lab.example>',
  })
})
afterAll(() => application?.stop())

beforeEach(async () => {
  received = []
  refuses = null
  await application.dataSource.manager.createQueryBuilder().delete().from(OutboxMail).execute()
  ;({ server } = await listen(newServer(), port))
})
afterEach(() => close(server))

function newServer(): SMTPServer {
  return new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onData(stream, session, done) {
      const chunks: Buffer[] = []
      stream.on('data', (chunk: Buffer) => chunks.push(chunk))
      stream.on('end', () => {
        if (refuses) return done(Object.assign(new Error(refuses), { responseCode: 451 }))
        const { mailFrom, rcptTo } = session.envelope
        received.push({
          from: mailFrom ? mailFrom.address : '',
          to: rcptTo.map(({ address }) => address),
          raw: Buffer.concat(chunks).toString('utf8'),
        })
        done()
      })
    },
  })
}

async function listen(one: SMTPServer, at: number): Promise<{ server: SMTPServer; port: number }> {
  one.on('error', () => undefined)
  await new Promise<void>((resolve) => one.listen(at, '127.0.0.1', resolve))
  return { server: one, port: (one.server.address() as AddressInfo).port }
}

const close = (one: SMTPServer) => new Promise<void>((resolve) => one.close(() => resolve()))
const deliver = () =>
  sendDueMail({ config: application.config, database: application.database, log: pino({ level: 'silent' }) })
const outbox = () => application.dataSource.manager.find(OutboxMail, { order: { createdAt: 'ASC' } })
const invite = (email: string) =>
  application
    .as('lead')
    .post(`/api/projects/${application.project.id}/invitations`)
    .send({ email, roles: ['designer'] })
    .expect(201)
const makeDue = () =>
  application.dataSource.manager.update(OutboxMail, { state: 'waiting' }, { nextAttemptAt: new Date(0) })

test('an invitation is sent once, to the invited person only', async () => {
  await invite('anna@lab.example')
  expect(await outbox()).toMatchObject([{ state: 'waiting', attempts: 0 }])

  expect(await deliver()).toBe(1)

  expect(received).toHaveLength(1)
  expect(received[0]).toMatchObject({ from: 'tierlight@lab.example', to: ['anna@lab.example'] })
  expect(received[0]!.raw).toMatch(/^To: anna@lab\.example\r$/m)
  expect(received[0]!.raw.replaceAll('=\r\n', '')).toContain('http://tierlight.test/invitations/')
  const [mail] = await outbox()
  expect(mail).toMatchObject({ state: 'sent', lastError: null })
  expect(mail!.sentAt).toBeInstanceOf(Date)
  expect(await deliver()).toBe(0)
  expect(received).toHaveLength(1)
})

test('two servers that send at once send each mail once', async () => {
  const addresses = Array.from({ length: 12 }, (_, i) => `person${i}@lab.example`)
  for (const address of addresses) await invite(address)
  const sent = await Promise.all([deliver(), deliver(), deliver()])
  expect(sent.reduce((sum, one) => sum + one, 0)).toBe(12)
  expect(received.flatMap(({ to }) => to).sort()).toEqual([...addresses].sort())
})

test('what a mail server refuses for now is kept and sent later', async () => {
  refuses = 'Try again later'
  await invite('later@lab.example')
  expect(await deliver()).toBe(0)
  const [mail] = await outbox()
  expect(mail).toMatchObject({ state: 'waiting', attempts: 1, lastError: expect.stringContaining('Try again later') })
  expect(mail!.nextAttemptAt!.getTime()).toBeGreaterThan(Date.now())
  expect(await deliver()).toBe(0)

  refuses = null
  await makeDue()
  expect(await deliver()).toBe(1)
  expect(received.map(({ to }) => to)).toEqual([['later@lab.example']])
})

test('no mail is lost while the mail server is down, and the request that wrote it does not fail', async () => {
  await close(server)
  await invite('down@lab.example')
  expect(await deliver()).toBe(0)
  expect(await outbox()).toMatchObject([
    { state: 'waiting', attempts: 1, lastError: expect.stringContaining('ECONNREFUSED') },
  ])

  ;({ server } = await listen(newServer(), port))
  await makeDue()
  expect(await deliver()).toBe(1)
  expect(received).toHaveLength(1)
})

test('after many failures it is given up, and the administrator sees why', async () => {
  refuses = 'No room'
  await invite('full@lab.example')
  await application.dataSource.manager.update(OutboxMail, { state: 'waiting' }, { attempts: 11 })
  await deliver()
  const reply = await application.as('administrator').get('/api/administration/outbox').expect(200)
  expect(reply.body.items).toMatchObject([{ to: 'full@lab.example', state: 'failed', attempts: 12 }])
  expect(reply.body.items[0].lastError).toContain('No room')
  const health = await application.as('administrator').get('/api/administration/health')
  expect(health.body.mail).toEqual({ delivery: 'smtp', waiting: 0, failed: 1 })
})

test('a mail belongs to the deed: when the deed fails, there is none', async () => {
  const { email } = application.people.designer
  const path = `/api/projects/${application.project.id}/invitations`
  await application
    .as('lead')
    .post(path)
    .send({ email, roles: ['lead'] })
    .expect(409)
  expect(await outbox()).toEqual([])
})
