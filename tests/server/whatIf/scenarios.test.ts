import { read, utils } from 'xlsx'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import type { Device } from '../../../shared/contract/devices.js'
import { float64Bits, type Scenario as ScenarioReply } from '../../../shared/contract/scenarios.js'
import type { OpticalDescription, WhatIfModel } from '../../../shared/contract/whatIf.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'
import { compileDevice, evaluate } from '../../../shared/physics/whatIf/index.js'
import { whatIfInput } from '../../../shared/whatIf/whatIfInput.js'
import { AuditEvent } from '../../../server/database/entities/AuditEvent.js'
import { Scenario } from '../../../server/database/entities/Scenario.js'
import { startApplication, type Application } from '../../support/application.js'
import { BOTH, BOTTOM, TOP, csvOf, laboratory } from '../scans/stack.js'

const DESCRIPTION: OpticalDescription = {
  junctions: [
    {
      thicknessNm: 500,
      pathFactor: 1,
      absorber: { bandGapEv: 1.68, alpha0PerCm: 150_000, urbachMev: 15 },
      externalRadiativeEfficiency: 0.001,
    },
    {
      thicknessNm: 160_000,
      pathFactor: 1,
      absorber: { material: 'si-green-2008' },
      externalRadiativeEfficiency: 0.001,
    },
  ],
  layers: [],
}
const CHANGE = { '1.thicknessNm': 560 }
const THICKER = { name: 'Thicker top', reason: 'The top cell limits.', change: CHANGE }

let application: Application
let lab: ReturnType<typeof laboratory>
let device: Device
let opticsPath: string
beforeAll(async () => {
  application = await startApplication()
  lab = laboratory(application, (await application.addProject('What if')).id)
  device = await lab.tandem('Tandem')
  await lab.confirm(await lab.upload(BOTH(), 'both.csv'), device)
  opticsPath = `${lab.base}/devices/${device.id}/what-if`
})
afterAll(() => application?.stop())

const designer = () => application.as('designer')
const scenariosPath = () => `${lab.base}/devices/${device.id}/scenarios`
const save = async (body: object): Promise<ScenarioReply> =>
  (await designer().post(scenariosPath()).send(body).expect(201)).body
const inDatabase = (id: string) => application.dataSource.manager.findOneByOrFail(Scenario, { id })
const computedHere = () =>
  evaluate(
    compileDevice(whatIfInput(DESCRIPTION, [TOP, BOTTOM], referenceSpectrum('AM1.5G').curve, 'beer-lambert')),
    CHANGE,
  ).currentsMaCm2

describe('the optical description', () => {
  test('follows from the stack, with its assumptions, until somebody saves one', async () => {
    const derived: WhatIfModel = (await application.as('collaborator').get(opticsPath).expect(200)).body
    expect(derived.version).toBe(0)
    expect(derived.description.junctions).toHaveLength(2)
    expect(derived.assumptions).toContain('Junction 1 (top) states no thickness: 500 nm is assumed.')

    const saved: WhatIfModel = (
      await designer().put(opticsPath).send({ version: 0, description: DESCRIPTION }).expect(200)
    ).body
    expect(saved).toEqual({ deviceId: device.id, description: DESCRIPTION, assumptions: [], version: 1 })
    expect((await designer().get(opticsPath).expect(200)).body).toEqual(saved)
    const stale = await designer().put(opticsPath).send({ version: 0, description: DESCRIPTION }).expect(409)
    expect(stale.body).toMatchObject({ code: 'STALE_VERSION', details: { sentVersion: 0, currentVersion: 1 } })
  })

  test('names as many junctions as the device has', async () => {
    const three = { ...DESCRIPTION, junctions: [...DESCRIPTION.junctions, DESCRIPTION.junctions[0]] }
    const reply = await designer().put(opticsPath).send({ version: 1, description: three }).expect(400)
    expect(reply.body.detail).toBe('Tandem has 2 junctions; 3 are described.')
  })
})

describe('a scenario', () => {
  test('is computed again by the server and agrees to the last bit', async () => {
    const currents = [...computedHere()]
    const scenario = await save({ ...THICKER, claimed: float64Bits(currents) })
    expect(scenario.result.changed.currentsMaCm2).toEqual(currents)
    expect(scenario).toMatchObject({ ...THICKER, model: 'beer-lambert', stale: { changed: [] }, version: 1 })
    const { measured, changed } = scenario.result
    expect(changed.mismatchPercent).toBeCloseTo(
      (100 * (Math.max(...currents) - changed.jLimMaCm2!)) / changed.jLimMaCm2!,
      9,
    )
    expect(changed.power!.efficiency).not.toBe(measured.power!.efficiency)
    expect(changed.power!.fillFactor).toBeGreaterThan(0.7)
    const row = await inDatabase(scenario.id)
    expect(row.change).toEqual(CHANGE)
    expect(float64Bits(row.result.changed.currentsMaCm2)).toBe(float64Bits(currents))
    expect(row.inputs.scans.map((one) => one.position)).toEqual([1, 2])
    const audit = await application.dataSource.manager.findOneByOrFail(AuditEvent, { subjectId: scenario.id })
    expect(audit.sentence).toBe('Test designer saved the scenario Thicker top of Tandem.')
  })

  test('is refused, and nothing kept, where one bit differs from what was seen', async () => {
    const before = await application.dataSource.manager.count(Scenario)
    const [top, bottom] = computedHere()
    const claimed = float64Bits([top! * (1 + Number.EPSILON), bottom!])
    const reply = await designer()
      .post(scenariosPath())
      .send({ ...THICKER, claimed })
      .expect(409)
    expect(reply.body).toMatchObject({ code: 'STATE_CONFLICT', details: { reason: 'result-differs' } })
    expect(await application.dataSource.manager.count(Scenario)).toBe(before)
  })

  test('is refused with the engine’s sentence for a key that the device does not have', async () => {
    const reply = await designer()
      .post(scenariosPath())
      .send({ ...THICKER, change: { '3.thicknessNm': 1 } })
      .expect(400)
    expect(reply.body.detail).toMatch(/"3\.thicknessNm" is no parameter of this device; it has 1\.thicknessNm/)
  })

  test('is renamed, deleted and brought back, its numbers untouched', async () => {
    const made = await save(THICKER)
    const path = `${lab.base}/scenarios/${made.id}`
    const words = { name: 'Thicker by 60 nm', reason: 'As the run sheet allows.' }
    const renamed = (
      await designer()
        .patch(path)
        .send({ version: 1, ...words })
        .expect(200)
    ).body
    expect(renamed).toEqual({ ...made, ...words, version: 2 })
    await designer()
      .patch(path)
      .send({ version: 1, ...words })
      .expect(409)
    await designer().delete(path).expect(200)
    await designer().get(path).expect(404)
    expect((await inDatabase(made.id)).deletedAt).not.toBeNull()
    expect((await designer().post(`${path}/restoration`).expect(200)).body).toEqual(renamed)
    expect((await application.as('collaborator').get(path).expect(200)).body).toEqual(renamed)
  })

  test('goes beside the others into a spreadsheet and a CSV with numbers and units', async () => {
    const { items } = (await designer().get(scenariosPath()).expect(200)).body as { items: ScenarioReply[] }
    const reply = await designer().get(`${scenariosPath()}/file?format=xlsx`).responseType('blob').expect(200)
    const book = read(reply.body as Buffer)
    const [header, ...rows] = utils.sheet_to_json<(string | number)[]>(book.Sheets.Scenarios!, { header: 1 })
    expect(rows).toHaveLength(items.length)
    expect(rows[0]![header!.indexOf('changed J1 (mA/cm²)')]).toBe(items[0]!.result.changed.currentsMaCm2[0])
    const csv = await designer().get(`${scenariosPath()}/file?format=csv`).expect(200)
    expect(csv.text).toContain('measured J_lim (mA/cm²)')
    expect(csv.text).toContain(items[0]!.name)
  })

  test('says that another scan stands for a junction since', async () => {
    const made = await save(THICKER)
    const again = csvOf({ 'EQE top': { ...TOP, values: TOP.values.map((value) => 0.98 * value) } })
    await lab.confirm(await lab.upload(again, 'again.csv'), device)
    const shown: ScenarioReply = (await designer().get(`${lab.base}/scenarios/${made.id}`).expect(200)).body
    expect(shown.stale.changed).toEqual(['Another scan stands for junction 1 (top) than when the scenario was made.'])
    expect(shown.result).toEqual(made.result)
  })

  test('needs a scan of every junction', async () => {
    const bare = await lab.tandem('Bare')
    const reply = await designer().post(`${lab.base}/devices/${bare.id}/scenarios`).send(THICKER).expect(409)
    expect(reply.body.detail).toMatch(/^Junction 1 \(top\) has no scan yet/)
  })
})

test('the library gives every material with its source and caveat', async () => {
  const { items } = (await application.as('collaborator').get(`${lab.base}/materials`).expect(200)).body
  expect(items).toHaveLength(11)
  for (const { source, caveat, wavelengthNm, n, k } of items) {
    expect(source.length).toBeGreaterThan(10)
    expect(caveat.length).toBeGreaterThan(10)
    expect([n.length, k.length]).toEqual([wavelengthNm.length, wavelengthNm.length])
  }
})
