import type { Matching } from '../../../shared/contract/matching.js'
import type { SpectrumChoice } from '../../../shared/contract/spectra.js'
import { deviceWithJunctions } from '../../database/repositories/devices.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { findingsOfScans } from '../checks/findingsOfScans.js'
import { foundDevice } from '../devices/findDevice.js'
import { requireMember } from '../rights.js'
import { chooseSpectrum } from '../spectra/chooseSpectrum.js'
import { computeMatching } from './computeMatching.js'
import { scansMeasured } from './measuredDevice.js'
import { measureDevices } from './measureDevices.js'

export async function readMatching(
  { work }: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
  choice: SpectrumChoice,
): Promise<Matching> {
  await requireMember(work, actor, projectId, 'read')
  const spectrum = await chooseSpectrum(work, projectId, choice)
  const described = foundDevice(await deviceWithJunctions(work, projectId, deviceId))
  const [device] = await measureDevices(work, [described])
  const { measured } = device!
  return computeMatching(measured, spectrum, await findingsOfScans(work, scansMeasured([measured])))
}
