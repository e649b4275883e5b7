import { v7 as uuid } from 'uuid'
import type { Job } from '../database/entities/Job.js'
import { claimJob, endJob, reportProgress, scanCountsOfDevices } from '../database/repositories/jobs.js'
import { lockedProject } from '../database/repositories/projects.js'
import { projectsWithUncheckedScans } from '../database/repositories/scanChecks.js'
import type { Database } from '../database/transaction.js'
import { recheckDevice } from '../services/checks/recheckDevice.js'
import { enqueueRecheck } from '../services/jobs/enqueueRecheck.js'
import { checksInWorker } from './checksInWorker.js'

/** A run that does not report for this long is taken for dead, and its job may be run by another server. */
const LEASE_MS = 60_000

/** Runs the jobs that wait, one after the other, until none is left. Any number of servers may do so at once. */
export async function runDueJobs(database: Database): Promise<void> {
  for (;;) {
    const runId = uuid()
    const now = new Date()
    const job = await claimJob(database.work, runId, now, leaseFrom(now))
    if (!job) return
    await run(database, job, runId)
  }
}

/** Has the scans checked that were there before their checks were kept. */
export async function enqueueMissingChecks(database: Database): Promise<void> {
  for (const projectId of await projectsWithUncheckedScans(database.work))
    await database.transaction(async (work) => {
      await lockedProject(work, projectId)
      await enqueueRecheck(work, projectId, null)
    })
}

async function run(database: Database, job: Job, runId: string): Promise<void> {
  const end = (state: Job['state'], message: string) =>
    endJob(database.work, job.id, runId, { state, message: message.slice(0, 1000), endedAt: new Date() })
  try {
    const devices = await scanCountsOfDevices(database.work, job.projectId)
    const total = devices.reduce((sum, { count }) => sum + count, 0)
    let done = 0
    for (const { deviceId, count } of devices) {
      const progress = { done, total, message: `Checked ${done} of ${total} scans.`, leaseUntil: leaseFrom(new Date()) }
      if (!(await reportProgress(database.work, job.id, runId, progress))) return
      await database.transaction((work) => recheckDevice(work, job.projectId, deviceId, checksInWorker))
      done += count
    }
    const message = `Checked ${total} ${total === 1 ? 'scan' : 'scans'}.`
    const last = { done, total, message, leaseUntil: leaseFrom(new Date()) }
    if (await reportProgress(database.work, job.id, runId, last)) await end('done', message)
  } catch (error) {
    await end('failed', `Stopped: ${error instanceof Error ? error.message : String(error)}`)
    throw error
  }
}

const leaseFrom = (now: Date): Date => new Date(now.getTime() + LEASE_MS)
