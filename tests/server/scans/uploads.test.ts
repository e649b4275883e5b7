import { createHash } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { ReadingMemory } from '../../../server/database/entities/ReadingMemory.js'
import { SourceFile } from '../../../server/database/entities/SourceFile.js'
import type { FileReading } from '../../../shared/contract/scans.js'
import { startApplication, type Application } from '../../support/application.js'
import { BOTH, BOTTOM, TOP, csvOf, laboratory } from './stack.js'

let application: Application
let projectId: string
let lab: ReturnType<typeof laboratory>
beforeAll(async () => {
  application = await startApplication()
  projectId = (await application.addProject('Uploads')).id
  lab = laboratory(application, projectId)
})
afterAll(() => application?.stop())

const manager = () => application.dataSource.manager
const withBytes = (id: string) =>
  manager().findOneOrFail(SourceFile, { where: { id }, select: { id: true, bytes: true, sha256: true, state: true } })

describe('an upload', () => {
  test('is kept byte for byte under its SHA-256, read, and written in the trail', async () => {
    const bytes = BOTH()
    const reading = await lab.upload(bytes, 'tonight °C.csv')
    const sha256 = createHash('sha256').update(bytes).digest('hex')

    expect(reading).toMatchObject({
      file: { name: 'tonight °C.csv', sizeBytes: bytes.length, sha256, state: 'uploaded', scanIds: [] },
      recognisedAs: null,
      mappingOrigin: 'proposed',
      problem: null,
      mapping: { wavelength: { column: 0, unit: 'nm' }, series: [{ column: 1 }, { column: 2 }] },
    })
    expect(reading.series.map((series) => series.curve.values)).toEqual([[...TOP.values], [...BOTTOM.values]])
    const kept = await withBytes(reading.file.id)
    expect(kept.bytes.equals(bytes)).toBe(true)
    expect(kept).toMatchObject({ sha256, state: 'uploaded' })
    const [event] = await manager().findBy(AuditEvent, { subjectId: reading.file.id })
    expect(event).toMatchObject({ action: 'source-file.uploaded', projectId, actorName: 'Test experimentalist' })

    const download = await application.as('collaborator').get(`${lab.base}/source-files/${reading.file.id}/content`)
    expect(download.status).toBe(200)
    expect(Buffer.from(download.body as Buffer).equals(bytes)).toBe(true)
    expect(download.headers['content-disposition']).toContain('attachment')
  })

  test('of the same bytes again is recognised under another name, and kept once', async () => {
    const bytes = csvOf({ EQE: TOP })
    const first = await lab.upload(bytes, 'first.csv')
    const second = await lab.upload(bytes, 'renamed.csv')
    expect(second.recognisedAs).toMatchObject({ id: first.file.id, name: 'first.csv' })
    expect(second.file.id).toBe(first.file.id)
    expect(await manager().countBy(SourceFile, { projectId, sha256: first.file.sha256 })).toBe(1)
  })

  test('of the same bytes in another project is a file of its own', async () => {
    const other = await application.addProject('Other uploads')
    const reading = await laboratory(application, other.id).upload(csvOf({ EQE: TOP }), 'first.csv')
    expect(reading.recognisedAs).toBeNull()
  })

  test('of the same bytes five times at once ends with one file', async () => {
    const bytes = csvOf({ EQE: BOTTOM })
    const readings = await Promise.all([1, 2, 3, 4, 5].map((i) => lab.upload(bytes, `copy ${i}.csv`)))
    expect(new Set(readings.map((reading) => reading.file.id)).size).toBe(1)
    expect(readings.filter((reading) => reading.recognisedAs === null)).toHaveLength(1)
    const events = await manager().findBy(AuditEvent, { subjectId: readings[0]!.file.id })
    expect(events.map((event) => event.action)).toEqual(['source-file.uploaded'])
  })

  test('of several files in one request gives their readings in order', async () => {
    const reply = await application
      .as('lead')
      .post(`${lab.base}/source-files`)
      .attach('files', csvOf({ 'EQE of A': TOP }), 'a.csv')
      .attach('files', csvOf({ 'EQE of B': BOTTOM }), 'b.csv')
      .expect(201)
    expect(reply.body.items.map((item: FileReading) => item.file.name)).toEqual(['a.csv', 'b.csv'])
  })

  test('can be discarded as long as nothing was made of it', async () => {
    const { file } = await lab.upload(csvOf({ 'EQE to discard': TOP }), 'mistake.csv')
    await application.as('designer').delete(`${lab.base}/source-files/${file.id}`).expect(403)
    await application.as('experimentalist').delete(`${lab.base}/source-files/${file.id}`).expect(200)
    expect(await manager().countBy(SourceFile, { id: file.id })).toBe(0)
    await application.as('experimentalist').get(`${lab.base}/source-files/${file.id}`).expect(404)

    const used = await lab.upload(csvOf({ 'EQE in use': TOP }), 'used.csv')
    await lab.confirm(used, await lab.tandem('User of a file'))
    const refused = await application.as('experimentalist').delete(`${lab.base}/source-files/${used.file.id}`)
    expect(refused.body).toMatchObject({ status: 409, code: 'STATE_CONFLICT' })
    expect(await manager().countBy(SourceFile, { id: used.file.id })).toBe(1)
  })

  test('is seen by nobody outside the project', async () => {
    const { file } = await lab.upload(csvOf({ 'EQE kept inside': TOP }), 'inside.csv')
    for (const path of ['', '/content'])
      await application.as('outsider').get(`${lab.base}/source-files/${file.id}${path}`).expect(404)
    const other = await application.addProject('Next door')
    await application.as('lead').get(`/api/projects/${other.id}/source-files/${file.id}/content`).expect(404)
  })
})

describe('a mapping', () => {
  test('is tried without saving anything', async () => {
    const { file, mapping } = await lab.upload(csvOf({ 'Run 1': TOP, 'Run 2': BOTTOM }), 'unnamed.csv')
    const swapped = {
      ...mapping!,
      series: [{ column: 2, quantity: 'eqe', unit: 'percent', label: 'the second' }],
    }
    const before = await withBytes(file.id)
    const reply = await application
      .as('experimentalist')
      .post(`${lab.base}/source-files/${file.id}/readings`)
      .send({ mapping: swapped })
      .expect(200)
    expect(reply.body).toMatchObject({ mappingOrigin: 'corrected', problem: null, mapping: swapped })
    expect(reply.body.series[0].curve.values[50]).toBeCloseTo(BOTTOM.values[50]! / 100, 12)
    expect(await withBytes(file.id)).toEqual(before)
    expect(await manager().countBy(ReadingMemory, { projectId })).toBeLessThan(10)
  })

  test('that fits nothing is answered with a sentence, beside the tables', async () => {
    const { file, mapping } = await lab.upload(csvOf({ 'Run 3': TOP }), 'narrow.csv')
    const wrong = { ...mapping!, wavelength: { column: 7, unit: 'nm' } }
    const reply = await application
      .as('experimentalist')
      .post(`${lab.base}/source-files/${file.id}/readings`)
      .send({ mapping: wrong })
      .expect(200)
    expect(reply.body.problem.reason).toMatch(/column/i)
    expect(reply.body.tables).toHaveLength(1)
    expect(reply.body.series).toEqual([])
  })

  test('is remembered for the next file of the same shape, in this project only', async () => {
    const device = await lab.tandem('Remembered')
    const first = await lab.upload(csvOf({ 'Channel A': TOP, 'Channel B': BOTTOM }), 'monday.csv')
    const corrected = {
      ...first.mapping!,
      series: [{ column: 2, quantity: 'eqe' as const, unit: 'percent' as const, label: 'only B' }],
    }
    await lab.confirm({ ...first, mapping: corrected }, device)

    const next = csvOf({ 'Channel A': BOTTOM, 'Channel B': TOP })
    const second = await lab.upload(next, 'tuesday.csv')

    expect(second).toMatchObject({ mappingOrigin: 'remembered', mapping: corrected })
    expect(second.series.map((series) => series.label)).toEqual(['only B'])
    const elsewhere = await application.addProject('Without memory')
    expect(await laboratory(application, elsewhere.id).upload(next, 'tuesday.csv')).toMatchObject({
      mappingOrigin: 'proposed',
    })
  })
})
