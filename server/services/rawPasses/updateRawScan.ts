import type { RawReduction, RawScan } from '../../../shared/contract/rawPasses.js'
import { rawMeasurementOf, saveRawMeasurement } from '../../database/repositories/rawMeasurements.js'
import { lockedScan, saveScanCurve, scanOfProject } from '../../database/repositories/scans.js'
import { refreshSourceFileState } from '../../database/repositories/sourceFiles.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { recheckDevice } from '../checks/recheckDevice.js'
import { requireMember } from '../rights.js'
import { foundScan } from '../scans/findScan.js'
import { presentOneScan } from '../scans/presentScans.js'
import { requireCurrentVersion } from '../staleVersion.js'
import { mappingOfPass } from './mappingOfPass.js'
import { foundRaw, presentRawScan } from './presentRawScan.js'
import { readRaw } from './readRawColumns.js'
import { reduceStored } from './reduce.js'

/** Computes a raw scan again with corrected factors; its file is the one in which the device pass stands. */
export async function updateRawScan(
  database: Database,
  actor: Actor,
  projectId: string,
  scanId: string,
  { version, reduction }: { version: number; reduction: RawReduction },
): Promise<RawScan> {
  await requireMember(database.work, actor, projectId, 'edit-scans')
  const { label } = foundScan(await scanOfProject(database.work, projectId, scanId))
  foundRaw(await rawMeasurementOf(database.work, scanId), label)
  const raw = await readRaw(database.work, projectId, reduction)
  const { eqe } = reduceStored(raw)
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const scan = foundScan(await lockedScan(work, projectId, scanId))
    requireCurrentVersion(version, await presentOneScan(work, scan), `the scan ${scan.label}`)
    const mapping = mappingOfPass(reduction.device)
    await saveScanCurve(work, {
      id: scanId,
      sourceFileId: reduction.device.sourceFileId,
      sourceColumn: mapping.series[0]!.column,
      mapping,
      points: eqe.values.length,
      firstNm: eqe.wavelengthNm[0]!,
      lastNm: eqe.wavelengthNm.at(-1)!,
      wavelengthNm: eqe.wavelengthNm,
      values: eqe.values,
      version: scan.version + 1,
    })
    await saveRawMeasurement(work, { scanId, ...raw })
    for (const fileId of new Set([scan.sourceFileId, reduction.device.sourceFileId, reduction.reference.sourceFileId]))
      await refreshSourceFileState(work, fileId)
    await recheckDevice(work, projectId, scan.deviceId)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'scan.reduced-again',
      sentence: `${actor.name} corrected the factors of the raw scan ${scan.label} of ${scan.device.name}.`,
      subject: { kind: 'scan', id: scanId, name: scan.label },
    })
    return presentRawScan(work, projectId, scanId)
  })
}
