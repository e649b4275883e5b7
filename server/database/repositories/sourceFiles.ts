import { IsNull } from 'typeorm'
import { isDuplicateKey } from '../databaseErrors.js'
import type { Work } from '../transaction.js'
import type { TimePosition } from './position.js'
import { BenchItem } from '../entities/BenchItem.js'
import { RawMeasurement } from '../entities/RawMeasurement.js'
import { Scan } from '../entities/Scan.js'
import { SourceFile } from '../entities/SourceFile.js'
import { Spectrum } from '../entities/Spectrum.js'

export async function sourceFileOfProject(
  work: Work,
  projectId: string,
  sourceFileId: string,
): Promise<SourceFile | null> {
  return work.findOne(SourceFile, { where: { id: sourceFileId, projectId }, relations: { uploadedBy: true } })
}

/** Locks the file's row until the transaction ends, so that two confirmations of one file come one after the other. */
export async function lockSourceFile(work: Work, projectId: string, sourceFileId: string): Promise<boolean> {
  const found = await work.findOne(SourceFile, {
    where: { id: sourceFileId, projectId },
    lock: { mode: 'pessimistic_write' },
  })
  return found !== null
}

export async function bytesOfSourceFile(work: Work, sourceFileId: string): Promise<Buffer> {
  const { bytes } = await work.findOneOrFail(SourceFile, {
    select: { id: true, bytes: true },
    where: { id: sourceFileId },
  })
  return bytes
}

/** Newest first. */
export async function sourceFilesOfProject(
  work: Work,
  projectId: string,
  state: SourceFile['state'] | undefined,
  after: TimePosition | null,
  limit: number,
): Promise<{ files: SourceFile[]; total: number }> {
  const query = work.createQueryBuilder(SourceFile, 'file').where('file.projectId = :projectId', { projectId })
  if (state) query.andWhere('file.state = :state', { state })
  const total = await query.clone().getCount()
  if (after) query.andWhere('(file.uploadedAt < :at OR (file.uploadedAt = :at AND file.id < :id))', after)
  const files = await query
    .innerJoinAndSelect('file.uploadedBy', 'uploadedBy')
    .orderBy('file.uploadedAt', 'DESC')
    .addOrderBy('file.id', 'DESC')
    .limit(limit)
    .getMany()
  return { files, total }
}

/**
 * Keeps a file, unless the project has the same bytes already: then their id is given. Two uploads of the same bytes at
 * the same moment end with one row, which the unique key decides.
 */
export async function keepSourceFile(
  work: Work,
  file: Omit<SourceFile, 'project' | 'uploadedBy'>,
): Promise<{ id: string; isKnown: boolean }> {
  const sameBytes = { projectId: file.projectId, sha256: file.sha256 }
  const known = await work.findOne(SourceFile, { select: { id: true }, where: sameBytes })
  if (known) return { id: known.id, isKnown: true }
  try {
    await work.insert(SourceFile, file)
    return { id: file.id, isKnown: false }
  } catch (error) {
    if (!isDuplicateKey(error)) throw error
    // A locking read sees what another transaction has committed since this one began.
    const { id } = await work.findOneOrFail(SourceFile, {
      select: { id: true },
      where: sameBytes,
      lock: { mode: 'pessimistic_read' },
    })
    return { id, isKnown: true }
  }
}

/** `read` as long as a scan, a spectrum or a calibration rests on the file, `uploaded` otherwise. */
export async function refreshSourceFileState(work: Work, sourceFileId: string): Promise<void> {
  const isUsed =
    (await work.existsBy(Scan, { sourceFileId, deletedAt: IsNull() })) ||
    (await work.existsBy(Spectrum, { sourceFileId })) ||
    (await isCalibrationOrReference(work, sourceFileId))
  await work.update(SourceFile, { id: sourceFileId }, { state: isUsed ? 'read' : 'uploaded' })
}

export async function removeSourceFile(work: Work, sourceFileId: string): Promise<void> {
  await work.delete(SourceFile, { id: sourceFileId })
}

/** Whether a detector's calibration was read from the file, or it holds the reference pass of a raw scan. */
export async function isCalibrationOrReference(work: Work, sourceFileId: string): Promise<boolean> {
  const names = (path: string) => `JSON_VALUE(one.${path}) = :sourceFileId`
  const isCalibration = await work
    .createQueryBuilder(BenchItem, 'one')
    .where(`one.kind = 'detector' AND ${names("content, '$.sourceFileId'")}`, { sourceFileId })
    .getExists()
  if (isCalibration) return true
  return work
    .createQueryBuilder(RawMeasurement, 'one')
    .where(names("reduction, '$.reference.sourceFileId'"), { sourceFileId })
    .getExists()
}
