import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import type { Device } from '../../../shared/contract/devices.js'
import type { DeviceSummary, Matching } from '../../../shared/contract/matching.js'
import { photovoltaicGap } from '../../../shared/physics/bandGap.js'
import { coverage, shortCircuitCurrentDensity } from '../../../shared/physics/currents.js'
import { makeCurve } from '../../../shared/physics/curve.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'
import { startApplication, type Application } from '../../support/application.js'
import { BOTH, BOTTOM, REFLECTANCE, TOP, csvOf, laboratory } from '../scans/stack.js'

let application: Application
let projectId: string
let lab: ReturnType<typeof laboratory>
let measured: Device
beforeAll(async () => {
  application = await startApplication()
  projectId = (await application.addProject('Matching')).id
  lab = laboratory(application, projectId)
  measured = await lab.tandem('Measured')
  await lab.confirm(await lab.upload(BOTH(), 'both.csv'), measured)
  await lab.confirm(await lab.upload(csvOf({ Reflectance: REFLECTANCE }), 'r.csv'), measured)
})
afterAll(() => application?.stop())

const matchingOf = async (device: Device, query = ''): Promise<Matching> =>
  (await application.as('collaborator').get(`${lab.base}/devices/${device.id}/matching${query}`).expect(200)).body

describe('the currents of a series stack', () => {
  test.each(['AM1.5G', 'AM1.5D', 'AM0'] as const)('are the engine’s under %s', async (id) => {
    const spectrum = referenceSpectrum(id)
    const top = shortCircuitCurrentDensity(TOP, spectrum)
    const bottom = shortCircuitCurrentDensity(BOTTOM, spectrum)
    const low = Math.min(top, bottom)
    const high = Math.max(top, bottom)

    const matching = await matchingOf(measured, `?spectrum=${id}`)

    expect(matching.junctions.map((junction) => junction.jscMaCm2)).toEqual([top, bottom])
    expect(matching).toMatchObject({
      deviceId: measured.id,
      wiring: 'series',
      complete: true,
      missing: [],
      limitingJunction: top < bottom ? 1 : 2,
      jLimMaCm2: low,
      spectrum: { id, scaledToWM2: null, scaleFactor: 1 },
    })
    expect(matching.mismatchPercent).toBeCloseTo((100 * (high - low)) / low, 10)
    expect(matching.jMatchedMaCm2).toBeCloseTo((top + bottom) / 2, 10)
    expect(matching.gainOpenMaCm2).toBeCloseTo((top + bottom) / 2 - low, 10)
    expect(matching.pairs).toEqual([
      expect.objectContaining({ higher: top < bottom ? 2 : 1, lower: top < bottom ? 1 : 2 }),
    ])
    expect(matching.junctions[0]).toMatchObject({
      scanState: 'checked',
      points: 91,
      rangeNm: [300, 1200],
      coverage: coverage(TOP, spectrum),
      edgeResponse: { shortEqe: TOP.values[0], longEqe: TOP.values.at(-1) },
      gap: { inflectionEv: expect.closeTo(1239.84 / 740, 1) as number },
    })
    expect(matching.junctions[0]!.gap!.inflectionEv).toBe(photovoltaicGap(TOP).gap!.inflectionEv)
  })

  test('grow with the scaling of the spectrum, which is said', async () => {
    const plain = await matchingOf(measured)
    const scaled = await matchingOf(measured, '?spectrum=AM1.5G&scaleToWM2=500')
    expect(scaled.spectrum.scaledToWM2).toBe(500)
    expect(scaled.spectrum.scaleFactor).toBeCloseTo(500 / 1000.37, 5)
    scaled.junctions.forEach((junction, i) =>
      expect(junction.jscMaCm2).toBeCloseTo(plain.junctions[i]!.jscMaCm2! * scaled.spectrum.scaleFactor, 10),
    )
    expect(scaled.mismatchPercent).toBeCloseTo(plain.mismatchPercent!, 10)
  })

  test('are judged by nobody while a scan is missing, and that is said', async () => {
    const device = await lab.tandem('Half measured')
    await lab.confirm(await lab.upload(csvOf({ 'EQE half': TOP }), 'half.csv'), device)
    const matching = await matchingOf(device)
    expect(matching).toMatchObject({
      complete: false,
      missing: ['Junction 2 (bottom) has no scan yet: upload its EQE under bias light.'],
      limitingJunction: null,
      limitingJunctions: [],
      jLimMaCm2: null,
      mismatchPercent: null,
      pairs: [],
    })
    expect(matching.junctions.map((junction) => junction.jscMaCm2)).toEqual([
      shortCircuitCurrentDensity(TOP, referenceSpectrum('AM1.5G')),
      null,
    ])
  })

  test('that are exactly equal name both junctions and no single one', async () => {
    const device = await lab.tandem('Tied')
    await lab.confirm(await lab.upload(csvOf({ 'EQE tied': TOP, 'EQE tied too': TOP }), 'tied.csv'), device)
    expect(await matchingOf(device)).toMatchObject({
      limitingJunction: null,
      limitingJunctions: [1, 2],
      mismatchPercent: 0,
      gainOpenMaCm2: 0,
    })
  })

  test('with one junction in the dark name the scan, in place of a limit', async () => {
    const device = await lab.tandem('Dark')
    const dark = makeCurve(
      TOP.wavelengthNm,
      TOP.values.map(() => 0),
    )
    await lab.confirm(await lab.upload(csvOf({ 'EQE lit': TOP, 'EQE dark': dark }), 'dark.csv'), device)
    const matching = await matchingOf(device)
    expect(matching).toMatchObject({ complete: true, limitingJunction: null, mismatchPercent: null })
    expect(matching.missing).toEqual([
      'The scan of junction 2 (bottom) gives no current under this spectrum: exclude it, or choose another.',
    ])
  })
})

test('a 4-terminal device shows its currents and no matching', async () => {
  const device = await lab.tandem('Four terminals', '4-terminal')
  await lab.confirm(await lab.upload(csvOf({ 'EQE 4T a': TOP, 'EQE 4T b': BOTTOM }), '4t.csv'), device)
  const matching = await matchingOf(device)
  expect(matching).toMatchObject({
    wiring: 'independent',
    complete: true,
    missing: [],
    limitingJunction: null,
    mismatchPercent: null,
    pairs: [],
  })
  expect(matching.junctions.every((junction) => junction.jscMaCm2! > 10 && junction.excessMaCm2 === null)).toBe(true)
})

test('a truncated scan is a finding, with its numbers and place', async () => {
  const device = await lab.tandem('Truncated')
  const upTo = TOP.wavelengthNm.indexOf(700) + 1
  const rows = Array.from(TOP.wavelengthNm.slice(0, upTo), (nm, i) => `${nm},${TOP.values[i]}`)
  const bytes = Buffer.from(['Wavelength (nm),EQE', ...rows].join('\n'))
  const [scan] = await lab.confirm(await lab.upload(bytes, 'truncated.csv'), device)
  const matching = await matchingOf(device)
  expect(matching.worstFinding).toBe('caution')
  expect(matching.findings).toContainEqual(
    expect.objectContaining({ check: 'truncated-range', scanId: scan!.id, junctionPosition: 1, severity: 'caution' }),
  )
  const { numbers } = matching.findings.find((finding) => finding.check === 'truncated-range')!
  expect(numbers['responseAtEnd']).toEqual({ value: TOP.values[upTo - 1], unit: '' })
})

describe('the curves of a device', () => {
  test('are those of the scans in use, and the reflectance', async () => {
    const reply = await application.as('collaborator').get(`${lab.base}/devices/${measured.id}/curves`).expect(200)
    expect(reply.body.junctions).toMatchObject([
      { junctionId: measured.junctions[0]!.id, position: 1, curve: { values: [...TOP.values] } },
      { junctionId: measured.junctions[1]!.id, position: 2, curve: { values: [...BOTTOM.values] } },
    ])
    expect(reply.body.reflectance.curve).toEqual({
      wavelengthNm: [...REFLECTANCE.wavelengthNm],
      values: [...REFLECTANCE.values],
    })
  })

  test('of a device without scans are none', async () => {
    const device = await lab.tandem('Bare')
    const reply = await application.as('lead').get(`${lab.base}/devices/${device.id}/curves`).expect(200)
    expect(reply.body).toEqual({ junctions: [], reflectance: null })
  })
})

describe('the table of devices', () => {
  test('shows the same matching as the device page, and how many scans there are', async () => {
    const reply = await application.as('collaborator').get(`${lab.base}/devices?spectrum=AM0`).expect(200)
    const items = reply.body.items as DeviceSummary[]
    const row = items.find((item) => item.device.id === measured.id)!
    expect(row.matching).toEqual(await matchingOf(measured, '?spectrum=AM0'))
    expect(row.scanCount).toBe(3)
    expect(Date.parse(row.lastScanAt!)).toBeGreaterThan(Date.now() - 600_000)
  })

  test('asks the database as often for one device as for twenty', async () => {
    const count = async (name: string, devices: number) => {
      const project = await application.addProject(name)
      const own = laboratory(application, project.id)
      for (let i = 0; i < devices; i++) {
        const device = await own.tandem(`${name} ${i}`)
        await own.confirm(await own.upload(csvOf({ [`EQE ${i}`]: TOP }), `${i}.csv`), device)
      }
      const before = await questions()
      await application.as('lead').get(`${own.base}/devices`).expect(200)
      return (await questions()) - before
    }
    expect(await count('One', 1)).toBe(await count('Twenty', 20))
  })

  /** Statements that the server has run; the test has it to itself. */
  async function questions(): Promise<number> {
    const [row] = await application.dataSource.query("SHOW GLOBAL STATUS LIKE 'Questions'")
    return Number(row.Value)
  }
})

test('an outsider sees no currents, and an unknown spectrum is not found', async () => {
  for (const part of ['matching', 'curves'])
    await application.as('outsider').get(`${lab.base}/devices/${measured.id}/${part}`).expect(404)
  await application.as('outsider').get(`${lab.base}/devices`).expect(404)
  const reply = await application
    .as('lead')
    .get(`${lab.base}/devices/${measured.id}/matching?spectrum=01900000-0000-7000-8000-000000000000`)
  expect(reply.body).toMatchObject({ status: 404, details: { what: 'spectrum' } })
})
