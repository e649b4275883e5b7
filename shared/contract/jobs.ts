import { z } from 'zod'
import { Id, PersonReference, Timestamp } from './primitives.js'
import { ProjectParams } from './projects.js'
import { defineRoute } from './route.js'

/** Work that takes longer than a request. */
export const Job = z
  .object({
    id: Id,
    kind: z.enum(['recheck-scans']),
    state: z.enum(['waiting', 'running', 'done', 'failed', 'cancelled']),
    done: z.int(),
    total: z.int(),
    message: z.string().meta({ description: 'What is being done, or why it failed' }),
    requestedBy: PersonReference.nullable().meta({ description: 'Null for what the server started of itself' }),
    createdAt: Timestamp,
    endedAt: Timestamp.nullable(),
  })
  .meta({ id: 'Job' })
export type Job = z.infer<typeof Job>

const JobParams = ProjectParams.extend({ jobId: Id })
const group = 'Jobs'

export const listJobs = defineRoute({
  id: 'listJobs',
  method: 'get',
  path: '/api/projects/:projectId/jobs',
  group,
  summary: 'The latest twenty jobs of a project, newest first',
  access: { right: 'read' },
  params: ProjectParams,
  reply: z.object({ items: z.array(Job) }),
})

export const startRecheck = defineRoute({
  id: 'startRecheck',
  method: 'post',
  path: '/api/projects/:projectId/jobs',
  group,
  summary: 'Check every scan of the project again',
  access: { right: 'edit-scans' },
  params: ProjectParams,
  reply: Job,
  status: 202,
})

export const readJob = defineRoute({
  id: 'readJob',
  method: 'get',
  path: '/api/projects/:projectId/jobs/:jobId',
  group,
  summary: 'How far a job is',
  access: { right: 'read' },
  params: JobParams,
  reply: Job,
})

export const cancelJob = defineRoute({
  id: 'cancelJob',
  method: 'delete',
  path: '/api/projects/:projectId/jobs/:jobId',
  group,
  summary: 'Stop a job; what it has done stays',
  access: { right: 'edit-scans' },
  params: JobParams,
  reply: Job,
})
