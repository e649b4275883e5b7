import { v7 as uuid } from 'uuid'
import type { Job as JobReply } from '../../../shared/contract/jobs.js'
import { insertJob, jobOfProject, scanCountsOfDevices, waitingJob } from '../../database/repositories/jobs.js'
import type { Work } from '../../database/transaction.js'
import { presentJob } from '../../presenters/job.js'
import type { Actor } from '../actor.js'

/** Has every scan of a project checked again. A job that still waits will see what changed, so it serves for this too. */
export async function enqueueRecheck(work: Work, projectId: string, actor: Actor | null): Promise<JobReply> {
  const waiting = await waitingJob(work, projectId, 'recheck-scans')
  if (waiting) return presentJob(waiting)
  const counts = await scanCountsOfDevices(work, projectId)
  const id = uuid()
  await insertJob(work, {
    id,
    projectId,
    kind: 'recheck-scans',
    state: 'waiting',
    done: 0,
    total: counts.reduce((sum, { count }) => sum + count, 0),
    message: 'Waiting for its turn.',
    runId: null,
    leaseUntil: null,
    requestedById: actor?.personId ?? null,
    createdAt: new Date(),
    endedAt: null,
  })
  return presentJob((await jobOfProject(work, projectId, id))!)
}
