import type { Scenario as ScenarioReply } from '../../../shared/contract/scenarios.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { requireMember } from '../rights.js'
import { findScenario, shownScenario } from './findScenario.js'

export async function readScenario(
  { work }: Database,
  actor: Actor,
  projectId: string,
  scenarioId: string,
): Promise<ScenarioReply> {
  await requireMember(work, actor, projectId, 'read')
  return shownScenario(work, await findScenario(work, projectId, scenarioId))
}
