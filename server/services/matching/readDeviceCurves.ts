import type { DeviceCurves } from '../../../shared/contract/matching.js'
import { deviceWithJunctions } from '../../database/repositories/devices.js'
import type { Database } from '../../database/transaction.js'
import { presentCurve } from '../../presenters/curve.js'
import type { Actor } from '../actor.js'
import { foundDevice } from '../devices/findDevice.js'
import { requireMember } from '../rights.js'
import { measureDevices } from './measureDevices.js'

/** The curves of the scans in use; junctions without a scan are left out. */
export async function readDeviceCurves(
  { work }: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
): Promise<DeviceCurves> {
  await requireMember(work, actor, projectId, 'read')
  const described = foundDevice(await deviceWithJunctions(work, projectId, deviceId))
  const [device] = await measureDevices(work, [described])
  const { junctions, reflectance } = device!.measured
  return {
    junctions: junctions.flatMap(({ id, position, scan }) =>
      scan ? [{ junctionId: id, position, scanId: scan.id, curve: presentCurve(scan.curve) }] : [],
    ),
    reflectance: reflectance && { scanId: reflectance.id, curve: presentCurve(reflectance.curve) },
  }
}
