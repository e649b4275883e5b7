import type { Scenario as ScenarioReply } from '../../../shared/contract/scenarios.js'
import { scenariosOfDevice } from '../../database/repositories/scenarios.js'
import type { Database } from '../../database/transaction.js'
import { presentScenario } from '../../presenters/scenario.js'
import type { Actor } from '../actor.js'
import { findDevice } from '../devices/findDevice.js'
import { requireMember } from '../rights.js'
import { scenarioBasis } from './scenarioBasis.js'
import { changedSince } from './staleness.js'

export async function listScenarios(
  { work }: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
): Promise<{ items: ScenarioReply[] }> {
  await requireMember(work, actor, projectId, 'read')
  const basis = await scenarioBasis(work, await findDevice(work, projectId, deviceId))
  const items: ScenarioReply[] = []
  for (const scenario of await scenariosOfDevice(work, deviceId))
    items.push(presentScenario(scenario, await changedSince(work, scenario, basis)))
  return { items }
}
