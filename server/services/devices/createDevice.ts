import { v7 as uuid } from 'uuid'
import type { Device as DeviceReply, NewDevice } from '../../../shared/contract/devices.js'
import { insertDevice } from '../../database/repositories/devices.js'
import type { Database } from '../../database/transaction.js'
import { presentDevice } from '../../presenters/device.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { requireKnownJunctions, requireSoundStack } from './checkStack.js'
import { describedDevice } from './deviceFromInput.js'

export async function createDevice(
  database: Database,
  actor: Actor,
  projectId: string,
  input: NewDevice,
): Promise<DeviceReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-devices')
    requireKnownJunctions(input, [])
    requireSoundStack(input)
    const id = uuid()
    const now = new Date()
    const device = {
      id,
      projectId,
      version: 1,
      createdAt: now,
      updatedAt: now,
      deletedAt: null,
      ...describedDevice(id, input),
    }
    await insertDevice(work, device)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'device.created',
      sentence: `${actor.name} described the device ${input.name}.`,
      subject: { kind: 'device', id, name: input.name },
    })
    return presentDevice(device)
  })
}
