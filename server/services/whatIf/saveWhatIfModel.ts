import { ApiError } from '../../../shared/contract/errors.js'
import type { BodyOf } from '../../../shared/contract/route.js'
import type { saveWhatIfModel as route, WhatIfModel } from '../../../shared/contract/whatIf.js'
import { lockedDevice } from '../../database/repositories/devices.js'
import { saveWhatIfModelRow } from '../../database/repositories/whatIfModels.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { foundDevice } from '../devices/findDevice.js'
import { requireMember } from '../rights.js'
import { requireCurrentVersion } from '../staleVersion.js'
import { describedOptics } from './describedOptics.js'

export async function saveWhatIfModel(
  database: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
  { description, version }: BodyOf<typeof route>,
): Promise<WhatIfModel> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'run-analyses')
    const device = foundDevice(await lockedDevice(work, projectId, deviceId))
    requireCurrentVersion(version, await describedOptics(work, device), `the optics of ${device.name}`)
    if (description.junctions.length !== device.junctions.length) {
      const message = `${device.name} has ${device.junctions.length} junctions; ${description.junctions.length} are described.`
      throw new ApiError('INPUT_INVALID', { errors: [{ path: ['description', 'junctions'], message }] }, message)
    }
    await saveWhatIfModelRow(work, { deviceId, description, version: version + 1 })
    await recordAudit(work, {
      actor,
      projectId,
      action: 'device.optics-described',
      sentence: `${actor.name} described the optics of ${device.name}.`,
      subject: { kind: 'device', id: deviceId, name: device.name },
    })
    return { deviceId, description, assumptions: [], version: version + 1 }
  })
}
