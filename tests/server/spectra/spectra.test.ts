import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { SourceFile } from '../../../server/database/entities/SourceFile.js'
import { Spectrum as SpectrumRow } from '../../../server/database/entities/Spectrum.js'
import type { FileReading } from '../../../shared/contract/scans.js'
import type { Spectrum } from '../../../shared/contract/spectra.js'
import { shortCircuitCurrentDensity } from '../../../shared/physics/currents.js'
import { makeCurve } from '../../../shared/physics/curve.js'
import { makeSpectrum } from '../../../shared/physics/spectrum.js'
import { startApplication, type Application } from '../../support/application.js'
import { BOTH, TOP, laboratory } from '../scans/stack.js'

let application: Application
let projectId: string
let base: string
beforeAll(async () => {
  application = await startApplication()
  projectId = (await application.addProject('Spectra')).id
  base = `/api/projects/${projectId}`
})
afterAll(() => application?.stop())

const manager = () => application.dataSource.manager
/** A simulator of straight lines: 0.8 W m⁻² nm⁻¹ from 350 to 900 nm, falling to 0.2 at 1200 nm. */
const LAMP = { nm: [350, 900, 1200], irradiance: [0.8, 0.8, 0.2] }
const LAMP_TOTAL_WM2 = 0.8 * 550 + 0.5 * 300

async function uploaded(title: string): Promise<FileReading> {
  const rows = LAMP.nm.map((nm, i) => `${nm},${LAMP.irradiance[i]}`)
  const bytes = Buffer.from([`# ${title}`, 'Wavelength (nm),Irradiance (W/m2/nm)', ...rows, ''].join('\n'))
  const reply = await application
    .as('designer')
    .post(`${base}/spectrum-files`)
    .attach('files', bytes, `${title}.csv`)
    .expect(201)
  return reply.body.items[0] as FileReading
}
async function made(name: string): Promise<Spectrum> {
  const { file, mapping } = await uploaded(name)
  const body = { sourceFileId: file.id, name, mapping }
  return (await application.as('designer').post(`${base}/spectra`).send(body).expect(201)).body as Spectrum
}

test('the reference spectra are there for everybody, with the totals of their tables', async () => {
  const reply = await application.as('collaborator').get(`${base}/spectra`).expect(200)
  expect(
    reply.body.items.map((item: Spectrum) => [item.id, item.kind, item.points, item.totalIrradianceWM2.toFixed(2)]),
  ).toEqual([
    ['AM1.5G', 'reference', 2002, '1000.37'],
    ['AM1.5D', 'reference', 2002, '900.14'],
    ['AM0', 'reference', 1441, '1354.24'],
  ])
  const one = await application.as('collaborator').get(`${base}/spectra/AM0`).expect(200)
  expect(one.body.curve.wavelengthNm).toHaveLength(1441)
  expect(one.body.spectrum.source).toContain('ASTM E490-00a')
})

describe('a spectrum of the project', () => {
  test('is made of an uploaded file and serves results, scaled if one wants', async () => {
    const spectrum = await made('Simulator A')
    expect(spectrum).toMatchObject({ kind: 'uploaded', source: 'Simulator A.csv', points: 3, rangeNm: [350, 1200] })
    expect(spectrum.totalIrradianceWM2).toBeCloseTo(LAMP_TOTAL_WM2, 9)
    const row = await manager().findOneByOrFail(SpectrumRow, { id: String(spectrum.id) })
    expect([...row.values]).toEqual(LAMP.irradiance)
    expect(await manager().findOneByOrFail(SourceFile, { id: row.sourceFileId })).toMatchObject({ state: 'read' })
    const [event] = await manager().findBy(AuditEvent, { subjectId: String(spectrum.id) })
    expect(event).toMatchObject({
      action: 'spectrum.created',
      sentence: 'Test designer made the spectrum Simulator A of Simulator A.csv.',
    })

    const lab = laboratory(application, projectId)
    const device = await lab.tandem('Under the lamp')
    await lab.confirm(await lab.upload(BOTH(), 'both.csv'), device)
    const lamp = makeSpectrum({ id: 'lamp', name: 'lamp', curve: makeCurve(LAMP.nm, LAMP.irradiance) })
    const plain = await application
      .as('collaborator')
      .get(`${base}/devices/${device.id}/matching?spectrum=${spectrum.id}`)
      .expect(200)
    expect(plain.body.junctions[0].jscMaCm2).toBeCloseTo(shortCircuitCurrentDensity(TOP, lamp), 10)
    const scaled = await application
      .as('collaborator')
      .get(`${base}/devices?spectrum=${spectrum.id}&scaleToWM2=1000`)
      .expect(200)
    const { matching } = scaled.body.items[0]
    expect(matching.spectrum).toMatchObject({ id: spectrum.id, name: 'Simulator A', scaledToWM2: 1000 })
    expect(matching.spectrum.scaleFactor).toBeCloseTo(1000 / LAMP_TOTAL_WM2, 10)
    expect(matching.junctions[0].jscMaCm2).toBeCloseTo((plain.body.junctions[0].jscMaCm2 * 1000) / LAMP_TOTAL_WM2, 9)
  })

  test('needs a name of its own', async () => {
    await made('Taken')
    const { file, mapping } = await uploaded('another file')
    for (const name of ['Taken', 'AM1.5G']) {
      const reply = await application.as('lead').post(`${base}/spectra`).send({ sourceFileId: file.id, name, mapping })
      expect(reply.body).toMatchObject({
        status: 409,
        code: 'ALREADY_EXISTS',
        details: { what: 'spectrum', field: 'name', value: name },
      })
    }
    expect(await manager().countBy(SpectrumRow, { sourceFileId: file.id })).toBe(0)
    expect(await manager().findOneByOrFail(SourceFile, { id: file.id })).toMatchObject({ state: 'uploaded' })
  })

  test('cannot be made of an EQE, nor of a negative irradiance', async () => {
    const eqe = await laboratory(application, projectId).upload(BOTH(), 'eqe.csv')
    const reply = await application
      .as('designer')
      .post(`${base}/spectra`)
      .send({ sourceFileId: eqe.file.id, name: 'No spectrum', mapping: eqe.mapping })
    expect(reply.body).toMatchObject({ status: 400, errors: [{ path: ['mapping', 'series'] }] })

    const bytes = Buffer.from('Wavelength (nm),Irradiance (W/m2/nm)\n400,0.5\n500,-0.1\n600,0.4\n')
    const negative = await application
      .as('designer')
      .post(`${base}/spectrum-files`)
      .attach('files', bytes, 'negative.csv')
      .expect(201)
    const [{ file, mapping }] = negative.body.items
    const refused = await application
      .as('designer')
      .post(`${base}/spectra`)
      .send({ sourceFileId: file.id, name: 'Negative', mapping })
    expect(refused.status).toBe(400)
    expect(refused.body.detail).toMatch(/-0\.1/)
    expect(await manager().countBy(SpectrumRow, { projectId, name: 'Negative' })).toBe(0)
  })

  test('can be deleted; its file stays, and a reference spectrum stays too', async () => {
    const spectrum = await made('Short-lived')
    const { sourceFileId } = await manager().findOneByOrFail(SpectrumRow, { id: String(spectrum.id) })
    await application.as('collaborator').delete(`${base}/spectra/${spectrum.id}`).expect(403)
    await application.as('designer').delete(`${base}/spectra/${spectrum.id}`).expect(200)
    expect(await manager().countBy(SpectrumRow, { id: String(spectrum.id) })).toBe(0)
    expect(await manager().findOneByOrFail(SourceFile, { id: sourceFileId })).toMatchObject({ state: 'uploaded' })
    await application.as('lead').get(`${base}/spectra/${spectrum.id}`).expect(404)
    const reply = await application.as('lead').delete(`${base}/spectra/AM1.5G`)
    expect(reply.body).toMatchObject({ status: 409, code: 'STATE_CONFLICT' })
  })

  test('is unknown outside its project', async () => {
    const spectrum = await made('Private')
    await application.as('outsider').get(`${base}/spectra/${spectrum.id}`).expect(404)
    const other = await application.addProject('Another')
    await application.as('lead').get(`/api/projects/${other.id}/spectra/${spectrum.id}`).expect(404)
  })
})
