import { ApiError } from '../../../shared/contract/errors.js'
import type { Scenario as ScenarioReply } from '../../../shared/contract/scenarios.js'
import { scenarioOfProject, type ScenarioWithMaker } from '../../database/repositories/scenarios.js'
import type { Work } from '../../database/transaction.js'
import { presentScenario } from '../../presenters/scenario.js'
import { findDevice } from '../devices/findDevice.js'
import { scenarioBasis } from './scenarioBasis.js'
import { changedSince } from './staleness.js'

export async function findScenario(
  work: Work,
  projectId: string,
  scenarioId: string,
  deletedSince: Date | null = null,
): Promise<ScenarioWithMaker> {
  const scenario = await scenarioOfProject(work, projectId, scenarioId, deletedSince)
  if (scenario) return scenario
  throw new ApiError('NOT_FOUND', { what: 'scenario' }, 'There is no such scenario in this project.')
}

/** A scenario with what has changed since it was made. */
export async function shownScenario(work: Work, scenario: ScenarioWithMaker): Promise<ScenarioReply> {
  const basis = await scenarioBasis(work, await findDevice(work, scenario.projectId, scenario.deviceId))
  return presentScenario(scenario, await changedSince(work, scenario, basis))
}
