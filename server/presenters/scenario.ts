import type { Scenario as ScenarioReply } from '../../shared/contract/scenarios.js'
import type { ScenarioWithMaker } from '../database/repositories/scenarios.js'

export function presentScenario(scenario: ScenarioWithMaker, changed: string[]): ScenarioReply {
  const { id, deviceId, name, reason, model, change, spectrum, result, inputs, madeBy, madeAt, version } = scenario
  return {
    id,
    deviceId,
    name,
    reason,
    model,
    change,
    spectrum,
    result,
    inputs,
    stale: { changed },
    madeBy: { id: madeBy.id, name: madeBy.name },
    madeAt: madeAt.toISOString(),
    version,
  }
}
