import { lockScenario, markScenarioDeleted } from '../../database/repositories/scenarios.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { findScenario } from './findScenario.js'

export async function deleteScenario(
  database: Database,
  actor: Actor,
  projectId: string,
  scenarioId: string,
): Promise<null> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'run-analyses')
    await lockScenario(work, scenarioId)
    const { name } = await findScenario(work, projectId, scenarioId)
    await markScenarioDeleted(work, scenarioId, new Date())
    await recordAudit(work, {
      actor,
      projectId,
      action: 'scenario.deleted',
      sentence: `${actor.name} deleted the scenario ${name}.`,
      subject: { kind: 'scenario', id: scenarioId, name },
    })
    return null
  })
}
