import { ApiError } from '../../../shared/contract/errors.js'
import type { Job as JobReply } from '../../../shared/contract/jobs.js'
import type { Job } from '../../database/entities/Job.js'
import { jobOfProject, jobsOfProject, markJobCancelled } from '../../database/repositories/jobs.js'
import { lockedProject } from '../../database/repositories/projects.js'
import type { Database, Work } from '../../database/transaction.js'
import { presentJob } from '../../presenters/job.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { enqueueRecheck } from './enqueueRecheck.js'

const SHOWN = 20

export async function listJobs({ work }: Database, actor: Actor, projectId: string): Promise<{ items: JobReply[] }> {
  await requireMember(work, actor, projectId, 'read')
  return { items: (await jobsOfProject(work, projectId, SHOWN)).map(presentJob) }
}

export async function readJob({ work }: Database, actor: Actor, projectId: string, jobId: string): Promise<JobReply> {
  await requireMember(work, actor, projectId, 'read')
  return presentJob(await findJob(work, projectId, jobId))
}

export async function startRecheck(database: Database, actor: Actor, projectId: string): Promise<JobReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    await lockedProject(work, projectId)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'scans.recheck-started',
      sentence: `${actor.name} had every scan of the project checked again.`,
    })
    return enqueueRecheck(work, projectId, actor)
  })
}

/** A job that has ended stays as it is. */
export async function cancelJob(database: Database, actor: Actor, projectId: string, jobId: string): Promise<JobReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const before = await findJob(work, projectId, jobId)
    await markJobCancelled(work, jobId, new Date())
    const after = await findJob(work, projectId, jobId)
    if (before.state !== after.state)
      await recordAudit(work, {
        actor,
        projectId,
        action: 'job.cancelled',
        sentence: `${actor.name} cancelled the checking of all scans after ${after.done} of ${after.total}.`,
      })
    return presentJob(after)
  })
}

async function findJob(work: Work, projectId: string, jobId: string): Promise<Job> {
  const job = await jobOfProject(work, projectId, jobId)
  if (!job) throw new ApiError('NOT_FOUND', { what: 'job' }, 'There is no such job in this project.')
  return job
}
