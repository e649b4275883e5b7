import type { Device as DeviceReply } from '../../../shared/contract/devices.js'
import { lockedDevice, markDeviceDeleted } from '../../database/repositories/devices.js'
import type { Database } from '../../database/transaction.js'
import { presentDevice } from '../../presenters/device.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { restorableSince } from '../deletion.js'
import { requireMember } from '../rights.js'
import { foundDevice } from './findDevice.js'

export async function restoreDevice(
  database: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
): Promise<DeviceReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-devices')
    const device = foundDevice(await lockedDevice(work, projectId, deviceId, restorableSince()))
    await markDeviceDeleted(work, deviceId, null)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'device.restored',
      sentence: `${actor.name} brought the device ${device.name} back.`,
      subject: { kind: 'device', id: deviceId, name: device.name },
    })
    return presentDevice({ ...device, deletedAt: null })
  })
}
