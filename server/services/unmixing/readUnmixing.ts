import { isApiError } from '../../../shared/contract/errors.js'
import type { Unmixing } from '../../../shared/contract/unmixing.js'
import { shortCircuitCurrentDensity } from '../../../shared/physics/currents.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'
import { deviceWithJunctions } from '../../database/repositories/devices.js'
import type { Database } from '../../database/transaction.js'
import { presentCurve } from '../../presenters/curve.js'
import type { Actor } from '../actor.js'
import { CHECK_SPECTRUM } from '../checks/checkedScan.js'
import { foundDevice } from '../devices/findDevice.js'
import type { MeasuredDevice } from '../matching/measuredDevice.js'
import { measureDevices } from '../matching/measureDevices.js'
import { requireMember } from '../rights.js'
import { unmixedScans } from './unmixedScans.js'

/** What unmixing would make of the scans in use; nothing is saved. */
export async function readUnmixing(
  { work }: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
): Promise<Unmixing> {
  await requireMember(work, actor, projectId, 'read')
  const described = foundDevice(await deviceWithJunctions(work, projectId, deviceId))
  const [device] = await measureDevices(work, [described])
  try {
    return { deviceId, spectrum: CHECK_SPECTRUM, junctions: presented(device!.measured), problem: null }
  } catch (error) {
    if (isApiError(error, 'STATE_CONFLICT'))
      return { deviceId, spectrum: CHECK_SPECTRUM, junctions: [], problem: error.message }
    throw error
  }
}

function presented(device: MeasuredDevice): Unmixing['junctions'] {
  const spectrum = referenceSpectrum(CHECK_SPECTRUM)
  const { junctions, unmixed } = unmixedScans(device)
  return junctions.map(({ id, position, scan }, i) => {
    const { corrected, weights, addedUncertainty, ownShare } = unmixed[i]!
    return {
      junctionId: id,
      position,
      scanId: scan.id,
      before: presentCurve(scan.curve),
      after: presentCurve(corrected),
      addedUncertainty: Array.from(addedUncertainty),
      weights: weights.map(({ index, weight, uncertainty, bandNm }) => ({
        position: index + 1,
        weight,
        uncertainty,
        bandNm: bandNm && [bandNm[0], bandNm[1]],
      })),
      ownShare,
      jscBeforeMaCm2: shortCircuitCurrentDensity(scan.curve, spectrum),
      jscAfterMaCm2: shortCircuitCurrentDensity(corrected, spectrum),
    }
  })
}
