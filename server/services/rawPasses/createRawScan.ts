import { v7 as uuid } from 'uuid'
import { ApiError } from '../../../shared/contract/errors.js'
import type { RawScan, createRawScan as route } from '../../../shared/contract/rawPasses.js'
import type { BodyOf } from '../../../shared/contract/route.js'
import { lockedDevice } from '../../database/repositories/devices.js'
import { saveRawMeasurement } from '../../database/repositories/rawMeasurements.js'
import { insertScans } from '../../database/repositories/scans.js'
import { refreshSourceFileState } from '../../database/repositories/sourceFiles.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { recheckDevice } from '../checks/recheckDevice.js'
import { foundDevice } from '../devices/findDevice.js'
import { requireMember } from '../rights.js'
import { findSourceFile } from '../scans/findSourceFile.js'
import { presentRawScan } from './presentRawScan.js'
import { mappingOfPass } from './mappingOfPass.js'
import { readRaw } from './readRawColumns.js'
import { reduceStored } from './reduce.js'

/** Makes an EQE scan of raw passes. The raw columns and the calibration are kept with it. */
export async function createRawScan(
  database: Database,
  actor: Actor,
  projectId: string,
  { reduction, deviceId, junctionId, label, conditions }: BodyOf<typeof route>,
): Promise<RawScan> {
  await requireMember(database.work, actor, projectId, 'edit-scans')
  const raw = await readRaw(database.work, projectId, reduction)
  const { eqe } = reduceStored(raw)
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const device = foundDevice(await lockedDevice(work, projectId, deviceId))
    if (!device.junctions.some((junction) => junction.id === junctionId)) {
      const message = `The junction is not one of ${device.name}.`
      throw new ApiError('INPUT_INVALID', { errors: [{ path: ['junctionId'], message }] }, message)
    }
    const file = await findSourceFile(work, projectId, reduction.device.sourceFileId)
    const mapping = mappingOfPass(reduction.device)
    const id = uuid()
    const name = label || file.name.slice(0, 200)
    await insertScans(work, [
      {
        id,
        projectId,
        deviceId,
        junctionId,
        sourceFileId: file.id,
        sourceColumn: mapping.series[0]!.column,
        quantity: 'eqe',
        label: name,
        points: eqe.values.length,
        firstNm: eqe.wavelengthNm[0]!,
        lastNm: eqe.wavelengthNm.at(-1)!,
        wavelengthNm: eqe.wavelengthNm,
        values: eqe.values,
        mapping,
        conditions,
        origin: 'raw',
        parentScanIds: [],
        biasSeriesId: null,
        state: 'checked',
        decidedById: null,
        decidedAt: null,
        decisionReason: '',
        uploadedAt: new Date(),
        uploadedById: actor.personId,
        version: 1,
        deletedAt: null,
      },
    ])
    await saveRawMeasurement(work, { scanId: id, ...raw })
    await refreshSourceFileState(work, file.id)
    await refreshSourceFileState(work, reduction.reference.sourceFileId)
    await recheckDevice(work, projectId, deviceId)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'scan.reduced',
      sentence: `${actor.name} made the scan ${name} of ${device.name} from the raw passes of ${file.name} with ${raw.detectorName}.`,
      subject: { kind: 'scan', id, name },
    })
    return presentRawScan(work, projectId, id)
  })
}
