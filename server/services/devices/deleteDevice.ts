import { lockedDevice, markDeviceDeleted } from '../../database/repositories/devices.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { foundDevice } from './findDevice.js'

/** The device and with it its scans leave every list; nothing is lost for thirty days. */
export async function deleteDevice(
  database: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
): Promise<null> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-devices')
    const device = foundDevice(await lockedDevice(work, projectId, deviceId))
    await markDeviceDeleted(work, deviceId, new Date())
    await recordAudit(work, {
      actor,
      projectId,
      action: 'device.deleted',
      sentence: `${actor.name} deleted the device ${device.name}.`,
      subject: { kind: 'device', id: deviceId, name: device.name },
    })
    return null
  })
}
