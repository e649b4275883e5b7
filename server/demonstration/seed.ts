import type { Role } from '../../shared/contract/rights.js'
import { simulateScan } from '../../shared/physics/measurement/simulateScan.js'
import { saveMembership } from '../database/repositories/projects.js'
import { lockInstallation, numberOfUsers } from '../database/repositories/users.js'
import type { Database } from '../database/transaction.js'
import type { Actor } from '../services/actor.js'
import { createProject } from '../services/projects/createProject.js'
import { seedBench, seedBiasSeries } from './bench.js'
import { inventedDevices, inventedScans, type InventedDevice } from './devices.js'
import { decide, describe, makeScans, upload, type DescribedDevice } from './deeds.js'
import { addDemonstrationPeople } from './people.js'
import { seedScenarios } from './scenarios.js'
import { FILE_STYLES, eqeFile, junctionFile, reflectanceFile } from './scanFiles.js'

type People = Awaited<ReturnType<typeof addDemonstrationPeople>>

const SPLIT_MEASURED_ON = '2026-11-24'
const BAD_MEASURED_ON = '2026-11-27'
const TRIPLE_MEASURED_ON = '2026-11-18'

/**
 * Fills an empty database with the demonstration: invented people, devices and scans, made by the same use cases as a
 * person's, from files that the reader reads. All of it or nothing; a database with people in it is left alone.
 */
export async function seedDemonstration(database: Database): Promise<void> {
  await database.transaction(async (work) => {
    await lockInstallation(work)
    if ((await numberOfUsers(work)) > 0) return
    const inside: Database = { work, transaction: (run) => run(work) }
    const people = await addDemonstrationPeople(work)
    const { split, bad, triple } = inventedDevices()
    await seedThicknessSplit(inside, people, split, bad)
    await seedTriple(inside, people, triple)
  })
}

/** Four thicknesses, accepted but for the thickest, whose scans wait for a decision; and the hurried repeat. */
async function seedThicknessSplit(
  database: Database,
  people: People,
  split: readonly InventedDevice[],
  bad: InventedDevice,
): Promise<void> {
  const projectId = await makeProject(database, people, ['designer', 'experimentalist', 'collaborator'], {
    name: 'Perovskite on silicon: top-cell thickness',
    description:
      'Which thickness of the perovskite brings the two currents together? Four thicknesses from one run, and a repeat at 500 nm.',
  })
  const { designer, experimentalist } = people
  await seedBench(database, experimentalist, projectId)
  for (const [index, device] of split.entries()) {
    const described = await describe(database, designer, projectId, device)
    const scans = await measure(database, experimentalist, described, index, SPLIT_MEASURED_ON)
    const isThickest = index === split.length - 1
    if (isThickest) await leaveWaiting(database, experimentalist, described)
    else
      for (const scan of scans)
        await decide(database, experimentalist, scan, 'accepted', 'Well selected, repeat within 0.3 %.')
    if (index === 0) await seedBiasSeries(database, experimentalist, described, scans[1]!, SPLIT_MEASURED_ON)
    if (index === 0) await seedScenarios(database, designer, described)
    if (index === 1) await excludeWideSpot(database, experimentalist, described)
  }
  await measure(database, experimentalist, await describe(database, designer, projectId, bad), 0, BAD_MEASURED_ON)
}

async function seedTriple(database: Database, people: People, triple: InventedDevice): Promise<void> {
  const projectId = await makeProject(database, people, ['designer', 'experimentalist'], {
    name: 'III–V triple junction',
    description: 'GaInP / GaAs / Ge: how much of the bottom cell’s current goes unused?',
  })
  const described = await describe(database, people.designer, projectId, triple)
  const scans = await measure(database, people.experimentalist, described, 2, TRIPLE_MEASURED_ON)
  for (const scan of scans)
    await decide(database, people.experimentalist, scan, 'accepted', 'On the plateau of the bias series.')
}

/** The lead makes the project and keeps only that role, so that each person shows what one role may do. */
async function makeProject(
  database: Database,
  people: People,
  others: readonly Exclude<Role, 'lead'>[],
  input: { name: string; description: string },
): Promise<string> {
  const { id } = await createProject(database, people.lead, input)
  const since = new Date()
  for (const role of ['lead', ...others] as const)
    await saveMembership(database.work, { projectId: id, userId: people[role].personId, roles: [role], since })
  return id
}

/** The device's files, confirmed as a careful person would; gives the EQE scans. */
async function measure(database: Database, actor: Actor, device: DescribedDevice, index: number, measuredOn: string) {
  const style = FILE_STYLES[index % FILE_STYLES.length]!
  const eqe = await upload(database, actor, device.projectId, eqeFile(device.invented, style, measuredOn))
  const scans = await makeScans(database, actor, device, eqe, { measuredOn, firstPosition: 1 })
  const reflectance = await upload(database, actor, device.projectId, reflectanceFile(device.invented, style))
  await makeScans(database, actor, device, reflectance, { measuredOn, firstPosition: 1 })
  return scans
}

/** A file that was uploaded and not yet confirmed: the top cell once more. */
async function leaveWaiting(database: Database, actor: Actor, device: DescribedDevice): Promise<void> {
  const [top] = inventedScans({
    ...device.invented,
    measurements: device.invented.measurements.map((one) => ({ ...one, seed: one.seed + 1000 })),
  })
  await upload(database, actor, device.projectId, junctionFile(device.invented, 1, top!.curve, 'second pass'))
}

/** A first scan with the spot wider than the aperture: low by the same share everywhere, and excluded for it. */
async function excludeWideSpot(database: Database, actor: Actor, device: DescribedDevice): Promise<void> {
  const [measurement] = device.invented.measurements
  const { scan } = simulateScan(device.invented.truth, {
    wavelengthNm: device.invented.reflectance.wavelengthNm,
    biasLight: measurement!.biasLight,
    biasVoltageV: measurement!.biasVoltageV,
    noise: 3e-4,
    seed: measurement!.seed + 2000,
    scale: 0.93,
  })
  const file = await upload(database, actor, device.projectId, junctionFile(device.invented, 1, scan, 'wide spot'))
  const scans = await makeScans(database, actor, device, file, { measuredOn: SPLIT_MEASURED_ON, firstPosition: 1 })
  for (const one of scans)
    await decide(
      database,
      actor,
      one,
      'excluded',
      'The spot was wider than the aperture: 7 % low over all wavelengths. Taken again with the small slit.',
    )
}
