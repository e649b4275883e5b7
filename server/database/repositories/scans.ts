import { In, IsNull, MoreThan, type FindOptionsSelect } from 'typeorm'
import type { Work } from '../transaction.js'
import type { TimePosition } from './position.js'
import { Scan } from '../entities/Scan.js'

const PEOPLE_AND_FILE = { sourceFile: true, uploadedBy: true, decidedBy: true } as const
const HEAD = {
  id: true,
  deviceId: true,
  junctionId: true,
  quantity: true,
  state: true,
  uploadedAt: true,
} as const satisfies FindOptionsSelect<Scan>
export type ScanHeadRow = Pick<Scan, keyof typeof HEAD>

/** One scan that is not deleted, with its curve, its file and who decided. */
export async function scanOfProject(work: Work, projectId: string, scanId: string): Promise<Scan | null> {
  return work.findOne(Scan, {
    where: { id: scanId, projectId, deletedAt: IsNull(), device: { deletedAt: IsNull() } },
    relations: PEOPLE_AND_FILE,
  })
}

/** Locks the scan's row until the transaction ends; a deleted scan too when `deletedSince` is given. */
export async function lockedScan(
  work: Work,
  projectId: string,
  scanId: string,
  deletedSince: Date | null = null,
): Promise<Scan | null> {
  const where = { id: scanId, projectId }
  const locked = await work.findOne(Scan, {
    where: { ...where, deletedAt: deletedSince ? MoreThan(deletedSince) : IsNull() },
    lock: { mode: 'pessimistic_write' },
  })
  return locked && work.findOne(Scan, { where, relations: { ...PEOPLE_AND_FILE, device: true } })
}

/** What decides which scans stand for the junctions of these devices: a light row for each scan, no curve. */
export async function scanHeadsOfDevices(work: Work, deviceIds: string[]): Promise<ScanHeadRow[]> {
  if (deviceIds.length === 0) return []
  return work.find(Scan, { select: HEAD, where: { deviceId: In(deviceIds), deletedAt: IsNull() } })
}

const MEASURED = {
  ...HEAD,
  version: true,
  conditions: true,
  wavelengthNm: true,
  values: true,
} as const satisfies FindOptionsSelect<Scan>
export type MeasuredScanRow = Pick<Scan, keyof typeof MEASURED>

/** The scans with their curves and conditions, without people and files. */
export async function scansWithCurves(work: Work, scanIds: string[]): Promise<MeasuredScanRow[]> {
  if (scanIds.length === 0) return []
  return work.find(Scan, { select: MEASURED, where: { id: In(scanIds) } })
}

/** The scans in the order in which they were made, with their files and people. */
export async function scansById(work: Work, scanIds: string[]): Promise<Scan[]> {
  if (scanIds.length === 0) return []
  return work.find(Scan, { where: { id: In(scanIds) }, relations: PEOPLE_AND_FILE, order: { id: 'ASC' } })
}

export interface ScanFilter {
  deviceId?: string | undefined
  /** Null: scans that are there; a time: scans that were deleted after it. */
  deletedSince: Date | null
}

/** Newest first. */
export async function scansOfProject(
  work: Work,
  projectId: string,
  filter: ScanFilter,
  after: TimePosition | null,
  limit: number,
): Promise<{ scans: Scan[]; total: number }> {
  const query = work
    .createQueryBuilder(Scan, 'scan')
    .innerJoin('scan.device', 'device')
    .where('scan.projectId = :projectId AND device.deletedAt IS NULL', { projectId })
  if (filter.deletedSince) query.andWhere('scan.deletedAt > :since', { since: filter.deletedSince })
  else query.andWhere('scan.deletedAt IS NULL')
  if (filter.deviceId) query.andWhere('scan.deviceId = :deviceId', { deviceId: filter.deviceId })
  const total = await query.clone().getCount()
  if (after) query.andWhere('(scan.uploadedAt < :at OR (scan.uploadedAt = :at AND scan.id < :id))', after)
  const page = await query
    .innerJoinAndSelect('scan.sourceFile', 'sourceFile')
    .innerJoinAndSelect('scan.uploadedBy', 'uploadedBy')
    .leftJoinAndSelect('scan.decidedBy', 'decidedBy')
    .orderBy('scan.uploadedAt', 'DESC')
    .addOrderBy('scan.id', 'DESC')
    .limit(limit)
    .getMany()
  return { scans: page, total }
}

/** How many scans that are not deleted rest on these junctions. */
export async function countScansOfJunctions(work: Work, junctionIds: string[]): Promise<Map<string, number>> {
  if (junctionIds.length === 0) return new Map()
  const scans = await work.find(Scan, {
    select: { id: true, junctionId: true },
    where: { junctionId: In(junctionIds), deletedAt: IsNull() },
  })
  const counts = new Map<string, number>()
  for (const { junctionId } of scans) if (junctionId) counts.set(junctionId, (counts.get(junctionId) ?? 0) + 1)
  return counts
}

/** Scans that were made of a file, deleted ones left out. */
export async function scansOfSourceFiles(
  work: Work,
  sourceFileIds: string[],
): Promise<Pick<Scan, 'id' | 'sourceFileId' | 'sourceColumn' | 'junctionId' | 'deviceId' | 'mapping'>[]> {
  if (sourceFileIds.length === 0) return []
  return work.find(Scan, {
    select: { id: true, sourceFileId: true, sourceColumn: true, junctionId: true, deviceId: true, mapping: true },
    where: { sourceFileId: In(sourceFileIds), deletedAt: IsNull() },
    order: { id: 'ASC' },
  })
}

/** Whether any scan, a deleted one too, was made of the file. */
export async function hasScans(work: Work, sourceFileId: string): Promise<boolean> {
  return work.existsBy(Scan, { sourceFileId })
}

export type NewScanRow = Omit<
  Scan,
  'project' | 'device' | 'junction' | 'sourceFile' | 'uploadedBy' | 'decidedBy' | 'biasSeries'
>

export async function insertScans(work: Work, scans: NewScanRow[]): Promise<void> {
  await work.insert(Scan, scans)
}

export async function saveScanConditions(
  work: Work,
  { id, label, conditions, version }: Pick<Scan, 'id' | 'label' | 'conditions' | 'version'>,
): Promise<void> {
  await work.update(Scan, { id }, { label, conditions, version })
}

/** A raw scan that was computed again. */
export async function saveScanCurve(
  work: Work,
  {
    id,
    ...row
  }: Pick<
    Scan,
    | 'id'
    | 'sourceFileId'
    | 'sourceColumn'
    | 'mapping'
    | 'points'
    | 'firstNm'
    | 'lastNm'
    | 'wavelengthNm'
    | 'values'
    | 'version'
  >,
): Promise<void> {
  await work.update(Scan, { id }, row)
}

export async function saveScanDecision(
  work: Work,
  { id, ...row }: Pick<Scan, 'id' | 'state' | 'decidedById' | 'decidedAt' | 'decisionReason' | 'version'>,
): Promise<void> {
  await work.update(Scan, { id }, row)
}

export async function markScanDeleted(work: Work, scanId: string, deletedAt: Date | null): Promise<void> {
  await work.update(Scan, { id: scanId }, { deletedAt })
}
