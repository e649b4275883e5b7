import { ApiError } from '../../../shared/contract/errors.js'
import { deviceOfProject, type DeviceWithStack } from '../../database/repositories/devices.js'
import type { Work } from '../../database/transaction.js'

export async function findDevice(work: Work, projectId: string, deviceId: string): Promise<DeviceWithStack> {
  return foundDevice(await deviceOfProject(work, projectId, deviceId))
}

export function foundDevice<Found>(device: Found | null): Found {
  if (!device) throw new ApiError('NOT_FOUND', { what: 'device' }, 'There is no such device in this project.')
  return device
}
