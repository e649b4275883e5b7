import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { Scan } from '../../../server/database/entities/Scan.js'
import { SourceFile } from '../../../server/database/entities/SourceFile.js'
import type { Device } from '../../../shared/contract/devices.js'
import { startApplication, type Application } from '../../support/application.js'
import { BOTH, BOTTOM, REFLECTANCE, TOP, confirmation, csvOf, laboratory } from './stack.js'

let application: Application
let projectId: string
let lab: ReturnType<typeof laboratory>
let device: Device
beforeAll(async () => {
  application = await startApplication()
  projectId = (await application.addProject('Confirmations')).id
  lab = laboratory(application, projectId)
  device = await lab.tandem('Confirmed')
})
afterAll(() => application?.stop())

const manager = () => application.dataSource.manager
const scansOf = (deviceId: string) => manager().find(Scan, { where: { deviceId }, order: { id: 'ASC' } })
const send = (fileId: string, body: object) =>
  application.as('experimentalist').post(`${lab.base}/source-files/${fileId}/scans`).send(body)

test('makes scans with curve, mapping and conditions, bound to the file', async () => {
  const reading = await lab.upload(BOTH(), 'both.csv')
  const body = confirmation(reading, device)
  const conditions = {
    biasLight: [{ name: 'LED 940 nm', centreNm: 940, fwhmNm: 50, irradianceWM2: 80 }],
    biasVoltageV: 0.68,
    chopperHz: 133,
    operator: 'T. Tester',
    measuredOn: '2026-11-24',
  }
  const reply = await send(reading.file.id, {
    ...body,
    scans: body.scans.map((scan) => ({ ...scan, conditions })),
  }).expect(201)

  expect(reply.body.items).toMatchObject([
    {
      quantity: 'eqe',
      junctionId: device.junctions[0]!.id,
      points: 91,
      rangeNm: [300, 1200],
      state: 'checked',
      decision: null,
      inUse: true,
      sourceFile: { id: reading.file.id, name: 'both.csv', sha256: reading.file.sha256 },
      uploadedBy: { id: application.people.experimentalist.id },
      version: 1,
    },
    { junctionId: device.junctions[1]!.id, inUse: true },
  ])
  expect(reply.body.items[0].conditions).toMatchObject({ ...conditions, temperatureC: null, note: '' })
  const [top, bottom] = await scansOf(device.id)
  expect(top).toMatchObject({ sourceFileId: reading.file.id, sourceColumn: 1, mapping: reading.mapping, version: 1 })
  expect(top!.wavelengthNm).toEqual(TOP.wavelengthNm)
  expect([top!.values, bottom!.values]).toEqual([TOP.values, BOTTOM.values])
  const events = await manager().findBy(AuditEvent, { subjectId: reading.file.id, action: 'scan.created' })
  expect(events.map((event) => event.sentence)).toEqual([
    'Test experimentalist made 2 scans of Confirmed from both.csv.',
  ])
  const again = await application.as('collaborator').get(`${lab.base}/source-files/${reading.file.id}`).expect(200)
  expect(again.body.file).toMatchObject({ state: 'read', scanIds: [top!.id, bottom!.id] })
  const one = await application.as('collaborator').get(`${lab.base}/scans/${top!.id}`).expect(200)
  expect(one.body.curve.values).toEqual([...TOP.values])
})

test('a reflectance belongs to the device', async () => {
  const target = await lab.tandem('With reflectance')
  const reading = await lab.upload(csvOf({ Reflectance: REFLECTANCE }), 'reflectance.csv')
  const [scan] = await lab.confirm(reading, target)
  expect(scan).toMatchObject({ quantity: 'reflectance', junctionId: null, inUse: true, worstFinding: null })
})

describe('is refused whole, with the place that is wrong, when', () => {
  let other: Device
  let elsewhere: Device
  let files = 0
  beforeAll(async () => {
    other = await lab.tandem('Other device')
    const project = await application.addProject('Foreign')
    elsewhere = await laboratory(application, project.id).tandem('Of another project')
  })
  type Body = ReturnType<typeof confirmation>
  const second = (change: object) => (body: Body) => ({
    ...body,
    scans: [body.scans[0]!, { ...body.scans[1]!, ...change }],
  })

  test.each<[string, (body: Body) => object, (string | number)[], RegExp]>([
    [
      'a junction belongs to another device',
      (body) => second({ junctionId: other.junctions[0]!.id })(body),
      ['scans', 1, 'junctionId'],
      /not a junction of Confirmed/,
    ],
    [
      'the device belongs to another project',
      (body) => second({ deviceId: elsewhere.id, junctionId: elsewhere.junctions[0]!.id })(body),
      ['scans', 1, 'deviceId'],
      /not a device of this project/,
    ],
    ['no junction is given', second({ junctionId: null }), ['scans', 1, 'junctionId'], /which junction of Confirmed/],
    ['a column is not mapped', second({ column: 9 }), ['scans', 1, 'column'], /Column 10 is not one/],
    ['a column is given twice', second({ column: 1 }), ['scans', 1, 'column'], /given twice/],
    [
      'an EQE is called a reflectance',
      second({ quantity: 'reflectance', junctionId: null }),
      ['scans', 1, 'quantity'],
      /reads column 3 as eqe/,
    ],
    ['no scan is asked for', (body) => ({ ...body, scans: [] }), ['scans'], /which column/],
  ])('%s', async (title, change, path, sentence) => {
    const reading = await lab.upload(csvOf({ 'EQE top': TOP, [`EQE bottom ${++files}`]: BOTTOM }), `${title}.csv`)
    const before = (await scansOf(device.id)).length
    const reply = await send(reading.file.id, change(confirmation(reading, device)))
    expect(reply.body).toMatchObject({ status: 400, code: 'INPUT_INVALID', errors: [{ path }] })
    expect(reply.body.errors[0].message).toMatch(sentence)
    expect(await scansOf(device.id)).toHaveLength(before)
    expect(await manager().findOneByOrFail(SourceFile, { id: reading.file.id })).toMatchObject({ state: 'uploaded' })
    expect(await manager().countBy(AuditEvent, { subjectId: reading.file.id, action: 'scan.created' })).toBe(0)
  })

  test('the mapping cannot read the file', async () => {
    const reading = await lab.upload(csvOf({ 'EQE not read': TOP }), 'not-read.csv')
    const body = confirmation(reading, device)
    const reply = await send(reading.file.id, {
      ...body,
      mapping: { ...body.mapping, wavelength: { column: 5, unit: 'nm' } },
    })
    expect(reply.body).toMatchObject({ status: 422, code: 'FILE_UNREADABLE', details: { fileName: 'not-read.csv' } })
    expect(await manager().countBy(Scan, { sourceFileId: reading.file.id })).toBe(0)
  })

  test('the same column was confirmed for the junction before, or at the same moment', async () => {
    const target = await lab.tandem('Confirmed twice')
    const reading = await lab.upload(csvOf({ 'EQE twice': TOP }), 'twice.csv')
    const body = confirmation(reading, target)
    const replies = await Promise.all([send(reading.file.id, body), send(reading.file.id, body)])
    expect(replies.map((reply) => reply.status).sort()).toEqual([201, 400])
    const late = await send(reading.file.id, body)
    expect(late.body.errors).toMatchObject([{ path: ['scans', 0, 'column'] }])
    expect(await scansOf(target.id)).toHaveLength(1)
  })
})
