import { afterAll, beforeAll, expect, test } from 'vitest'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { BenchItem } from '../../../server/database/entities/BenchItem.js'
import { startApplication, type Application } from '../../support/application.js'

let application: Application
let base: string
beforeAll(async () => {
  application = await startApplication()
  base = `/api/projects/${(await application.addProject('Bench')).id}`
})
afterAll(() => application?.stop())

const as = (who: 'designer' | 'experimentalist' | 'collaborator') => application.as(who)
const led = { kind: 'led', centreNm: 940, fwhmNm: 50, highestIrradianceWM2: 200, note: '' }
const stored = (id: string) => application.dataSource.manager.findOneBy(BenchItem, { id })

test('a light source is added, changed by version, and deleted, with a sentence each', async () => {
  const body = { name: 'LED 940 nm', content: led }
  const added = (await as('designer').post(`${base}/light-sources`).send(body).expect(201)).body
  expect(added).toMatchObject({ name: 'LED 940 nm', version: 1, content: led })
  const twice = await as('designer').post(`${base}/light-sources`).send(body)
  expect(twice.body).toMatchObject({ code: 'ALREADY_EXISTS', details: { field: 'name', value: 'LED 940 nm' } })

  const change = { version: 1, name: 'LED 940 nm, new driver', content: { ...led, highestIrradianceWM2: 350 } }
  await as('experimentalist').put(`${base}/light-sources/${added.id}`).send(change).expect(200)
  const stale = await as('designer').put(`${base}/light-sources/${added.id}`).send(change)
  expect(stale.body).toMatchObject({ code: 'STALE_VERSION', details: { current: { name: change.name, version: 2 } } })
  expect(await stored(added.id)).toMatchObject({ version: 2, content: { highestIrradianceWM2: 350 } })

  await as('designer').delete(`${base}/light-sources/${added.id}`).expect(200)
  expect(await stored(added.id)).toBeNull()
  const events = await application.dataSource.manager.find(AuditEvent, {
    where: { subjectId: added.id },
    order: { at: 'ASC', id: 'ASC' },
  })
  expect(events.map(({ sentence }) => sentence)).toEqual([
    'Test designer added the light source LED 940 nm.',
    'Test experimentalist changed the light source LED 940 nm, new driver.',
    'Test designer deleted the light source LED 940 nm, new driver.',
  ])
})

test('a band that reaches zero wavelength is refused with the place', async () => {
  const reply = await as('designer')
    .post(`${base}/light-sources`)
    .send({ name: 'Too wide', content: { ...led, centreNm: 400, fwhmNm: 400 } })
  expect(reply.body).toMatchObject({ code: 'INPUT_INVALID', errors: [{ path: ['content', 'fwhmNm'] }] })
})

test('a set-up names a detector of this project only, and fills in what is left out', async () => {
  const content = { biasLight: [{ name: 'LED 940 nm', irradianceWM2: 120 }], biasVoltageV: 0.68, chopperHz: 133 }
  const made = await as('experimentalist').post(`${base}/set-ups`).send({ name: 'Top cells', content }).expect(201)
  expect(made.body.content).toMatchObject({ ...content, temperatureC: null, deviceGain: null, filterChangesNm: [] })
  const listed = await as('collaborator').get(`${base}/set-ups`).expect(200)
  expect(listed.body.items.map(({ name }: { name: string }) => name)).toEqual(['Top cells'])
  const foreign = await as('experimentalist')
    .post(`${base}/set-ups`)
    .send({ name: 'Foreign', content: { detectorId: made.body.id } })
  expect(foreign.body).toMatchObject({ code: 'NOT_FOUND', details: { what: 'reference detector' } })
})
