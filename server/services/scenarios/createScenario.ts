import { v7 as uuid } from 'uuid'
import { ApiError } from '../../../shared/contract/errors.js'
import { float64Bits, type NewScenario, type Scenario as ScenarioReply } from '../../../shared/contract/scenarios.js'
import { ENGINE_VERSION } from '../../../shared/physics/version.js'
import { lockedDevice } from '../../database/repositories/devices.js'
import { insertScenario } from '../../database/repositories/scenarios.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { foundDevice } from '../devices/findDevice.js'
import { requireMember } from '../rights.js'
import { chooseSpectrum } from '../spectra/chooseSpectrum.js'
import { computeScenario } from './computeScenario.js'
import { findScenario, shownScenario } from './findScenario.js'
import { curveSha256, scenarioBasis } from './scenarioBasis.js'

/** Computes the scenario here, from what is in the database now, and keeps it where it agrees with what was seen. */
export async function createScenario(
  database: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
  { name, reason, model, change, claimed, ...choice }: NewScenario,
): Promise<ScenarioReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'run-analyses')
    const device = foundDevice(await lockedDevice(work, projectId, deviceId))
    const chosen = await chooseSpectrum(work, projectId, choice)
    const basis = await scenarioBasis(work, device)
    const result = computeScenario(basis, chosen, model, change)
    if (claimed !== undefined && claimed !== float64Bits(result.changed.currentsMaCm2)) throw disagreement(device.name)
    const id = uuid()
    await insertScenario(work, {
      id,
      projectId,
      deviceId,
      name,
      reason,
      model,
      change,
      spectrum: chosen.used,
      result,
      inputs: {
        engineVersion: ENGINE_VERSION,
        spectrumSha256: curveSha256(chosen.spectrum.curve),
        descriptionSha256: basis.descriptionSha256,
        scans: basis.scans,
      },
      madeById: actor.personId,
      madeAt: new Date(),
      version: 1,
      deletedAt: null,
    })
    await recordAudit(work, {
      actor,
      projectId,
      action: 'scenario.saved',
      sentence: `${actor.name} saved the scenario ${name} of ${device.name}.`,
      subject: { kind: 'scenario', id, name },
    })
    return shownScenario(work, await findScenario(work, projectId, id))
  })
}

function disagreement(deviceName: string): ApiError {
  return new ApiError(
    'STATE_CONFLICT',
    { reason: 'result-differs' },
    `The currents you saw are not those that the server computes from the scans and optics of ${deviceName} as they are now. Reload the page and look again; nothing was saved.`,
  )
}
