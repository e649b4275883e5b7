import { ApiError } from '../../../shared/contract/errors.js'
import { DomainError } from '../../../shared/physics/errors.js'
import { unmixScans, type Unmixed } from '../../../shared/physics/measurement/unmixing.js'
import type { MeasuredDevice, MeasuredJunction, MeasuredScan } from '../matching/measuredDevice.js'

export interface UnmixedStack {
  junctions: (MeasuredJunction & { scan: MeasuredScan })[]
  unmixed: Unmixed[]
}

/** The scans in use, unmixed. @throws ApiError STATE_CONFLICT with the sentence why they cannot be. */
export function unmixedScans(device: MeasuredDevice): UnmixedStack {
  if (device.terminals === '4-terminal')
    throw cannot('The junctions have terminals of their own: their scans do not mix.')
  const missing = device.junctions.filter(({ scan }) => !scan)
  if (missing.length > 0)
    throw cannot(
      `Unmixing needs a scan of every junction; ${missing.map(({ position, label }) => `junction ${position} (${label})`).join(', ')} has none.`,
    )
  const junctions = device.junctions.map((junction) => ({ ...junction, scan: junction.scan! }))
  try {
    return { junctions, unmixed: unmixScans(junctions.map(({ scan }) => scan.curve)) }
  } catch (error) {
    if (error instanceof DomainError) throw cannot(error.message)
    throw error
  }
}

function cannot(sentence: string): ApiError<'STATE_CONFLICT'> {
  return new ApiError('STATE_CONFLICT', { reason: 'cannot-unmix' }, sentence)
}
