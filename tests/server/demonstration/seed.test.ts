import { afterAll, beforeAll, expect, test } from 'vitest'
import type { DeviceSummary } from '../../../shared/contract/matching.js'
import { shortCircuitCurrentDensity } from '../../../shared/physics/currents.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'
import { Scan } from '../../../server/database/entities/Scan.js'
import { SourceFile } from '../../../server/database/entities/SourceFile.js'
import { User } from '../../../server/database/entities/User.js'
import { makeDataSource } from '../../../server/database/dataSource.js'
import { databaseOf, type Database } from '../../../server/database/transaction.js'
import { inventedDevices } from '../../../server/demonstration/devices.js'
import { seedDemonstration } from '../../../server/demonstration/seed.js'
import type { Actor } from '../../../server/services/actor.js'
import { listBenchItems } from '../../../server/services/bench/benchItems.js'
import { listBiasSeries } from '../../../server/services/biasSeries/biasSeries.js'
import { listDevices } from '../../../server/services/matching/listDevices.js'
import { listProjects } from '../../../server/services/projects/listProjects.js'
import { listScans } from '../../../server/services/scans/listScans.js'
import { listScenarios } from '../../../server/services/scenarios/listScenarios.js'
import { listSourceFiles } from '../../../server/services/scans/listSourceFiles.js'
import { emptyDatabase, type EmptyDatabase } from '../../support/database.js'

let empty: EmptyDatabase
let dataSource: ReturnType<typeof makeDataSource>
let database: Database
let designer: Actor
let projects: { id: string; name: string }[]
beforeAll(async () => {
  empty = await emptyDatabase()
  dataSource = await makeDataSource(empty.url).initialize()
  await dataSource.runMigrations()
  database = databaseOf(dataSource)
  await seedDemonstration(database)
  const user = await dataSource.manager.findOneByOrFail(User, { email: 'oskar@fennmoor.example' })
  designer = { personId: user.id, name: user.name, email: user.email, isAdministrator: false }
  projects = (await listProjects(database, designer, { limit: 10, include: 'active' })).items
})
afterAll(async () => {
  await dataSource?.destroy()
  await empty?.drop()
})

const projectNamed = (word: string) => projects.find((project) => project.name.includes(word))!.id
async function devicesOf(word: string): Promise<DeviceSummary[]> {
  const query = { limit: 100, spectrum: 'AM1.5G' as const }
  return (await listDevices(database, designer, projectNamed(word), query)).items
}

test('the thickness split moves the limit from the top to the bottom cell', async () => {
  const split = (await devicesOf('thickness')).filter(({ device }) => device.name.startsWith('Split'))
  expect(split.map(({ device }) => device.name)).toEqual([
    'Split 360 nm',
    'Split 420 nm',
    'Split 480 nm',
    'Split 540 nm',
  ])
  expect(split.every(({ matching }) => matching.complete)).toBe(true)
  expect(split.at(0)!.matching.limitingJunction).toBe(1)
  expect(split.at(-1)!.matching.limitingJunction).toBe(2)
  const top = split.map(({ matching }) => matching.junctions[0]!.jscMaCm2!)
  expect(top).toEqual([...top].sort((a, b) => a - b))
})

test('currents are those of the invented devices, within noise and the rounding of the files', async () => {
  const spectrum = referenceSpectrum('AM1.5G')
  const shown = await devicesOf('thickness')
  for (const { name, truth } of inventedDevices().split) {
    const { matching } = shown.find(({ device }) => device.name === name)!
    truth.eqes.forEach((eqe, i) =>
      expect(matching.junctions[i]!.jscMaCm2).toBeCloseTo(shortCircuitCurrentDensity(eqe, spectrum, 300, 1200), 0.7),
    )
  }
})

test('the bad device has findings of the highest severity, the good ones none of it', async () => {
  const devices = await devicesOf('thickness')
  const bad = devices.find(({ device }) => device.name.startsWith('Repeat'))!
  expect(bad.matching.worstFinding).toBe('reject')
  expect(bad.matching.findings.map((finding) => finding.check)).toEqual(
    expect.arrayContaining(['bias-light-too-weak', 'chopper-near-mains', 'leakage']),
  )
  for (const { device, matching } of devices.filter((one) => one !== bad))
    expect([device.name, matching.findings]).toEqual([device.name, []])
})

test('the bad device has the three faults that were made, and no others', async () => {
  const bad = (await devicesOf('thickness')).find(({ device }) => device.name.startsWith('Repeat'))!
  const found = bad.matching.findings.map(({ check, junctionPosition }) => `${check} ${junctionPosition}`).sort()
  expect(found).toEqual(['bias-light-too-weak 1', 'chopper-near-mains 1', 'chopper-near-mains 2', 'leakage 2'])
})

test('the bench has sources, a detector and a set-up, and the bias series shows its plateau', async () => {
  const projectId = projectNamed('thickness')
  const sources = await listBenchItems(database, designer, projectId, 'light-source')
  expect(sources.items.map(({ name }) => name)).toEqual(['LED 470 nm', 'LED 625 nm', 'LED 850 nm', 'LED 940 nm'])
  const [setUp] = (await listBenchItems(database, designer, projectId, 'set-up')).items
  expect(setUp!.content).toMatchObject({ referenceDetector: 'Silicon photodiode S-07', chopperHz: 133 })
  const [series] = (await listBiasSeries(database, designer, projectId, undefined)).items
  expect(series!.steps.map(({ level }) => level)).toEqual([15, 50, 110, 200])
  expect(series!.plateau).not.toBeNull()
  expect(series!.steps.at(-1)!.isOnPlateau).toBe(true)
})

test('the triple shows three currents with the germanium far above', async () => {
  const [triple] = await devicesOf('triple')
  expect(triple!.matching.junctions).toHaveLength(3)
  expect(triple!.matching.junctions[2]!.excessPercent).toBeGreaterThan(50)
  expect(triple!.matching.pairs).toHaveLength(3)
})

test('scans carry conditions and decisions, and one file waits to be confirmed', async () => {
  const projectId = projectNamed('thickness')
  const { items } = await listScans(database, designer, projectId, { limit: 200, deleted: 'no' })
  const excluded = items.filter((scan) => scan.state === 'excluded')
  expect(excluded).toHaveLength(1)
  expect(excluded[0]).toMatchObject({ inUse: false, decision: { by: { name: 'Ilva Torrin' } } })
  expect(excluded[0]!.decision!.reason).toMatch(/spot/i)
  expect(items.filter((scan) => scan.state === 'accepted')).toHaveLength(6)
  expect(items.filter((scan) => scan.quantity === 'eqe' && scan.conditions.biasLight.length === 0)).toEqual([])
  const waiting = await listSourceFiles(database, designer, projectId, { limit: 200, state: 'uploaded' })
  expect(waiting.items.map((file) => file.name)).toEqual(['FT-24-04_Top_second-pass.csv'])
  expect(await dataSource.manager.count(SourceFile)).toBe(18)
})

test('the designer put two questions to the thinnest tandem, and both still hold', async () => {
  const thinnest = (await devicesOf('thickness')).find(({ device }) => device.name === 'Split 360 nm')
  const { items } = await listScenarios(database, designer, projectNamed('thickness'), thinnest!.device.id)
  expect(items.map(({ name, stale }) => [name, stale.changed])).toEqual([
    ['Top cell 440 nm', []],
    ['Top gap 1.66 eV', []],
  ])
  for (const { result, madeBy } of items) {
    expect(result.measured.limitingJunctions).toEqual([1])
    expect(result.changed.jLimMaCm2!).toBeGreaterThan(result.measured.jLimMaCm2!)
    expect(madeBy.name).toBe(designer.name)
  }
})

test('a database with people in it is left alone', async () => {
  const before = await dataSource.manager.count(Scan)
  await seedDemonstration(database)
  expect(await dataSource.manager.count(Scan)).toBe(before)
  expect(await dataSource.manager.count(User)).toBe(5)
})
