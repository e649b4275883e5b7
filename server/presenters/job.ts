import type { Job as JobReply } from '../../shared/contract/jobs.js'
import type { Job } from '../database/entities/Job.js'

/** Needs the relation `requestedBy`. */
export function presentJob(job: Job): JobReply {
  return {
    id: job.id,
    kind: job.kind,
    state: job.state,
    done: job.done,
    total: job.total,
    message: job.message,
    requestedBy: job.requestedBy && { id: job.requestedBy.id, name: job.requestedBy.name },
    createdAt: job.createdAt.toISOString(),
    endedAt: job.endedAt?.toISOString() ?? null,
  }
}
