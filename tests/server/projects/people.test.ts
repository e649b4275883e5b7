import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { Invitation } from '../../../server/database/entities/Invitation.js'
import { Membership } from '../../../server/database/entities/Membership.js'
import { OutboxMail } from '../../../server/database/entities/OutboxMail.js'
import { User } from '../../../server/database/entities/User.js'
import { PASSWORD, startApplication, type Application } from '../../support/application.js'

let application: Application
beforeAll(async () => {
  application = await startApplication()
})
afterAll(() => application?.stop())

const manager = () => application.dataSource.manager
const rolesOf = async (projectId: string, userId: string) =>
  (await manager().findOneBy(Membership, { projectId, userId }))?.roles ?? null
const actionsIn = async (projectId: string) =>
  (await manager().find(AuditEvent, { where: { projectId }, order: { id: 'ASC' } })).map(({ action }) => action)

/** Invites an address and gives the token of the link that went to it. */
async function invite(projectId: string, email: string, roles = ['collaborator']) {
  const reply = await application.as('lead').post(`/api/projects/${projectId}/invitations`).send({ email, roles })
  const mails = await manager().findBy(OutboxMail, { recipient: email })
  return { reply, token: /\/invitations\/([\w-]+)/.exec(mails.at(-1)?.text ?? '')?.[1] ?? '', mails }
}

describe('inviting', () => {
  test('writes one mail to the invited person, with a link that says what it offers', async () => {
    const project = await application.addProject('Invitations')
    const { reply, token, mails } = await invite(project.id, 'new.guest@lab.example', ['designer', 'experimentalist'])
    expect(reply.status).toBe(201)
    expect(reply.body).toMatchObject({
      email: 'new.guest@lab.example',
      state: 'open',
      invitedBy: { name: 'Test lead' },
    })
    expect(mails).toHaveLength(1)
    expect(mails[0]).toMatchObject({ state: 'kept', kind: 'invitation' })
    expect(mails[0]!.subject).toBe('Test lead invites you to the project “Invitations”')
    expect(mails[0]!.text).toContain(`http://tierlight.test/invitations/${token}`)
    const [row] = await manager().findBy(Invitation, { projectId: project.id })
    expect(row!.tokenHash).not.toContain(token)

    const view = await application.as('signed-out').get(`/api/invitations/${token}`).expect(200)
    expect(view.body).toMatchObject({
      projectName: 'Invitations',
      invitedBy: 'Test lead',
      email: 'new.guest@lab.example',
      roles: ['designer', 'experimentalist'],
      accountExists: false,
    })
  })

  test('a member again is refused', async () => {
    const project = await application.addProject('Members already')
    const { reply } = await invite(project.id, application.people.designer.email)
    expect(reply.body).toMatchObject({ status: 409, code: 'ALREADY_EXISTS' })
    expect(await manager().countBy(Invitation, { projectId: project.id })).toBe(0)
  })

  test('without a role is refused with a sentence', async () => {
    const { reply } = await invite(application.project.id, 'x@lab.example', [])
    expect(reply.body.errors).toEqual([{ path: ['roles'], message: 'Choose at least one role.' }])
  })
})

describe('accepting an invitation', () => {
  test('makes an account for a new person, who needs a name and a good password', async () => {
    const project = await application.addProject('New people')
    const email = 'arrival@lab.example'
    const { token } = await invite(project.id, email)
    const browser = await application.open()
    const path = `/api/invitations/${token}/acceptance`
    const refused = await browser.post(path).send({ password: 'short' })
    expect(refused.body.errors.map((error: { path: string[] }) => error.path[0])).toEqual(['name', 'password'])
    expect(await manager().countBy(User, { email })).toBe(0)

    const reply = await browser.post(path).send({ name: 'New Arrival', password: PASSWORD })

    expect(reply.body).toEqual({ projectId: project.id })
    const user = await manager().findOneByOrFail(User, { email })
    expect(await rolesOf(project.id, user.id)).toEqual(['collaborator'])
    const member = await application.open(email)
    await member.get(`/api/projects/${project.id}`).expect(200)
    expect(await actionsIn(project.id)).toEqual(['member.invited', 'member.joined'])
    const again = await browser.post(path).send({ name: 'New Arrival', password: PASSWORD })
    expect(again.body).toMatchObject({ status: 410, code: 'LINK_EXPIRED' })
  })

  test('needs the password of an account that exists', async () => {
    const project = await application.addProject('Known people')
    const { token } = await invite(project.id, application.people.outsider.email)
    const browser = await application.open()
    const path = `/api/invitations/${token}/acceptance`
    expect((await browser.post(path).send({ password: 'not it' })).body.code).toBe('PASSWORD_WRONG')
    expect(await rolesOf(project.id, application.people.outsider.id)).toBeNull()
    await browser.post(path).send({ password: PASSWORD }).expect(200)
    expect(await rolesOf(project.id, application.people.outsider.id)).toEqual(['collaborator'])
  })

  test('twice at once joins once', async () => {
    const project = await application.addProject('Impatient')
    const { token } = await invite(project.id, 'impatient@lab.example')
    const browsers = await Promise.all([application.open(), application.open()])
    const replies = await Promise.all(
      browsers.map((browser) =>
        browser.post(`/api/invitations/${token}/acceptance`).send({ name: 'Impatient', password: PASSWORD }),
      ),
    )
    expect(replies.map((reply) => reply.status).sort()).toEqual([200, 410])
    expect((await actionsIn(project.id)).filter((action) => action === 'member.joined')).toHaveLength(1)
  })

  test('fails when it was withdrawn, has expired, or the project is gone', async () => {
    const project = await application.addProject('Too late')
    const accept = (token: string) =>
      application
        .as('signed-out')
        .post(`/api/invitations/${token}/acceptance`)
        .send({ name: 'Late', password: PASSWORD })

    const withdrawn = await invite(project.id, 'withdrawn@lab.example')
    const path = `/api/projects/${project.id}/invitations/${withdrawn.reply.body.id}`
    expect((await application.as('lead').delete(path).expect(200)).body.state).toBe('withdrawn')
    expect((await accept(withdrawn.token)).body.code).toBe('LINK_EXPIRED')
    expect((await application.as('lead').delete(path)).body.code).toBe('STATE_CONFLICT')

    const expired = await invite(project.id, 'expired@lab.example')
    await manager().update(Invitation, { id: expired.reply.body.id }, { expiresAt: new Date(0) })
    expect((await accept(expired.token)).body.code).toBe('LINK_EXPIRED')

    const orphan = await invite(project.id, 'orphan@lab.example')
    const list = await application.as('lead').get(`/api/projects/${project.id}/invitations`)
    expect(list.body.items.map((item: { state: string }) => item.state)).toEqual(['open', 'expired', 'withdrawn'])
    await application.as('lead').delete(`/api/projects/${project.id}`).expect(200)
    expect((await accept(orphan.token)).status).toBe(404)
    expect(await manager().countBy(User, { name: 'Late' })).toBe(0)
  })
})

describe('members', () => {
  test('are listed by name with roles', async () => {
    const reply = await application.as('collaborator').get(`/api/projects/${application.project.id}/members`)
    expect(
      reply.body.items.map((item: { person: { name: string }; roles: string[] }) => [item.person.name, item.roles]),
    ).toEqual([
      ['Test collaborator', ['collaborator']],
      ['Test designer', ['designer']],
      ['Test experimentalist', ['experimentalist']],
      ['Test lead', ['lead']],
    ])
  })

  test('hold the union of the rights of their roles, from the moment they get them', async () => {
    const project = await application.addProject('Union')
    const { id } = application.people.collaborator
    const device = { name: 'T-1', terminals: '2-terminal', junctions: [{ label: 'top' }, { label: 'bottom' }] }
    const add = () => application.as('collaborator').post(`/api/projects/${project.id}/devices`).send(device)
    expect((await add()).status).toBe(403)
    const reply = await application
      .as('lead')
      .put(`/api/projects/${project.id}/members/${id}`)
      .send({ roles: ['collaborator', 'experimentalist', 'collaborator'] })
    expect(reply.body.roles).toEqual(['collaborator', 'experimentalist'])
    await add().then((added) => expect(added.status).toBe(201))
    expect(await actionsIn(project.id)).toEqual(['member.changed', 'device.created'])
  })

  test('who are removed are outsiders at once', async () => {
    const project = await application.addProject('Removal')
    const { id } = application.people.designer
    await application.as('lead').delete(`/api/projects/${project.id}/members/${id}`).expect(200)
    expect((await application.as('designer').get(`/api/projects/${project.id}`)).status).toBe(404)
    expect(await rolesOf(project.id, id)).toBeNull()
  })

  test('the last lead can neither leave nor give the role up', async () => {
    const project = await application.addProject('Last lead')
    const path = `/api/projects/${project.id}/members/${application.people.lead.id}`
    const lead = application.as('lead')
    const conflict = { status: 409, code: 'STATE_CONFLICT', details: { reason: 'last-lead' } }
    expect((await lead.put(path).send({ roles: ['designer'] })).body).toMatchObject(conflict)
    expect((await lead.delete(path)).body).toMatchObject(conflict)
    expect(await rolesOf(project.id, application.people.lead.id)).toEqual(['lead'])
  })

  test('of two leads who remove each other at once, one stays', async () => {
    const project = await application.addProject('Duel')
    const { lead, designer } = application.people
    const member = `/api/projects/${project.id}/members`
    await application
      .as('lead')
      .put(`${member}/${designer.id}`)
      .send({ roles: ['lead'] })
      .expect(200)
    await Promise.all([
      application.as('lead').delete(`${member}/${designer.id}`),
      application.as('designer').delete(`${member}/${lead.id}`),
    ])
    const left = await manager().findBy(Membership, { projectId: project.id })
    expect(left.filter(({ roles }) => roles.includes('lead'))).toHaveLength(1)
  })
})
