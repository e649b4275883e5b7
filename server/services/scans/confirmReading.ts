import { v7 as uuid } from 'uuid'
import { ApiError } from '../../../shared/contract/errors.js'
import type { BodyOf } from '../../../shared/contract/route.js'
import type { Scan as ScanReply, confirmReading as route } from '../../../shared/contract/scans.js'
import type { SourceFile } from '../../database/entities/SourceFile.js'
import { devicesOfProjectById, lockDevices, type DeviceWithStack } from '../../database/repositories/devices.js'
import { rememberMapping } from '../../database/repositories/readingMemories.js'
import { insertScans, scansById, scansOfSourceFiles, type NewScanRow } from '../../database/repositories/scans.js'
import { bytesOfSourceFile, lockSourceFile, refreshSourceFileState } from '../../database/repositories/sourceFiles.js'
import type { Database, Work } from '../../database/transaction.js'
import type { ReadingResult } from '../../reading/readingResult.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { recheckDevices } from '../checks/recheckDevice.js'
import { requireMember } from '../rights.js'
import { confirmationErrors } from './confirmationErrors.js'
import { findSourceFile } from './findSourceFile.js'
import { presentScans } from './presentScans.js'
import { readAsConfirmed } from './understand.js'

type Confirmation = BodyOf<typeof route>

/** Makes scans of a file's columns, all of them or none, and remembers the mapping for the next file of its shape. */
export async function confirmReading(
  database: Database,
  actor: Actor,
  projectId: string,
  sourceFileId: string,
  confirmation: Confirmation,
): Promise<{ items: ScanReply[] }> {
  await requireMember(database.work, actor, projectId, 'edit-scans')
  const file = await findSourceFile(database.work, projectId, sourceFileId)
  const bytes = await bytesOfSourceFile(database.work, file.id)
  const reading = await readAsConfirmed(bytes, file.name, confirmation.mapping)

  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    if (!(await lockSourceFile(work, projectId, sourceFileId)))
      throw new ApiError('NOT_FOUND', { what: 'file' }, `${file.name} was discarded in the meantime.`)
    const deviceIds = [...new Set(confirmation.scans.map((scan) => scan.deviceId))].sort()
    await lockDevices(work, deviceIds)
    const devices = await devicesOfProjectById(work, projectId, deviceIds)
    const errors = confirmationErrors(confirmation, devices, await scansOfSourceFiles(work, [file.id]))
    if (errors.length > 0)
      throw new ApiError('INPUT_INVALID', { errors }, errors.map((error) => error.message).join(' '))
    const rows = scanRows(file, confirmation, reading, actor)
    await insertScans(work, rows)
    await refreshSourceFileState(work, file.id)
    await rememberMapping(work, projectId, reading.shape, confirmation.mapping, new Date())
    await recheckDevices(work, projectId, deviceIds)
    await recordConfirmation(work, actor, file, rows, devices)
    const saved = await scansById(
      work,
      rows.map((row) => row.id),
    )
    return { items: await presentScans(work, saved) }
  })
}

function scanRows(
  file: SourceFile,
  { mapping, scans }: Confirmation,
  reading: ReadingResult,
  actor: Actor,
): NewScanRow[] {
  const uploadedAt = new Date()
  return scans.map(({ column, quantity, deviceId, junctionId, label, conditions }) => {
    const { wavelengthNm, values, label: readLabel } = reading.scans.find((scan) => scan.column === column)!
    return {
      id: uuid(),
      projectId: file.projectId,
      deviceId,
      junctionId,
      sourceFileId: file.id,
      sourceColumn: column,
      quantity,
      label: label || readLabel || file.name.slice(0, 200),
      points: values.length,
      firstNm: wavelengthNm[0]!,
      lastNm: wavelengthNm.at(-1)!,
      wavelengthNm,
      values,
      mapping,
      conditions,
      origin: 'eqe-file' as const,
      parentScanIds: [],
      biasSeriesId: null,
      state: 'checked' as const,
      decidedById: null,
      decidedAt: null,
      decisionReason: '',
      uploadedAt,
      uploadedById: actor.personId,
      version: 1,
      deletedAt: null,
    }
  })
}

async function recordConfirmation(
  work: Work,
  actor: Actor,
  file: SourceFile,
  rows: readonly NewScanRow[],
  devices: readonly DeviceWithStack[],
): Promise<void> {
  const names = devices.map((device) => device.name).join(', ')
  const count = rows.length === 1 ? 'one scan' : `${rows.length} scans`
  await recordAudit(work, {
    actor,
    projectId: file.projectId,
    action: 'scan.created',
    sentence: `${actor.name} made ${count} of ${names} from ${file.name}.`,
    subject: { kind: 'source-file', id: file.id, name: file.name },
  })
}
