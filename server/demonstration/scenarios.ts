import { NewScenario } from '../../shared/contract/scenarios.js'
import type { OpticalDescription } from '../../shared/contract/whatIf.js'
import type { Database } from '../database/transaction.js'
import type { Actor } from '../services/actor.js'
import { createScenario } from '../services/scenarios/createScenario.js'
import { readWhatIfModel } from '../services/whatIf/readWhatIfModel.js'
import { saveWhatIfModel } from '../services/whatIf/saveWhatIfModel.js'
import type { DescribedDevice } from './deeds.js'

const SCENARIOS = [
  {
    name: 'Top cell 440 nm',
    reason: 'The top cell limits at 360 nm: does 80 nm more bring the currents together?',
    change: { '1.thicknessNm': 440 },
  },
  {
    name: 'Top gap 1.66 eV',
    reason: 'The same question without a thicker film: a gap 20 meV lower.',
    change: { '1.bandGapEv': 1.66 },
  },
]

/** The designer's description of the thinnest tandem and two questions put to it. */
export async function seedScenarios(
  database: Database,
  designer: Actor,
  { projectId, device }: DescribedDevice,
): Promise<void> {
  const { description, version } = await readWhatIfModel(database, designer, projectId, device.id)
  await saveWhatIfModel(database, designer, projectId, device.id, { version, description: scattering(description) })
  for (const scenario of SCENARIOS)
    await createScenario(database, designer, projectId, device.id, NewScenario.parse(scenario))
}

/** The rear of the textured silicon sends light back at a slant: ten passes, an invented but usual figure. */
function scattering({ junctions, layers }: OpticalDescription): OpticalDescription {
  return { layers, junctions: junctions.map((one, i) => (i === 1 ? { ...one, pathFactor: 10 } : one)) }
}
