import { v7 as uuid } from 'uuid'
import { ApiError } from '../../../shared/contract/errors.js'
import type { Scan as ScanReply } from '../../../shared/contract/scans.js'
import { lockedDevice } from '../../database/repositories/devices.js'
import { insertScans, scanOfProject } from '../../database/repositories/scans.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { recheckDevice } from '../checks/recheckDevice.js'
import { foundDevice } from '../devices/findDevice.js'
import { measureDevices } from '../matching/measureDevices.js'
import { requireMember } from '../rights.js'
import { foundScan } from '../scans/findScan.js'
import { presentOneScan } from '../scans/presentScans.js'
import { unmixedScans } from './unmixedScans.js'

/** Keeps the unmixed curve of one junction as a scan of its own; the scans that it was made of stay as they are. */
export async function acceptUnmixing(
  database: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
  { junctionId, parentScanIds }: { junctionId: string; parentScanIds: string[] },
): Promise<ScanReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const device = foundDevice(await lockedDevice(work, projectId, deviceId))
    const [measured] = await measureDevices(work, [device])
    const { junctions, unmixed } = unmixedScans(measured!.measured)
    const inUse = junctions.map(({ scan }) => scan.id)
    if (inUse.join() !== parentScanIds.join())
      throw new ApiError(
        'STATE_CONFLICT',
        { reason: 'scans-changed' },
        'Other scans stand for the junctions since you looked; look at the unmixed curves again.',
      )
    const place = junctions.findIndex((junction) => junction.id === junctionId)
    if (place < 0) {
      const message = `The junction is not one of ${device.name}.`
      throw new ApiError('INPUT_INVALID', { errors: [{ path: ['junctionId'], message }] }, message)
    }
    const parent = foundScan(await scanOfProject(work, projectId, inUse[place]!))
    const { corrected, weights } = unmixed[place]!
    const id = uuid()
    const label = `${parent.label.slice(0, 185)}, unmixed`
    await insertScans(work, [
      {
        id,
        projectId,
        deviceId,
        junctionId,
        sourceFileId: parent.sourceFileId,
        sourceColumn: parent.sourceColumn,
        quantity: 'eqe',
        label,
        points: corrected.values.length,
        firstNm: corrected.wavelengthNm[0]!,
        lastNm: corrected.wavelengthNm.at(-1)!,
        wavelengthNm: corrected.wavelengthNm,
        values: corrected.values,
        mapping: parent.mapping,
        conditions: parent.conditions,
        origin: 'corrected',
        parentScanIds: inUse,
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
    await recheckDevice(work, projectId, deviceId)
    const taken = weights
      .map(({ index, weight }) => `${(100 * weight).toFixed(2)} % of junction ${index + 1}`)
      .join(' and ')
    await recordAudit(work, {
      actor,
      projectId,
      action: 'scan.unmixed',
      sentence: `${actor.name} made the corrected scan ${label} of ${device.name}, taking out ${taken}.`,
      subject: { kind: 'scan', id, name: label },
    })
    return presentOneScan(work, foundScan(await scanOfProject(work, projectId, id)))
  })
}
