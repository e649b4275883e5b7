import type { Device as DeviceReply, DeviceUpdate } from '../../../shared/contract/devices.js'
import { ApiError } from '../../../shared/contract/errors.js'
import { lockedDevice, updateDevice as saveDevice, type DeviceWithStack } from '../../database/repositories/devices.js'
import { countScansOfJunctions } from '../../database/repositories/scans.js'
import type { Database, Work } from '../../database/transaction.js'
import { presentDevice } from '../../presenters/device.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { recheckDevice } from '../checks/recheckDevice.js'
import { requireMember } from '../rights.js'
import { requireCurrentVersion } from '../staleVersion.js'
import { requireKnownJunctions, requireSoundStack } from './checkStack.js'
import { describedDevice } from './deviceFromInput.js'
import { foundDevice } from './findDevice.js'

export async function updateDevice(
  database: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
  { version, ...input }: DeviceUpdate,
): Promise<DeviceReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-devices')
    const before = foundDevice(await lockedDevice(work, projectId, deviceId))
    requireCurrentVersion(version, presentDevice(before), `the device ${before.name}`)
    requireKnownJunctions(input, before.junctions)
    requireSoundStack(input)
    await requireNoScansLost(work, before, input.junctions)
    const device: DeviceWithStack = {
      ...before,
      ...describedDevice(deviceId, input),
      version: before.version + 1,
      updatedAt: new Date(),
    }
    await saveDevice(work, device)
    await recheckDevice(work, projectId, deviceId)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'device.updated',
      sentence:
        before.name === device.name
          ? `${actor.name} changed the description of ${device.name}.`
          : `${actor.name} changed the description of ${before.name} and renamed it to ${device.name}.`,
      subject: { kind: 'device', id: deviceId, name: device.name },
    })
    return presentDevice(device)
  })
}

/** A junction cannot be taken out while scans stand on it. */
async function requireNoScansLost(work: Work, before: DeviceWithStack, after: readonly { id?: string | undefined }[]) {
  const kept = new Set(after.map((junction) => junction.id))
  const removed = before.junctions.filter((junction) => !kept.has(junction.id))
  const counts = await countScansOfJunctions(
    work,
    removed.map((junction) => junction.id),
  )
  const blocking = removed.filter((junction) => counts.has(junction.id))
  if (blocking.length === 0) return
  const message = blocking
    .map(
      ({ id, position, label }) =>
        `Junction ${position} (${label}) still has ${counts.get(id)} ${counts.get(id) === 1 ? 'scan' : 'scans'}; delete them before you take the junction out.`,
    )
    .join(' ')
  throw new ApiError('INPUT_INVALID', { errors: [{ path: ['junctions'], message }] }, message)
}
