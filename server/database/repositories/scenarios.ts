import { IsNull, MoreThan } from 'typeorm'
import { Scenario } from '../entities/Scenario.js'
import type { Work } from '../transaction.js'

export type ScenarioRow = Omit<Scenario, 'project' | 'device' | 'madeBy'>
export type ScenarioWithMaker = Omit<Scenario, 'project' | 'device'>

const MAKER = { madeBy: true } as const
const ofLivingDevice = { device: { deletedAt: IsNull() } }

/** Oldest first. */
export async function scenariosOfDevice(work: Work, deviceId: string): Promise<ScenarioWithMaker[]> {
  return work.find(Scenario, { where: { deviceId, deletedAt: IsNull() }, relations: MAKER, order: { id: 'ASC' } })
}

/** A deleted one too when `deletedSince` is given. */
export async function scenarioOfProject(
  work: Work,
  projectId: string,
  id: string,
  deletedSince: Date | null = null,
): Promise<ScenarioWithMaker | null> {
  return work.findOne(Scenario, {
    where: { id, projectId, deletedAt: deletedSince ? MoreThan(deletedSince) : IsNull(), ...ofLivingDevice },
    relations: MAKER,
  })
}

/** Holds the row until the transaction ends, so that two people do not save over each other. */
export async function lockScenario(work: Work, id: string): Promise<void> {
  await work.findOne(Scenario, { select: { id: true }, where: { id }, lock: { mode: 'pessimistic_write' } })
}

export async function insertScenario(work: Work, row: ScenarioRow): Promise<void> {
  await work.insert(Scenario, row)
}

export async function saveScenarioWords(
  work: Work,
  { id, ...words }: Pick<ScenarioRow, 'id' | 'name' | 'reason' | 'version'>,
): Promise<void> {
  await work.update(Scenario, { id }, words)
}

export async function markScenarioDeleted(work: Work, id: string, deletedAt: Date | null): Promise<void> {
  await work.update(Scenario, { id }, { deletedAt })
}
