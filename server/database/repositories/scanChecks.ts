import { In, IsNull, type FindOptionsSelect } from 'typeorm'
import { Finding } from '../entities/Finding.js'
import { Scan } from '../entities/Scan.js'
import { ScanCheck } from '../entities/ScanCheck.js'
import type { Work } from '../transaction.js'

const CHECKED = {
  id: true,
  deviceId: true,
  junctionId: true,
  quantity: true,
  state: true,
  origin: true,
  biasSeriesId: true,
  uploadedAt: true,
  version: true,
  conditions: true,
  wavelengthNm: true,
  values: true,
} as const satisfies FindOptionsSelect<Scan>
export type CheckedScanRow = Pick<Scan, keyof typeof CHECKED>

/** The scans of a device with curves and conditions, oldest first. */
export async function scansOfDeviceToCheck(work: Work, deviceId: string): Promise<CheckedScanRow[]> {
  return work.find(Scan, { select: CHECKED, where: { deviceId, deletedAt: IsNull() }, order: { id: 'ASC' } })
}

export async function inputsHashesOfScans(work: Work, scanIds: string[]): Promise<Map<string, string>> {
  if (scanIds.length === 0) return new Map()
  const rows = await work.find(ScanCheck, {
    select: { scanId: true, inputsHash: true },
    where: { scanId: In(scanIds) },
  })
  return new Map(rows.map((row) => [row.scanId, row.inputsHash]))
}

export async function scanCheckOf(work: Work, scanId: string): Promise<ScanCheck | null> {
  return work.findOneBy(ScanCheck, { scanId })
}

export async function saveScanChecks(work: Work, checks: Omit<ScanCheck, 'scan'>[]): Promise<void> {
  if (checks.length > 0) await work.upsert(ScanCheck, checks, ['scanId'])
}

export type FindingRow = Omit<Finding, 'scan' | 'answeredBy'>

/** Without the people. */
export async function findingRowsOfScans(work: Work, scanIds: string[]): Promise<FindingRow[]> {
  if (scanIds.length === 0) return []
  return work.findBy(Finding, { scanId: In(scanIds) })
}

/** Worst first within a scan, each with who answered. */
export async function findingsWithAnswers(work: Work, scanIds: string[]): Promise<Finding[]> {
  if (scanIds.length === 0) return []
  return work.find(Finding, {
    where: { scanId: In(scanIds) },
    relations: { answeredBy: true },
    order: { scanId: 'ASC', rank: 'ASC' },
  })
}

/** What these scans' findings are from now on. */
export async function replaceFindings(work: Work, scanIds: string[], rows: FindingRow[]): Promise<void> {
  await work.delete(Finding, { scanId: In(scanIds) })
  if (rows.length > 0) await work.insert(Finding, rows)
}

export async function findingOfScan(work: Work, scanId: string, findingId: string): Promise<Finding | null> {
  return work.findOne(Finding, { where: { id: findingId, scanId }, relations: { answeredBy: true } })
}

export async function saveAnswer(
  work: Work,
  {
    id,
    ...answer
  }: Pick<Finding, 'id' | 'answerKind' | 'repeatedAsScanId' | 'answerReason' | 'answeredById' | 'answeredAt'>,
): Promise<void> {
  await work.update(Finding, { id }, answer)
}

/** Projects with an EQE scan that was never checked: those of before the checks were kept. */
export async function projectsWithUncheckedScans(work: Work): Promise<string[]> {
  const rows = await work
    .createQueryBuilder(Scan, 'scan')
    .select('DISTINCT scan.projectId', 'projectId')
    .innerJoin('scan.device', 'device')
    .innerJoin('scan.project', 'project')
    .leftJoin(ScanCheck, 'checked', 'checked.scanId = scan.id')
    .where("scan.quantity = 'eqe' AND scan.junctionId IS NOT NULL AND scan.deletedAt IS NULL")
    .andWhere('device.deletedAt IS NULL AND project.deletedAt IS NULL AND checked.scanId IS NULL')
    .getRawMany<{ projectId: string }>()
  return rows.map((row) => row.projectId)
}
