import { afterAll, beforeAll, expect, test } from 'vitest'
import { PASSWORD, openBrowser, startApplication, type Application } from '../support/application.js'
import supertest from 'supertest'

let application: Application
let second: { address: string }
beforeAll(async () => {
  application = await startApplication()
  second = await application.startSecondServer()
})
afterAll(() => application?.stop())

test('who signed in at one server is signed in at the other, and signs out of both', async () => {
  const { email } = application.people.designer
  const session = await supertest(application.address).get('/api/session')
  const signedIn = await supertest(application.address)
    .post('/api/session')
    .set({ Cookie: cookieOf(session), 'X-CSRF-Token': session.body.csrfToken })
    .send({ email, password: PASSWORD })
    .expect(200)
  const headers = { Cookie: cookieOf(signedIn), 'X-CSRF-Token': signedIn.body.csrfToken as string }

  const there = await supertest(second.address).get('/api/session').set(headers)
  expect(there.body.person.email).toBe(email)
  const made = await supertest(second.address).post('/api/projects').set(headers).send({ name: 'Made there' })
  expect(made.status).toBe(201)
  await supertest(application.address).get(`/api/projects/${made.body.id}`).set(headers).expect(200)

  await supertest(second.address).delete('/api/session').set(headers).expect(200)
  const after = await supertest(application.address).get('/api/projects').set(headers)
  expect(after.body.code).toBe('SIGN_IN_NEEDED')
})

test('of two saves of one version at two servers, one is told that it is stale', async () => {
  const { id } = await application.addProject('Two servers')
  const here = await application.open(application.people.lead.email)
  const there = await openBrowser(second.address, { email: application.people.lead.email, password: PASSWORD })
  const replies = await Promise.all(
    [here, there].map((browser, i) => browser.patch(`/api/projects/${id}`).send({ version: 1, name: `Name ${i}` })),
  )
  expect(replies.map((reply) => reply.status).sort()).toEqual([200, 409])
  const winner = replies.find((reply) => reply.status === 200)!
  for (const browser of [here, there])
    expect((await browser.get(`/api/projects/${id}`)).body.name).toBe(winner.body.name)
})

const cookieOf = (reply: { headers: Record<string, unknown> }) =>
  (reply.headers['set-cookie'] as unknown as string[])[0]!.split(';')[0]!
