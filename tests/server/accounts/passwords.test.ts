import { afterAll, beforeAll, describe, expect, test, vi } from 'vitest'
import { OutboxMail } from '../../../server/database/entities/OutboxMail.js'
import { PasswordReset } from '../../../server/database/entities/PasswordReset.js'
import { PASSWORD, startApplication, type Application } from '../../support/application.js'

let application: Application
beforeAll(async () => {
  application = await startApplication()
})
afterAll(() => application?.stop())

const NEW = 'a new password, long enough'
const mailTo = (recipient: string) => application.dataSource.manager.findBy(OutboxMail, { recipient })

/** The token of the only link in the only mail to the address. */
async function tokenFor(email: string): Promise<string> {
  const [mail] = await vi.waitFor(async () => {
    const mails = await mailTo(email)
    expect(mails).toHaveLength(1)
    return mails
  })
  return /reset-password\/([\w-]+)/.exec(mail!.text)![1]!
}

describe('changing the password', () => {
  test('asks for the current one, and ends the other sessions but not this one', async () => {
    const { email } = await application.addPerson('Change')
    const here = await application.open(email)
    const there = await application.open(email)

    const wrong = await here.put('/api/account/password').send({ currentPassword: 'wrong', newPassword: NEW })
    expect(wrong.body).toMatchObject({ status: 403, code: 'PASSWORD_WRONG' })

    await here.put('/api/account/password').send({ currentPassword: PASSWORD, newPassword: NEW }).expect(200)
    expect((await there.get('/api/account/sessions')).status).toBe(401)
    expect((await here.get('/api/account/sessions').expect(200)).body.items).toHaveLength(1)
    const browser = await application.open()
    expect((await browser.post('/api/session').send({ email, password: PASSWORD })).status).toBe(401)
    await browser.post('/api/session').send({ email, password: NEW }).expect(200)
  })

  test('refuses a short one and says which field and why', async () => {
    const reply = await application
      .as('lead')
      .put('/api/account/password')
      .send({ currentPassword: PASSWORD, newPassword: 'short' })
    expect(reply.status).toBe(400)
    expect(reply.body.errors).toEqual([{ path: ['newPassword'], message: 'A password has at least 12 characters.' }])
  })
})

describe('a forgotten password', () => {
  test('a link by mail sets a new one, once, and ends every session', async () => {
    const { id, email } = await application.addPerson('Forgot')
    const signedIn = await application.open(email)
    const browser = await application.open()
    await browser.post('/api/password-resets').send({ email }).expect(202)
    const token = await tokenFor(email)
    const rows = await application.dataSource.manager.findBy(PasswordReset, { userId: id })
    expect(rows.map((row) => row.tokenHash)).not.toContain(token)

    await browser.put(`/api/password-resets/${token}`).send({ newPassword: NEW }).expect(200)

    expect((await signedIn.get('/api/account/sessions')).status).toBe(401)
    await browser.post('/api/session').send({ email, password: NEW }).expect(200)
    const again = await browser.put(`/api/password-resets/${token}`).send({ newPassword: `${NEW} again` })
    expect(again.body).toMatchObject({ status: 410, code: 'LINK_EXPIRED' })
  })

  test('a link that two requests use at once works for one of them', async () => {
    const { email } = await application.addPerson('Double Click')
    const browser = await application.open()
    await browser.post('/api/password-resets').send({ email }).expect(202)
    const token = await tokenFor(email)
    const replies = await Promise.all(
      ['first', 'second'].map((word) =>
        browser.put(`/api/password-resets/${token}`).send({ newPassword: `${NEW} ${word}` }),
      ),
    )
    expect(replies.map((reply) => reply.status).sort()).toEqual([200, 410])
  })

  test('an old link does nothing', async () => {
    const { id, email } = await application.addPerson('Late')
    const browser = await application.open()
    await browser.post('/api/password-resets').send({ email })
    const token = await tokenFor(email)
    await application.dataSource.manager.update(PasswordReset, { userId: id }, { expiresAt: new Date(0) })
    expect((await browser.put(`/api/password-resets/${token}`).send({ newPassword: NEW })).status).toBe(410)
    await browser.post('/api/session').send({ email, password: PASSWORD }).expect(200)
  })

  test('an unknown address gets the same answer and no mail', async () => {
    const browser = await application.open()
    const known = await browser.post('/api/password-resets').send({ email: application.people.outsider.email })
    const unknown = await browser.post('/api/password-resets').send({ email: 'nobody@lab.example' })
    expect([unknown.status, unknown.body]).toEqual([known.status, known.body])
    await tokenFor(application.people.outsider.email)
    expect(await mailTo('nobody@lab.example')).toHaveLength(0)
  })
})

test('the own name can be changed and is trimmed', async () => {
  const { email } = await application.addPerson('Old Name')
  const browser = await application.open(email)
  const reply = await browser.patch('/api/account').send({ name: '  New Name ' }).expect(200)
  expect(reply.body.name).toBe('New Name')
  expect((await browser.get('/api/session')).body.person.name).toBe('New Name')
})
