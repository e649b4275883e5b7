import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { RawMeasurement } from '../../../server/database/entities/RawMeasurement.js'
import { Scan as ScanRow } from '../../../server/database/entities/Scan.js'
import { SourceFile } from '../../../server/database/entities/SourceFile.js'
import type { Detector } from '../../../shared/contract/bench.js'
import type { Device } from '../../../shared/contract/devices.js'
import type { RawReduction, RawScan } from '../../../shared/contract/rawPasses.js'
import { PHOTON_ENERGY_NM_EV } from '../../../shared/physics/constants.js'
import { startApplication, type Application } from '../../support/application.js'
import { REFLECTANCE, TOP, csvOf, laboratory } from '../scans/stack.js'

let application: Application
let lab: ReturnType<typeof laboratory>
let device: Device
let detector: Detector
let reduction: RawReduction
beforeAll(async () => {
  application = await startApplication()
  lab = laboratory(application, (await application.addProject('Raw')).id)
  device = await lab.tandem('Raw tandem')
  const calibration = await lab.upload(
    table('Responsivity (A/W)', (nm) => [responsivity(nm)]),
    'calibration.csv',
  )
  const content = { sourceFileId: calibration.file.id, mapping: calibration.mapping, calibratedOn: '2026-03-16' }
  const reply = await bench().post(`${lab.base}/detectors`).send({ name: 'Photodiode S-07', content }).expect(201)
  detector = reply.body
  reduction = await rawReduction()
})
afterAll(() => application?.stop())

const bench = () => application.as('experimentalist')
const manager = () => application.dataSource.manager
const GRID = [...TOP.wavelengthNm]
const truth = (i: number) => TOP.values[i]!

/** The truth of a made-up bench: lamp, detector, lock-in phase, a dark offset, a lamp that drifts between the passes. */
const responsivity = (nm: number) => 0.2 + nm / 4000
const lamp = (nm: number) => 1e-6 * (1 + 0.3 * Math.sin(nm / 90))
const drift = (nm: number) => 1.05 - nm / 40_000
const PHASE = 0.6
const DARK = { x: 2e-4, y: -1e-4 }
const AREAS = { referenceCm2: 0.36, deviceCm2: 0.09 }
const GAINS = { device: 2e5, reference: 1e5 }

function table(headers: string, row: (nm: number, i: number) => number[]): Buffer {
  return Buffer.from(
    [`Wavelength (nm),${headers}`, ...GRID.map((nm, i) => [nm, ...row(nm, i)].join(',')), ''].join('\n'),
  )
}

/** Both passes as they would be read off the lock-in: the device by X and Y over a dark, the reference by magnitude. */
async function rawReduction(): Promise<RawReduction> {
  const dut = table('X (V),Y (V),Monitor (V),Dark X (V),Dark Y (V)', (nm, i) => {
    const signal =
      GAINS.device *
      lamp(nm) *
      drift(nm) *
      (AREAS.deviceCm2 / AREAS.referenceCm2) *
      ((truth(i) * nm) / PHOTON_ENERGY_NM_EV)
    return [signal * Math.cos(PHASE) + DARK.x, signal * Math.sin(PHASE) + DARK.y, drift(nm), DARK.x, DARK.y]
  })
  const reference = table('Magnitude (V),Monitor (V)', (nm) => [GAINS.reference * lamp(nm) * responsivity(nm), 1])
  const [first, second] = [await lab.upload(dut, 'dut.csv'), await lab.upload(reference, 'reference.csv')]
  const place = { sheet: null, tableIndex: 0, wavelength: { column: 0, unit: 'nm' as const } }
  return {
    device: {
      ...place,
      sourceFileId: first.file.id,
      signal: { inPhase: 1, quadrature: 2 },
      dark: { inPhase: 4, quadrature: 5 },
      monitor: 3,
      gain: { transimpedanceVA: GAINS.device },
    },
    reference: {
      ...place,
      sourceFileId: second.file.id,
      signal: { magnitude: 1 },
      dark: null,
      monitor: 2,
      gain: { shuntOhm: GAINS.reference },
    },
    detectorId: detector.id,
    overfilled: AREAS,
    corrections: [{ name: 'temperature', factor: 1 }],
  }
}

function expectTruth(values: readonly number[], factor = 1): void {
  expect(values).toHaveLength(GRID.length)
  values.forEach((value, i) => expect(Math.abs(value - factor * truth(i))).toBeLessThan(1e-6))
}

test('a detector keeps its calibration as EQE, whatever unit the file has', () => {
  expect(detector.content).toMatchObject({ calibratedOn: '2026-03-16', rangeNm: [300, 1200] })
  const { wavelengthNm, values } = detector.content.curve
  wavelengthNm.forEach((nm, i) => expect(values[i]).toBeCloseTo((responsivity(nm) * PHOTON_ENERGY_NM_EV) / nm, 12))
})

describe('raw passes', () => {
  test('come back to the truth in a preview that saves nothing', async () => {
    const before = await manager().count(ScanRow)
    const reply = await application.as('collaborator').post(`${lab.base}/raw-previews`).send({ reduction }).expect(200)
    expectTruth(reply.body.eqe.values)
    expect(reply.body.factors).toMatchObject({ areaRatio: 4, correction: 1, deviceGainVA: 2e5, referenceGainVA: 1e5 })
    expect(reply.body.factors.monitorRatio[0]).toBeCloseTo(1 / drift(300), 12)
    expect(reply.body.iqe).toBeNull()
    expect(await manager().count(ScanRow)).toBe(before)
  })

  test('become a scan with its raw columns; a factor can be corrected, and IQE comes with a reflectance', async () => {
    const body = { reduction, deviceId: device.id, junctionId: device.junctions[0]!.id, conditions: {} }
    const made: RawScan = (await bench().post(`${lab.base}/raw-scans`).send(body).expect(201)).body
    expect(made.scan).toMatchObject({ origin: 'raw', quantity: 'eqe', inUse: true, version: 1, points: GRID.length })
    expect(made.reduced.remarks.join(' ')).toMatch(/No IQE: the device has no reflectance scan/)
    const stored = await manager().findOneByOrFail(ScanRow, { id: made.scan.id })
    expectTruth([...stored.values])
    const raw = await manager().findOneByOrFail(RawMeasurement, { scanId: made.scan.id })
    expect(Object.keys(raw.deviceColumns.byColumn)).toEqual(['1', '2', '3', '4', '5'])
    expect(raw.deviceColumns.byColumn['4']).toEqual(GRID.map(() => DARK.x))
    for (const sourceFileId of [reduction.device.sourceFileId, reduction.reference.sourceFileId]) {
      expect(await manager().findOneByOrFail(SourceFile, { id: sourceFileId })).toMatchObject({ state: 'read' })
      const refused = await bench().delete(`${lab.base}/source-files/${sourceFileId}`)
      expect(refused.body).toMatchObject({ code: 'STATE_CONFLICT', details: { reason: 'file-in-use' } })
    }
    const checks = await bench().get(`${lab.base}/scans/${made.scan.id}/checks`).expect(200)
    expect(checks.body.passed.map(({ check }: { check: string }) => check)).toContain('phase-wanders')

    await lab.confirm(await lab.upload(csvOf({ Reflectance: REFLECTANCE }), 'r.csv'), device)
    const corrected = { ...reduction, corrections: [{ name: 'shadow', factor: 1.02 }] }
    const reply = await bench()
      .put(`${lab.base}/scans/${made.scan.id}/raw`)
      .send({ version: 1, reduction: corrected })
      .expect(200)

    expect(reply.body.scan.version).toBe(2)
    expectTruth(reply.body.reduced.eqe.values, 1.02)
    reply.body.reduced.iqe.values.forEach((iqe: number, i: number) =>
      expect(iqe).toBeCloseTo((1.02 * truth(i)) / (1 - REFLECTANCE.values[i]!), 5),
    )
    expectTruth([...(await manager().findOneByOrFail(ScanRow, { id: made.scan.id })).values], 1.02)
    const stale = await bench().put(`${lab.base}/scans/${made.scan.id}/raw`).send({ version: 1, reduction })
    expect(stale.body.code).toBe('STALE_VERSION')
    const matching = await bench().get(`${lab.base}/devices/${device.id}/matching`).expect(200)
    expect(matching.body.junctions[0].jscMaCm2).toBeGreaterThan(0)
  })

  test.each<[string, (raw: RawReduction) => object, RegExp]>([
    [
      'a column is not there',
      (raw) => ({ ...raw, device: { ...raw.device, monitor: 9 } }),
      /names column J, but the table has A, B, C, D, E, F/,
    ],
    [
      'the reference saw no light',
      (raw) => ({ ...raw, reference: { ...raw.reference, dark: raw.reference.signal } }),
      /the reference detector must see light/,
    ],
  ])('are refused when %s', async (_, change, sentence) => {
    const reply = await bench()
      .post(`${lab.base}/raw-previews`)
      .send({ reduction: change(reduction) })
    expect([400, 422]).toContain(reply.status)
    expect(reply.body.detail).toMatch(sentence)
  })

  test('a detector that a colleague renames or deletes leaves the scan as it was', async () => {
    const scan = await manager().findOneByOrFail(ScanRow, { origin: 'raw' })
    await bench().delete(`${lab.base}/detectors/${detector.id}`).expect(200)
    const reply = await bench().get(`${lab.base}/scans/${scan.id}/raw`).expect(200)
    expect(reply.body.detectorName).toBe('Photodiode S-07')
    expectTruth(reply.body.reduced.eqe.values, 1.02)
  })
})
