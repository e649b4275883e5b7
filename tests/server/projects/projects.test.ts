import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { Membership } from '../../../server/database/entities/Membership.js'
import { Project } from '../../../server/database/entities/Project.js'
import { startApplication, type Application } from '../../support/application.js'

let application: Application
beforeAll(async () => {
  application = await startApplication()
})
afterAll(() => application?.stop())

const stored = (id: string) => application.dataSource.manager.findOneByOrFail(Project, { id })
const actionsIn = async (projectId: string) =>
  (
    await application.dataSource.manager.find(AuditEvent, { where: { projectId }, order: { at: 'ASC', id: 'ASC' } })
  ).map(({ action }) => action)

describe('making a project', () => {
  test('makes its maker lead, designer and experimentalist, and shows it in the list', async () => {
    const reply = await application.as('outsider').post('/api/projects').send({ name: ' Thickness split ' })
    expect(reply.status).toBe(201)
    expect(reply.body).toMatchObject({
      name: 'Thickness split',
      description: '',
      archived: false,
      version: 1,
      myRoles: ['lead', 'designer', 'experimentalist'],
      deviceCount: 0,
      scanCount: 0,
      lastScanAt: null,
      memberCount: 1,
    })
    const userId = application.people.outsider.id
    const [membership] = await application.dataSource.manager.findBy(Membership, { projectId: reply.body.id, userId })
    expect(membership?.roles).toEqual(['lead', 'designer', 'experimentalist'])
    expect(await actionsIn(reply.body.id)).toEqual(['project.created'])
    const list = await application.as('outsider').get('/api/projects').expect(200)
    expect(list.body.items.map((item: { id: string }) => item.id)).toEqual([reply.body.id])
    await application.as('lead').get(`/api/projects/${reply.body.id}`).expect(404)
  })

  test('a blank name is refused with its field, and nothing is made', async () => {
    const before = await application.dataSource.manager.count(Project)
    const reply = await application.as('lead').post('/api/projects').send({ name: '   ' })
    expect(reply.body).toMatchObject({ status: 400, errors: [{ path: ['name'], message: 'A name is needed.' }] })
    expect(await application.dataSource.manager.count(Project)).toBe(before)
  })
})

describe('saving a project', () => {
  test('counts versions, and a stale one is a conflict that shows the saved one', async () => {
    const { id } = await application.addProject('Versions')
    const lead = application.as('lead')
    const saved = await lead.patch(`/api/projects/${id}`).send({ version: 1, name: 'Renamed' }).expect(200)
    expect(saved.body).toMatchObject({ name: 'Renamed', version: 2 })

    const stale = await lead.patch(`/api/projects/${id}`).send({ version: 1, description: 'too late' })

    expect(stale.body).toMatchObject({
      status: 409,
      code: 'STALE_VERSION',
      details: { sentVersion: 1, currentVersion: 2, current: { name: 'Renamed', version: 2 } },
    })
    expect(await stored(id)).toMatchObject({ name: 'Renamed', description: '', version: 2 })
    expect(await actionsIn(id)).toEqual(['project.renamed'])
  })

  test('of two saves of the same version at once, one wins and the other is told', async () => {
    const { id } = await application.addProject('At once')
    const replies = await Promise.all(
      ['one', 'two', 'three'].map((description) =>
        application.as('lead').patch(`/api/projects/${id}`).send({ version: 1, description }),
      ),
    )
    expect(replies.map((reply) => reply.status).sort()).toEqual([200, 409, 409])
    const winner = replies.find((reply) => reply.status === 200)!
    expect(await stored(id)).toMatchObject({ description: winner.body.description, version: 2 })
    expect(await actionsIn(id)).toEqual(['project.described'])
  })

  test('an archived project can be read and reopened, and takes no change', async () => {
    const { id } = await application.addProject('Archive')
    const lead = application.as('lead')
    await lead.patch(`/api/projects/${id}`).send({ version: 1, archived: true }).expect(200)
    await application.as('collaborator').get(`/api/projects/${id}`).expect(200)
    const device = { name: 'T-1', terminals: '2-terminal', junctions: [{ label: 'top' }, { label: 'bottom' }] }
    const refused = await lead.post(`/api/projects/${id}/devices`).send(device)
    expect(refused.body).toMatchObject({ status: 409, code: 'STATE_CONFLICT', details: { reason: 'archived' } })
    const archived = await lead.get('/api/projects?include=archived')
    expect(archived.body.items.map((item: { id: string }) => item.id)).toEqual([id])

    await lead.patch(`/api/projects/${id}`).send({ version: 2, archived: false }).expect(200)
    await lead.post(`/api/projects/${id}/devices`).send(device).expect(201)
  })
})

describe('deleting a project', () => {
  test('hides it from everyone, and its lead can bring it back', async () => {
    const { id } = await application.addProject('Deleted')
    const lead = application.as('lead')
    const reply = await lead.delete(`/api/projects/${id}`).expect(200)
    expect(reply.body.deletedAt).not.toBeNull()

    for (const who of ['lead', 'collaborator'] as const)
      expect((await application.as(who).get(`/api/projects/${id}`)).status).toBe(404)
    expect((await lead.get(`/api/projects/${id}/devices`)).status).toBe(404)
    const deleted = await lead.get('/api/projects?include=deleted')
    expect(deleted.body.items.map((item: { id: string }) => item.id)).toContain(id)
    expect((await application.as('designer').post(`/api/projects/${id}/restoration`)).status).toBe(403)
    expect((await application.as('outsider').post(`/api/projects/${id}/restoration`)).status).toBe(404)

    await lead.post(`/api/projects/${id}/restoration`).expect(200)
    await application.as('collaborator').get(`/api/projects/${id}`).expect(200)
    expect(await actionsIn(id)).toEqual(['project.deleted', 'project.restored'])
  })

  test('more than thirty days ago cannot be taken back', async () => {
    const { id } = await application.addProject('Long gone')
    const deletedAt = new Date(Date.now() - 30.01 * 86_400_000)
    await application.dataSource.manager.update(Project, { id }, { deletedAt })
    expect((await application.as('lead').post(`/api/projects/${id}/restoration`)).status).toBe(404)
    const deleted = await application.as('lead').get('/api/projects?include=deleted')
    expect(deleted.body.items.map((item: { id: string }) => item.id)).not.toContain(id)
  })

  test('a project that is not deleted cannot be restored', async () => {
    const { id } = await application.addProject('Still there')
    const reply = await application.as('lead').post(`/api/projects/${id}/restoration`)
    expect(reply.body).toMatchObject({ status: 409, code: 'STATE_CONFLICT', details: { reason: 'not-deleted' } })
    expect(await actionsIn(id)).toEqual([])
  })
})

test('the list pages by name without losing or repeating a project', async () => {
  const browser = await application.open((await application.addPerson('Pager')).email)
  const names = ['Epsilon', 'Alpha', 'Beta', 'Alpha', 'Delta']
  for (const name of names) await browser.post('/api/projects').send({ name }).expect(201)
  const seen: { id: string; name: string }[] = []
  let cursor: string | null = ''
  while (cursor !== null) {
    const page = await browser.get('/api/projects').query({ limit: 2, ...(cursor ? { cursor } : {}) })
    expect(page.body.total).toBe(5)
    seen.push(...page.body.items)
    cursor = page.body.nextCursor
  }
  expect(seen.map(({ name }) => name)).toEqual(['Alpha', 'Alpha', 'Beta', 'Delta', 'Epsilon'])
  expect(new Set(seen.map(({ id }) => id)).size).toBe(5)
  const nonsense = await browser.get('/api/projects?cursor=nonsense')
  expect(nonsense.body).toMatchObject({ status: 400, errors: [{ path: ['cursor'] }] })
})

test('the activity of a project is newest first, filtered, and says who did what', async () => {
  const { id } = await application.addProject('Activity')
  const lead = application.as('lead')
  await lead.patch(`/api/projects/${id}`).send({ version: 1, description: 'a' }).expect(200)
  await lead.patch(`/api/projects/${id}`).send({ version: 2, name: 'Active' }).expect(200)
  const all = await application.as('collaborator').get(`/api/projects/${id}/activity`).expect(200)
  expect(all.body.items).toMatchObject([
    {
      actor: { id: application.people.lead.id, name: 'Test lead' },
      action: 'project.renamed',
      sentence: 'Test lead renamed the project Activity to Active.',
      subject: { kind: 'project', id, name: 'Active' },
    },
    { action: 'project.described' },
  ])
  const path = `/api/projects/${id}/activity`
  const renamed = await lead.get(path).query({ action: 'project.renamed' })
  expect(renamed.body.total).toBe(1)
  expect((await lead.get(path).query({ actorId: application.people.designer.id })).body.total).toBe(0)
  expect((await lead.get(path).query({ action: 'project' })).body.total).toBe(2)
  const first = await lead.get(path).query({ limit: 1 })
  const second = await lead.get(path).query({ limit: 1, cursor: first.body.nextCursor })
  expect([first, second].map((page) => page.body.items[0].action)).toEqual(['project.renamed', 'project.described'])
})
