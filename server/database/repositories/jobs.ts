import { Job } from '../entities/Job.js'
import { Scan } from '../entities/Scan.js'
import type { Work } from '../transaction.js'

export type JobRow = Omit<Job, 'project' | 'requestedBy'>

export async function insertJob(work: Work, row: JobRow): Promise<void> {
  await work.insert(Job, row)
}

export async function jobOfProject(work: Work, projectId: string, jobId: string): Promise<Job | null> {
  return work.findOne(Job, { where: { id: jobId, projectId }, relations: { requestedBy: true } })
}

/** Newest first. */
export async function jobsOfProject(work: Work, projectId: string, limit: number): Promise<Job[]> {
  return work.find(Job, {
    where: { projectId },
    relations: { requestedBy: true },
    order: { createdAt: 'DESC', id: 'DESC' },
    take: limit,
  })
}

export async function waitingJob(work: Work, projectId: string, kind: Job['kind']): Promise<Job | null> {
  return work.findOne(Job, { where: { projectId, kind, state: 'waiting' }, relations: { requestedBy: true } })
}

/**
 * Takes the oldest job that waits, or whose server let its lease run out. One statement decides which server gets it:
 * the row is changed only while it is still free.
 */
export async function claimJob(work: Work, runId: string, now: Date, leaseUntil: Date): Promise<Job | null> {
  const free = "(state = 'waiting' OR (state = 'running' AND leaseUntil < :now))"
  const next = await work
    .createQueryBuilder(Job, 'job')
    .where(free, { now })
    .orderBy('job.createdAt')
    .addOrderBy('job.id')
    .getOne()
  if (!next) return null
  const { affected } = await work
    .createQueryBuilder()
    .update(Job)
    .set({ state: 'running', runId, leaseUntil })
    .where(`id = :id AND ${free}`, { id: next.id, now })
    .execute()
  return affected === 1 ? work.findOneBy(Job, { id: next.id, runId }) : null
}

/** Writes down how far a run is and renews its lease; false when the job was cancelled or taken by another server. */
export async function reportProgress(
  work: Work,
  jobId: string,
  runId: string,
  progress: Pick<Job, 'done' | 'total' | 'message' | 'leaseUntil'>,
): Promise<boolean> {
  await work.update(Job, { id: jobId, runId, state: 'running' }, progress)
  return work.existsBy(Job, { id: jobId, runId, state: 'running' })
}

/** Ends a job that this run still holds. */
export async function endJob(
  work: Work,
  jobId: string,
  runId: string,
  end: Pick<Job, 'state' | 'message' | 'endedAt'>,
): Promise<void> {
  await work.update(Job, { id: jobId, runId, state: 'running' }, { ...end, leaseUntil: null })
}

export async function markJobCancelled(work: Work, jobId: string, endedAt: Date): Promise<void> {
  await work
    .createQueryBuilder()
    .update(Job)
    .set({ state: 'cancelled', message: 'Cancelled; what was done stays.', leaseUntil: null, endedAt })
    .where("id = :jobId AND state IN ('waiting', 'running')", { jobId })
    .execute()
}

/** Devices of a project that have EQE scans, and how many. */
export async function scanCountsOfDevices(
  work: Work,
  projectId: string,
): Promise<{ deviceId: string; count: number }[]> {
  const rows = await work
    .createQueryBuilder(Scan, 'scan')
    .select('scan.deviceId', 'deviceId')
    .addSelect('COUNT(*)', 'count')
    .innerJoin('scan.device', 'device')
    .where("scan.projectId = :projectId AND scan.quantity = 'eqe'", { projectId })
    .andWhere('scan.deletedAt IS NULL AND device.deletedAt IS NULL')
    .groupBy('scan.deviceId')
    .orderBy('scan.deviceId')
    .getRawMany<{ deviceId: string; count: string }>()
  return rows.map(({ deviceId, count }) => ({ deviceId, count: Number(count) }))
}
