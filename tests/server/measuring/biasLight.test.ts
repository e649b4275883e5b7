import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { Scan as ScanRow } from '../../../server/database/entities/Scan.js'
import type { BiasPlan } from '../../../shared/contract/biasPlan.js'
import type { BiasSeries } from '../../../shared/contract/biasSeries.js'
import type { Device } from '../../../shared/contract/devices.js'
import type { Scan } from '../../../shared/contract/scans.js'
import type { Unmixing } from '../../../shared/contract/unmixing.js'
import { makeCurve, type Curve } from '../../../shared/physics/curve.js'
import { shortCircuitCurrentDensity } from '../../../shared/physics/currents.js'
import { biasPhotocurrents } from '../../../shared/physics/measurement/biasLight.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'
import { startApplication, type Application } from '../../support/application.js'
import { BOTTOM, TOP, csvOf, laboratory } from '../scans/stack.js'

let application: Application
let lab: ReturnType<typeof laboratory>
beforeAll(async () => {
  application = await startApplication()
  lab = laboratory(application, (await application.addProject('Bias light')).id)
})
afterAll(() => application?.stop())

const bench = () => application.as('experimentalist')
const mixed = (own: Curve, other: Curve, share: number): Curve =>
  makeCurve(
    own.wavelengthNm,
    own.values.map((value, i) => (1 - share) * value + share * other.values[i]!),
  )
/** Gives far less current than the top cell, so that what leaks in shows in Jsc. */
const WEAK = makeCurve(
  BOTTOM.wavelengthNm,
  BOTTOM.values.map((value) => Math.round(0.6e5 * value) / 1e5),
)
const currentOf = (curve: Curve) => shortCircuitCurrentDensity(curve, referenceSpectrum('AM1.5G'))

async function scanOf(device: Device, place: number, curve: Curve, name: string, conditions = {}): Promise<Scan> {
  const [scan] = await lab.confirm(await lab.upload(csvOf({ [`EQE ${name}`]: curve }), `${name}.csv`), device, place)
  const body = { version: 1, label: name, conditions }
  return (await bench().put(`${lab.base}/scans/${scan!.id}/conditions`).send(body).expect(200)).body
}
const light = (irradianceWM2: number) => ({
  biasLight: [{ name: 'LED 470 nm', centreNm: 470, fwhmNm: 25, irradianceWM2 }],
  biasVoltageV: 1.1,
})

describe('a bias series', () => {
  let device: Device
  let scans: Scan[]
  let series: BiasSeries
  beforeAll(async () => {
    device = await lab.tandem('In steps')
    scans = []
    for (const [irradiance, leak] of [
      [20, 0.2],
      [60, 0.05],
      [120, 0.001],
      [200, 0],
      [300, 0.0005],
    ] as const)
      scans.push(await scanOf(device, 1, mixed(WEAK, TOP, leak), `bottom at ${irradiance} W`, light(irradiance)))
    await scanOf(device, 0, TOP, 'top of the series')
    const body = { name: 'Blue light', varied: 'irradiance', scanIds: scans.map(({ id }) => id) }
    series = (await bench().post(`${lab.base}/bias-series`).send(body).expect(201)).body
  })

  test('shows Jsc at every level, the plateau, and the scan to use', () => {
    expect(series.steps.map(({ level }) => level)).toEqual([20, 60, 120, 200, 300])
    expect(series.steps[3]!.jscMaCm2).toBeCloseTo(currentOf(WEAK), 3)
    expect(series.plateau).toMatchObject({ fromLevel: 120, toLevel: 300 })
    expect(series.proposedScanId).toBe(scans[3]!.id)
  })

  test('feeds the checks of its scans', async () => {
    const checks = async (scan: Scan) =>
      (await bench().get(`${lab.base}/scans/${scan.id}/checks`).expect(200)).body.findings.map(
        ({ check }: { check: string }) => check,
      )
    expect(await checks(scans[1]!)).toContain('not-on-plateau')
    expect(await checks(scans[3]!)).not.toContain('not-on-plateau')
    expect(await checks(scans[0]!)).toEqual(expect.arrayContaining(['leakage', 'missing-response']))
  })

  test('is of one junction; dissolved, it leaves its scans', async () => {
    const other = await lab.tandem('Other')
    const stranger = await scanOf(other, 1, WEAK, 'stranger', light(10))
    const body = { name: 'Mixed', varied: 'irradiance', scanIds: [scans[0]!.id, stranger.id] }
    const refused = await bench().post(`${lab.base}/bias-series`).send(body)
    expect(refused.body).toMatchObject({ code: 'INPUT_INVALID', errors: [{ path: ['scanIds'] }] })

    await bench().delete(`${lab.base}/bias-series/${series.id}`).expect(200)

    const rows = await application.dataSource.manager.findBy(ScanRow, { deviceId: device.id })
    expect(rows.map(({ biasSeriesId }) => biasSeriesId)).toEqual(rows.map(() => null))
    expect(rows).toHaveLength(6)
  })
})

describe('unmixing', () => {
  test('shows weights and currents, and is kept as a scan of its own with its parents', async () => {
    const device = await lab.tandem('Leaky')
    const top = await scanOf(device, 0, TOP, 'clean top')
    const bottom = await scanOf(device, 1, mixed(WEAK, TOP, 0.1), 'leaky bottom')
    const preview: Unmixing = (await bench().get(`${lab.base}/devices/${device.id}/unmixing`).expect(200)).body
    const shown = preview.junctions[1]!
    expect(shown.weights).toHaveLength(1)
    expect(shown.weights[0]!.weight).toBeCloseTo(0.1, 3)
    expect(Math.abs(shown.jscAfterMaCm2 / currentOf(WEAK) - 1)).toBeLessThan(0.005)
    expect(Math.abs(shown.jscBeforeMaCm2 / currentOf(WEAK) - 1)).toBeGreaterThan(0.01)

    const body = { junctionId: device.junctions[1]!.id, parentScanIds: [top.id, bottom.id] }
    const made: Scan = (await bench().post(`${lab.base}/devices/${device.id}/unmixing`).send(body).expect(201)).body

    expect(made).toMatchObject({
      origin: 'corrected',
      parentScanIds: [top.id, bottom.id],
      label: 'leaky bottom, unmixed',
    })
    const row = await application.dataSource.manager.findOneByOrFail(ScanRow, { id: made.id })
    expect([...row.values]).toEqual(shown.after.values)
    const original = await application.dataSource.manager.findOneByOrFail(ScanRow, { id: bottom.id })
    expect([...original.values]).toEqual(shown.before.values)
    expect(original).toMatchObject({ origin: 'eqe-file', version: bottom.version })
    const late = await bench().post(`${lab.base}/devices/${device.id}/unmixing`).send(body)
    expect(late.body).toMatchObject({ code: 'STATE_CONFLICT', details: { reason: 'scans-changed' } })
  })

  test('says what is missing', async () => {
    const device = await lab.tandem('Half measured')
    await scanOf(device, 0, TOP, 'only the top')
    const reply = await bench().get(`${lab.base}/devices/${device.id}/unmixing`).expect(200)
    expect(reply.body.junctions).toEqual([])
    expect(reply.body.problem).toBe('Unmixing needs a scan of every junction; junction 2 (bottom) has none.')
  })
})

describe('a bias plan', () => {
  const plan = (device: Device, body: object) => bench().post(`${lab.base}/devices/${device.id}/bias-plan`).send(body)
  test('needs light sources; with them it makes the junction limit, beside what the lab used', async () => {
    const device = await lab.tandem('Planned')
    await scanOf(device, 0, TOP, 'planned top')
    const bottom = await scanOf(device, 1, BOTTOM, 'planned bottom', light(150))
    const junctionId = device.junctions[1]!.id
    expect((await plan(device, { junctionId })).body).toMatchObject({ details: { reason: 'no-light-source' } })
    for (const [name, centreNm] of [
      ['Blue', 470],
      ['Infrared', 940],
    ] as const) {
      const content = { kind: 'led', centreNm, fwhmNm: 30, highestIrradianceWM2: 100 }
      await bench().post(`${lab.base}/light-sources`).send({ name, content }).expect(201)
    }

    const reply: BiasPlan = (await plan(device, { junctionId, couplingToNext: [0.3] }).expect(200)).body

    expect(reply).toMatchObject({ position: 2, isPossible: true })
    expect(reply.plan.sources).toMatchObject([
      { name: 'Blue', highestIrradianceWM2: 100 },
      { name: 'Infrared', irradianceWM2: 0 },
    ])
    expect(reply.plan.sources[0]!.irradianceWM2).toBeCloseTo(100, 6)
    const [top] = biasPhotocurrents([TOP], [{ centreNm: 470, fwhmNm: 30, irradianceWM2: 100 }])
    expect(reply.plan.photocurrentsMaCm2[0]).toBeCloseTo(top!, 6)
    expect(reply.plan.selectivities[1]).toBeGreaterThan(0.99)
    expect(reply.junctions.map(({ curveFrom, diode }) => [curveFrom, diode.from])).toEqual([
      ['measured', 'reciprocity'],
      ['measured', 'reciprocity'],
    ])
    expect(reply.used).toMatchObject({ scanId: bottom.id, evaluation: { biasVoltageV: 1.1, totalIrradianceWM2: 150 } })
    const limited: BiasPlan = (await plan(device, { junctionId, largestTotalWM2: 40 }).expect(200)).body
    expect(limited.plan.totalIrradianceWM2).toBeCloseTo(40, 6)
  })

  test('is estimated from the nominal gaps before anything was measured, and says so', async () => {
    const bare = await lab.tandem('Only a name')
    const junctionId = bare.junctions[0]!.id
    const refused = await plan(bare, { junctionId })
    expect(refused.body.detail).toMatch(/nominal gap of junction 1 \(top\)/)
    const body = {
      name: 'Only gaps',
      terminals: '2-terminal',
      junctions: [
        { label: 'top', nominalGapEv: 1.68 },
        { label: 'bottom', nominalGapEv: 1.12 },
      ],
    }
    const device: Device = (await application.as('lead').post(`${lab.base}/devices`).send(body).expect(201)).body
    const given = { saturationCurrentMaCm2: 1e-18, ideality: 1.2 }
    const reply: BiasPlan = (await plan(device, { junctionId: device.junctions[0]!.id, diodes: [given] }).expect(200))
      .body
    expect(reply.junctions.map(({ curveFrom }) => curveFrom)).toEqual(['estimated', 'estimated'])
    expect(reply.junctions[0]!.diode).toMatchObject({ ...given, from: 'given' })
    expect(reply.plan.sources.map(({ irradianceWM2 }) => Math.round(irradianceWM2))).toEqual([0, 100])
    expect(reply.used).toBeNull()
  })
})
