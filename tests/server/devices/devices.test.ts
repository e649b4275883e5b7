import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { Device } from '../../../server/database/entities/Device.js'
import { Junction } from '../../../server/database/entities/Junction.js'
import { Layer } from '../../../server/database/entities/Layer.js'
import { startApplication, type Application } from '../../support/application.js'

let application: Application
let path: string
let projectId: string
beforeAll(async () => {
  application = await startApplication()
  projectId = (await application.addProject('Devices')).id
  path = `/api/projects/${projectId}/devices`
})
afterAll(() => application?.stop())

const tandem = (name: string) => ({
  name,
  sampleId: 'FM-0412',
  series: 'top-cell thickness',
  terminals: '2-terminal',
  apertureAreaCm2: 1.02,
  junctions: [
    { label: 'perovskite', absorber: 'mixed-halide perovskite', nominalGapEv: 1.68, thicknessNm: 480 },
    { label: 'silicon', absorber: 'c-Si', nominalGapEv: 1.12 },
  ],
  layers: [
    { name: 'coating', material: 'MgF2', thicknessNm: 100 },
    { name: 'absorber', material: 'perovskite', thicknessNm: 480, junctionIndex: 0 },
  ],
})
const stored = (id: string) => application.dataSource.manager.findOneByOrFail(Device, { id })
const junctionsOf = (deviceId: string) =>
  application.dataSource.manager.find(Junction, { where: { deviceId }, order: { position: 'ASC' } })
const sentencesAbout = async (subjectId: string) =>
  (
    await application.dataSource.manager.find(AuditEvent, { where: { subjectId }, order: { at: 'ASC', id: 'ASC' } })
  ).map(({ action, sentence }) => `${action}: ${sentence}`)
async function described(name: string) {
  const reply = await application.as('designer').post(path).send(tandem(name)).expect(201)
  return reply.body as { id: string; version: number; junctions: { id: string; label: string }[] }
}

describe('describing a device', () => {
  test('keeps its junctions and layers in order from the sunward side', async () => {
    const device = await described('A 480 nm')
    expect(device).toMatchObject({
      projectId,
      name: 'A 480 nm',
      sampleId: 'FM-0412',
      apertureAreaCm2: 1.02,
      deviceAreaCm2: null,
      version: 1,
      deletedAt: null,
      junctions: [
        { position: 1, label: 'perovskite', nominalGapEv: 1.68, thicknessNm: 480 },
        { position: 2, label: 'silicon', nominalGapEv: 1.12, thicknessNm: null },
      ],
      layers: [
        { position: 1, name: 'coating', junctionIndex: null },
        { position: 2, name: 'absorber', junctionIndex: 0 },
      ],
    })
    expect(await stored(device.id)).toMatchObject({ projectId, terminals: '2-terminal', series: 'top-cell thickness' })
    expect((await junctionsOf(device.id)).map(({ label }) => label)).toEqual(['perovskite', 'silicon'])
    expect(await application.dataSource.manager.countBy(Layer, { deviceId: device.id })).toBe(2)
    expect(await sentencesAbout(device.id)).toEqual(['device.created: Test designer described the device A 480 nm.'])
  })

  test.each([
    [
      'three junctions in a two-junction stack',
      { junctions: ['a', 'b', 'c'].map((label) => ({ label })) },
      ['junctions'],
    ],
    ['a blank name', { name: ' ' }, ['name']],
    ['an area of nothing', { apertureAreaCm2: 0 }, ['apertureAreaCm2']],
    ['a junction without label', { junctions: [{ label: '' }, { label: 'b' }] }, ['junctions', 0, 'label']],
    [
      'a layer of a junction that is not there',
      { layers: [{ name: 'absorber', junctionIndex: 3 }] },
      ['layers', 0, 'junctionIndex'],
    ],
    [
      "another device's junction",
      { junctions: [{ id: '01900000-0000-7000-8000-000000000000', label: 'a' }, { label: 'b' }] },
      ['junctions', 0, 'id'],
    ],
  ])('refuses %s, names the field and makes nothing', async (_, change, at) => {
    const before = await application.dataSource.manager.count(Device)
    const reply = await application
      .as('designer')
      .post(path)
      .send({ ...tandem('Refused'), ...change })
    expect(reply.body).toMatchObject({ status: 400, code: 'INPUT_INVALID' })
    expect(reply.body.errors[0].path).toEqual(at)
    expect(await application.dataSource.manager.count(Device)).toBe(before)
  })

  test('an outsider finds nothing, a collaborator may not', async () => {
    const device = await described('Guarded')
    for (const call of [
      application.as('outsider').get(`${path}/${device.id}`),
      application.as('outsider').post(path).send(tandem('By an outsider')),
      application.as('outsider').delete(`${path}/${device.id}`),
    ])
      expect((await call).body).toMatchObject({ status: 404, code: 'NOT_FOUND' })
    const refused = await application.as('collaborator').delete(`${path}/${device.id}`)
    expect(refused.body).toMatchObject({ status: 403, details: { right: 'edit-devices' } })
    expect(await stored(device.id)).toMatchObject({ deletedAt: null })
  })

  test('a device of another project is not found under this one', async () => {
    const device = await described('Elsewhere')
    const other = await application.addProject('Another')
    const reply = await application.as('lead').get(`/api/projects/${other.id}/devices/${device.id}`)
    expect(reply.body).toMatchObject({ status: 404, details: { what: 'device' } })
  })
})

describe('saving a device', () => {
  test('turns the order of the junctions round and keeps their ids', async () => {
    const device = await described('Turned')
    const [top, bottom] = device.junctions
    const reply = await application
      .as('experimentalist')
      .put(`${path}/${device.id}`)
      .send({ ...tandem('Turned round'), version: 1, junctions: [{ ...pick(bottom!) }, { ...pick(top!) }], layers: [] })
      .expect(200)
    expect(reply.body).toMatchObject({ name: 'Turned round', version: 2, layers: [] })
    expect((await junctionsOf(device.id)).map(({ id, position }) => [id, position])).toEqual([
      [bottom!.id, 1],
      [top!.id, 2],
    ])
    expect(await application.dataSource.manager.countBy(Layer, { deviceId: device.id })).toBe(0)
    expect((await sentencesAbout(device.id)).at(-1)).toBe(
      'device.updated: Test experimentalist changed the description of Turned and renamed it to Turned round.',
    )
  })

  test('a third junction comes in and goes again', async () => {
    const device = await described('Growing')
    const grown = await application
      .as('lead')
      .put(`${path}/${device.id}`)
      .send({
        ...tandem('Growing'),
        version: 1,
        terminals: '3-junction',
        junctions: [{ label: 'new top' }, ...device.junctions.map(pick)],
      })
      .expect(200)
    expect(grown.body.junctions.map((junction: { label: string }) => junction.label)).toEqual([
      'new top',
      'perovskite',
      'silicon',
    ])
    const back = await application
      .as('lead')
      .put(`${path}/${device.id}`)
      .send({ ...tandem('Growing'), version: 2, junctions: device.junctions.map(pick) })
      .expect(200)
    expect(back.body.junctions.map(pick)).toEqual(device.junctions.map(pick))
    expect(await junctionsOf(device.id)).toHaveLength(2)
  })

  test('of two saves of the same version at once one wins, the other sees both versions', async () => {
    const device = await described('At once')
    const save = (name: string) =>
      application
        .as('designer')
        .put(`${path}/${device.id}`)
        .send({ ...tandem(name), version: 1, junctions: device.junctions.map(pick) })
    const replies = await Promise.all([save('First'), save('Second')])
    const won = replies.find((reply) => reply.status === 200)
    const lost = replies.find((reply) => reply.status === 409)
    expect(won?.body.version).toBe(2)
    expect(lost?.body).toMatchObject({
      code: 'STALE_VERSION',
      details: { sentVersion: 1, currentVersion: 2, current: { name: won?.body.name, version: 2 } },
    })
    expect(await stored(device.id)).toMatchObject({ name: won?.body.name, version: 2 })
    expect(await sentencesAbout(device.id)).toHaveLength(2)
  })
})

describe('deleting a device', () => {
  test('takes it out of the list, and it can be brought back', async () => {
    const device = await described('Gone and back')
    await application.as('designer').delete(`${path}/${device.id}`).expect(200)
    await application.as('lead').get(`${path}/${device.id}`).expect(404)
    const list = await application.as('lead').get(path).expect(200)
    expect(list.body.items.map((item: { device: { id: string } }) => item.device.id)).not.toContain(device.id)
    const deleted = await application.as('collaborator').get(`/api/projects/${projectId}/deleted-devices`).expect(200)
    expect(deleted.body.items[0]).toMatchObject({ id: device.id, name: 'Gone and back' })

    const restored = await application.as('designer').post(`${path}/${device.id}/restoration`).expect(200)

    expect(restored.body).toMatchObject({ id: device.id, deletedAt: null })
    await application.as('lead').get(`${path}/${device.id}`).expect(200)
    expect((await sentencesAbout(device.id)).slice(1)).toEqual([
      'device.deleted: Test designer deleted the device Gone and back.',
      'device.restored: Test designer brought the device Gone and back back.',
    ])
  })

  test('after thirty days there is nothing to bring back', async () => {
    const device = await described('Long gone')
    await application.as('designer').delete(`${path}/${device.id}`).expect(200)
    const thirtyOneDaysAgo = new Date(Date.now() - 31 * 86_400_000)
    await application.dataSource.manager.update(Device, { id: device.id }, { deletedAt: thirtyOneDaysAgo })
    await application.as('designer').post(`${path}/${device.id}/restoration`).expect(404)
    const deleted = await application.as('lead').get(`/api/projects/${projectId}/deleted-devices`).expect(200)
    expect(deleted.body.items.map((item: { id: string }) => item.id)).not.toContain(device.id)
  })
})

describe('the list of devices', () => {
  test('goes by name, page after page, and says the total', async () => {
    const { id } = await application.addProject('Pages')
    const devices = `/api/projects/${id}/devices`
    for (const name of ['delta', 'Alpha', 'charlie', 'bravo', 'bravo'])
      await application.as('lead').post(devices).send(tandem(name)).expect(201)
    const names: string[] = []
    let cursor: string | null = ''
    while (cursor !== null) {
      const reply = await application
        .as('lead')
        .get(`${devices}?limit=2${cursor && `&cursor=${cursor}`}`)
        .expect(200)
      expect(reply.body.total).toBe(5)
      names.push(...reply.body.items.map((item: { device: { name: string } }) => item.device.name))
      cursor = reply.body.nextCursor as string | null
    }
    expect(names).toEqual(['Alpha', 'bravo', 'bravo', 'charlie', 'delta'])
    const wrong = await application.as('lead').get(`${devices}?cursor=nonsense`)
    expect(wrong.body).toMatchObject({ status: 400, errors: [{ path: ['cursor'] }] })
  })
})

function pick({ id, label }: { id: string; label: string }) {
  return { id, label }
}
