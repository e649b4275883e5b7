import { ApiError } from '../../../shared/contract/errors.js'
import type { RawScan } from '../../../shared/contract/rawPasses.js'
import { rawMeasurementOf, type RawMeasurementRow } from '../../database/repositories/rawMeasurements.js'
import { scanOfProject } from '../../database/repositories/scans.js'
import type { Work } from '../../database/transaction.js'
import { foundScan } from '../scans/findScan.js'
import { presentOneScan } from '../scans/presentScans.js'
import { presentReduced, reduceStored } from './reduce.js'
import { reflectanceOfDevice } from './reflectanceOfDevice.js'

export async function presentRawScan(work: Work, projectId: string, scanId: string): Promise<RawScan> {
  const scan = foundScan(await scanOfProject(work, projectId, scanId))
  const raw = foundRaw(await rawMeasurementOf(work, scanId), scan.label)
  return {
    scan: await presentOneScan(work, scan),
    reduction: raw.reduction,
    detectorName: raw.detectorName,
    reduced: presentReduced(reduceStored(raw), await reflectanceOfDevice(work, scan.deviceId)),
  }
}

export function foundRaw(raw: RawMeasurementRow | null, label: string): RawMeasurementRow {
  if (!raw)
    throw new ApiError('NOT_FOUND', { what: 'raw measurement' }, `The scan ${label} was not made of raw passes.`)
  return raw
}
