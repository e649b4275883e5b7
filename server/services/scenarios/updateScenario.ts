import type { BodyOf } from '../../../shared/contract/route.js'
import type { Scenario as ScenarioReply, updateScenario as route } from '../../../shared/contract/scenarios.js'
import { lockScenario, saveScenarioWords } from '../../database/repositories/scenarios.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { requireCurrentVersion } from '../staleVersion.js'
import { findScenario, shownScenario } from './findScenario.js'

export async function updateScenario(
  database: Database,
  actor: Actor,
  projectId: string,
  scenarioId: string,
  { version, name, reason }: BodyOf<typeof route>,
): Promise<ScenarioReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'run-analyses')
    await lockScenario(work, scenarioId)
    const before = await findScenario(work, projectId, scenarioId)
    requireCurrentVersion(version, await shownScenario(work, before), `the scenario ${before.name}`)
    const words = { id: scenarioId, name, reason, version: version + 1 }
    await saveScenarioWords(work, words)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'scenario.updated',
      sentence:
        before.name === name
          ? `${actor.name} changed the reason of the scenario ${name}.`
          : `${actor.name} renamed the scenario ${before.name} to ${name}.`,
      subject: { kind: 'scenario', id: scenarioId, name },
    })
    return shownScenario(work, { ...before, ...words })
  })
}
