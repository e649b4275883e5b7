import type { Scenario as ScenarioReply } from '../../../shared/contract/scenarios.js'
import { lockScenario, markScenarioDeleted } from '../../database/repositories/scenarios.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { restorableSince } from '../deletion.js'
import { requireMember } from '../rights.js'
import { findScenario, shownScenario } from './findScenario.js'

export async function restoreScenario(
  database: Database,
  actor: Actor,
  projectId: string,
  scenarioId: string,
): Promise<ScenarioReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'run-analyses')
    await lockScenario(work, scenarioId)
    const scenario = await findScenario(work, projectId, scenarioId, restorableSince())
    await markScenarioDeleted(work, scenarioId, null)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'scenario.restored',
      sentence: `${actor.name} brought the scenario ${scenario.name} back.`,
      subject: { kind: 'scenario', id: scenarioId, name: scenario.name },
    })
    return shownScenario(work, { ...scenario, deletedAt: null })
  })
}
