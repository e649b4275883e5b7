import { createHash } from 'node:crypto'
import type { ScenarioInputs } from '../../../shared/contract/scenarios.js'
import type { WhatIfModel } from '../../../shared/contract/whatIf.js'
import type { Curve } from '../../../shared/physics/curve.js'
import type { DeviceWithStack } from '../../database/repositories/devices.js'
import { encodeFloat64 } from '../../database/transformers.js'
import type { Work } from '../../database/transaction.js'
import type { MeasuredDevice } from '../matching/measuredDevice.js'
import { measureDevices } from '../matching/measureDevices.js'
import { describedOptics } from '../whatIf/describedOptics.js'

/** What a scenario of a device rests on besides the spectrum. */
export interface ScenarioBasis {
  device: DeviceWithStack
  measured: MeasuredDevice
  optics: WhatIfModel
  scans: ScenarioInputs['scans']
  descriptionSha256: string
}

export async function scenarioBasis(work: Work, device: DeviceWithStack): Promise<ScenarioBasis> {
  const [withScans] = await measureDevices(work, [device])
  const { measured } = withScans!
  const optics = await describedOptics(work, device)
  return {
    device,
    measured,
    optics,
    scans: measured.junctions.flatMap(({ position, scan }) =>
      scan ? [{ position, scanId: scan.id, sha256: curveSha256(scan.curve) }] : [],
    ),
    descriptionSha256: createHash('sha256').update(JSON.stringify(optics.description)).digest('hex'),
  }
}

/** Of the Float64 values, little-endian: wavelengths, then values. */
export function curveSha256({ wavelengthNm, values }: Curve): string {
  return createHash('sha256').update(encodeFloat64(wavelengthNm)).update(encodeFloat64(values)).digest('hex')
}
