import type { Device as DeviceReply } from '../../../shared/contract/devices.js'
import type { Database } from '../../database/transaction.js'
import { presentDevice } from '../../presenters/device.js'
import type { Actor } from '../actor.js'
import { requireMember } from '../rights.js'
import { findDevice } from './findDevice.js'

export async function readDevice(
  { work }: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
): Promise<DeviceReply> {
  await requireMember(work, actor, projectId, 'read')
  return presentDevice(await findDevice(work, projectId, deviceId))
}
