import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { Scan as ScanRow } from '../../../server/database/entities/Scan.js'
import { SourceFile } from '../../../server/database/entities/SourceFile.js'
import type { Device } from '../../../shared/contract/devices.js'
import type { Scan } from '../../../shared/contract/scans.js'
import { startApplication, type Application } from '../../support/application.js'
import { BOTTOM, TOP, csvOf, laboratory } from './stack.js'

let application: Application
let lab: ReturnType<typeof laboratory>
beforeAll(async () => {
  application = await startApplication()
  lab = laboratory(application, (await application.addProject('Decisions')).id)
})
afterAll(() => application?.stop())

const stored = (id: string) => application.dataSource.manager.findOneByOrFail(ScanRow, { id })
const trail = async (subjectId: string) =>
  (
    await application.dataSource.manager.find(AuditEvent, { where: { subjectId }, order: { at: 'ASC', id: 'ASC' } })
  ).map((event) => event.sentence)
const decide = (scan: Scan, body: object) =>
  application
    .as('experimentalist')
    .put(`${lab.base}/scans/${scan.id}/decision`)
    .send({ version: scan.version, ...body })
const usedBy = async (device: Device) =>
  (await application.as('lead').get(`${lab.base}/devices/${device.id}/matching`).expect(200)).body.junctions.map(
    (junction: { scanId: string | null; scanState: string | null }) => [junction.scanId, junction.scanState],
  )

/** A device with `count` scans of its top junction, oldest first. */
async function withTopScans(name: string, count: number): Promise<{ device: Device; scans: Scan[] }> {
  const device = await lab.tandem(name)
  const scans: Scan[] = []
  for (let i = 0; i < count; i++) {
    const reading = await lab.upload(csvOf({ [`EQE ${name} ${i}`]: TOP }), `${name} ${i}.csv`)
    scans.push(...(await lab.confirm(reading, device)))
  }
  return { device, scans }
}

describe('the scan in use', () => {
  test('is the latest accepted one, else the latest that is not excluded', async () => {
    const { device, scans } = await withTopScans('Standing', 3)
    const [first, second, third] = scans as [Scan, Scan, Scan]
    expect(await usedBy(device)).toEqual([
      [third.id, 'checked'],
      [null, null],
    ])

    await decide(first, { state: 'accepted', reason: 'clean' }).expect(200)
    expect(await usedBy(device)).toEqual([
      [first.id, 'accepted'],
      [null, null],
    ])

    await decide(second, { state: 'accepted' }).expect(200)
    expect(await usedBy(device)).toEqual([
      [second.id, 'accepted'],
      [null, null],
    ])

    await decide({ ...second, version: 2 }, { state: 'excluded', reason: 'the lamp drifted' }).expect(200)
    await decide({ ...first, version: 2 }, { state: 'checked' }).expect(200)
    expect(await usedBy(device)).toEqual([
      [third.id, 'checked'],
      [null, null],
    ])

    const list = await application.as('designer').get(`${lab.base}/scans?deviceId=${device.id}`).expect(200)
    expect(list.body.items.map((scan: Scan) => [scan.id, scan.inUse, scan.state])).toEqual([
      [third.id, true, 'checked'],
      [second.id, false, 'excluded'],
      [first.id, false, 'checked'],
    ])
  })
})

describe('a decision', () => {
  test('carries who, when and why, and can be taken back', async () => {
    const { scans } = await withTopScans('Decided', 1)
    const [scan] = scans as [Scan]
    const reply = await decide(scan, { state: 'excluded', reason: 'spot beside the cell.' }).expect(200)
    expect(reply.body).toMatchObject({
      state: 'excluded',
      version: 2,
      inUse: false,
      decision: { by: { id: application.people.experimentalist.id }, reason: 'spot beside the cell.' },
    })
    expect(await stored(scan.id)).toMatchObject({
      state: 'excluded',
      decisionReason: 'spot beside the cell.',
      version: 2,
    })

    const back = await decide({ ...scan, version: 2 }, { state: 'checked' }).expect(200)

    expect(back.body).toMatchObject({ state: 'checked', decision: null, inUse: true, version: 3 })
    expect(await trail(scan.id)).toEqual([
      `Test experimentalist excluded the scan ${scan.label} of Decided: spot beside the cell.`,
      `Test experimentalist took back the decision on the scan ${scan.label} of Decided.`,
    ])
  })

  test('to exclude needs a reason', async () => {
    const { scans } = await withTopScans('Without reason', 1)
    const reply = await decide(scans[0]!, { state: 'excluded', reason: ' ' })
    expect(reply.body).toMatchObject({ status: 400, errors: [{ path: ['reason'] }] })
    expect(await stored(scans[0]!.id)).toMatchObject({ state: 'checked', version: 1 })
  })

  test('of two at once on the same version one counts, the other sees it', async () => {
    const { scans } = await withTopScans('Disputed', 1)
    const [scan] = scans as [Scan]
    const replies = await Promise.all([
      decide(scan, { state: 'accepted', reason: 'good' }),
      decide(scan, { state: 'excluded', reason: 'bad' }),
    ])
    expect(replies.map((reply) => reply.status).sort()).toEqual([200, 409])
    const [won] = replies.filter((reply) => reply.status === 200)
    const [lost] = replies.filter((reply) => reply.status === 409)
    expect(lost!.body).toMatchObject({
      code: 'STALE_VERSION',
      details: { sentVersion: 1, currentVersion: 2, current: { state: won!.body.state, version: 2 } },
    })
    expect(await stored(scan.id)).toMatchObject({ state: won!.body.state, version: 2 })
    expect(await trail(scan.id)).toHaveLength(1)
  })
})

describe('conditions', () => {
  test('are corrected under a new version; a stale correction changes nothing', async () => {
    const { scans } = await withTopScans('Corrected', 1)
    const [scan] = scans as [Scan]
    const save = (version: number, label: string) =>
      application
        .as('experimentalist')
        .put(`${lab.base}/scans/${scan.id}/conditions`)
        .send({ version, label, conditions: { chopperHz: 133, note: 'second lamp' } })
    const saved = await save(1, 'top, second lamp').expect(200)
    expect(saved.body).toMatchObject({ version: 2, label: 'top, second lamp', conditions: { chopperHz: 133 } })
    const stale = await save(1, 'too late')
    expect(stale.body).toMatchObject({
      status: 409,
      details: { currentVersion: 2, current: { label: 'top, second lamp' } },
    })
    const row = await stored(scan.id)
    expect(row).toMatchObject({ label: 'top, second lamp', version: 2 })
    expect(row.conditions).toMatchObject({ chopperHz: 133, note: 'second lamp', biasLight: [] })
    expect(row.values).toEqual(TOP.values)
  })

  test('of a chopper near the mains show as a finding', async () => {
    const { scans } = await withTopScans('Near mains', 1)
    const [scan] = scans as [Scan]
    const reply = await application
      .as('lead')
      .put(`${lab.base}/scans/${scan.id}/conditions`)
      .send({ version: 1, label: scan.label, conditions: { chopperHz: 100.2 } })
      .expect(200)
    expect(scan.worstFinding).toBeNull()
    expect(reply.body.worstFinding).toBe('caution')
  })
})

describe('a deleted scan', () => {
  test('is gone from results and lists, frees its file, and comes back', async () => {
    const { device, scans } = await withTopScans('Deleted', 1)
    const [scan] = scans as [Scan]
    await application.as('experimentalist').delete(`${lab.base}/scans/${scan.id}`).expect(200)
    expect(await usedBy(device)).toEqual([
      [null, null],
      [null, null],
    ])
    await application.as('lead').get(`${lab.base}/scans/${scan.id}`).expect(404)
    const file = await application.dataSource.manager.findOneByOrFail(SourceFile, { id: scan.sourceFile.id })
    expect(file.state).toBe('uploaded')
    const deleted = await application.as('lead').get(`${lab.base}/scans?deleted=yes&deviceId=${device.id}`).expect(200)
    expect(deleted.body.items).toMatchObject([{ id: scan.id, inUse: false }])

    const back = await application.as('experimentalist').post(`${lab.base}/scans/${scan.id}/restoration`).expect(200)

    expect(back.body).toMatchObject({ id: scan.id, inUse: true, deletedAt: null })
    expect(await usedBy(device)).toEqual([
      [scan.id, 'checked'],
      [null, null],
    ])
    expect((await trail(scan.id)).map((sentence) => sentence.split(' ')[2])).toEqual(['deleted', 'brought'])
  })

  test('cannot come back after thirty days, nor to a device that is deleted', async () => {
    const { device, scans } = await withTopScans('Not back', 1)
    const [scan] = scans as [Scan]
    const restore = () => application.as('experimentalist').post(`${lab.base}/scans/${scan.id}/restoration`)
    await application.as('experimentalist').delete(`${lab.base}/scans/${scan.id}`).expect(200)
    await application.as('lead').delete(`${lab.base}/devices/${device.id}`).expect(200)
    expect((await restore()).body).toMatchObject({ status: 409, details: { reason: 'device-deleted' } })
    const longAgo = new Date(Date.now() - 31 * 86_400_000)
    await application.dataSource.manager.update(ScanRow, { id: scan.id }, { deletedAt: longAgo })
    await restore().expect(404)
  })

  test('cannot come back to a junction that was taken out', async () => {
    const { device, scans } = await withTopScans('Junction gone', 1)
    const [scan] = scans as [Scan]
    const save = () =>
      application
        .as('lead')
        .put(`${lab.base}/devices/${device.id}`)
        .send({
          ...pick(device),
          junctions: [{ label: 'another top' }, { id: device.junctions[1]!.id, label: 'bottom' }],
        })
    const refused = await save()
    expect(refused.body).toMatchObject({ status: 400, errors: [{ path: ['junctions'] }] })
    expect(refused.body.detail).toContain('Junction 1 (top) still has 1 scan')
    await application.as('experimentalist').delete(`${lab.base}/scans/${scan.id}`).expect(200)
    await save().expect(200)
    const reply = await application.as('experimentalist').post(`${lab.base}/scans/${scan.id}/restoration`)
    expect(reply.body).toMatchObject({ status: 409, details: { reason: 'junction-gone' } })
  })
})

test('the scans of a deleted device are not listed, and are back with it', async () => {
  const { device } = await withTopScans('Whole device', 2)
  const count = async () =>
    (await application.as('lead').get(`${lab.base}/scans?deviceId=${device.id}`).expect(200)).body.total as number
  expect(await count()).toBe(2)
  await application.as('lead').delete(`${lab.base}/devices/${device.id}`).expect(200)
  expect(await count()).toBe(0)
  await application.as('lead').post(`${lab.base}/devices/${device.id}/restoration`).expect(200)
  expect(await count()).toBe(2)
})

test('scans come newest first, page after page', async () => {
  const project = await application.addProject('Pages of scans')
  const own = laboratory(application, project.id)
  const device = await own.tandem('Many scans')
  const made: string[] = []
  for (let i = 0; i < 5; i++)
    made.push((await own.confirm(await own.upload(csvOf({ [`EQE ${i}`]: BOTTOM }), `${i}.csv`), device, 1))[0]!.id)
  const seen: string[] = []
  let cursor: string | null = ''
  while (cursor !== null) {
    const reply = await application
      .as('lead')
      .get(`${own.base}/scans?limit=2${cursor && `&cursor=${cursor}`}`)
      .expect(200)
    expect(reply.body.total).toBe(5)
    seen.push(...reply.body.items.map((scan: Scan) => scan.id))
    cursor = reply.body.nextCursor as string | null
  }
  expect(seen).toEqual(made.reverse())
})

function pick({ name, terminals, version }: Device) {
  return { name, terminals, version }
}
