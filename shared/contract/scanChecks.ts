import { z } from 'zod'
import { Finding } from './findings.js'
import { Finite, Id, Nothing, Reason, Timestamp } from './primitives.js'
import { ProjectParams } from './projects.js'
import { defineRoute } from './route.js'
import { ScanParams } from './scans.js'
import { Job } from './jobs.js'

const group = 'Checks'

/** Everything that the checks say of one scan. A check without its inputs is never among those that passed. */
export const ScanCheckReport = z
  .object({
    scanId: Id,
    findings: z.array(Finding),
    passed: z.array(z.object({ check: z.string(), title: z.string() })),
    notChecked: z.array(z.object({ check: z.string(), title: z.string(), reason: z.string() })),
    spectrum: z.string().meta({ description: 'The spectrum that checks count currents under, whatever a page shows' }),
    checkedAt: Timestamp,
  })
  .meta({ id: 'ScanCheckReport' })
export type ScanCheckReport = z.infer<typeof ScanCheckReport>

export const readScanChecks = defineRoute({
  id: 'readScanChecks',
  method: 'get',
  path: '/api/projects/:projectId/scans/:scanId/checks',
  group,
  summary: 'What the checks found on a scan, what passed, and what could not be checked and why',
  access: { right: 'read' },
  params: ScanParams,
  reply: ScanCheckReport,
})

const FindingParams = ScanParams.extend({ findingId: Id })

export const answerFinding = defineRoute({
  id: 'answerFinding',
  method: 'put',
  path: '/api/projects/:projectId/scans/:scanId/findings/:findingId/answer',
  group,
  summary: 'Answer a finding: repeated as another scan, or accepted because …',
  access: { right: 'edit-scans' },
  params: FindingParams,
  body: z.discriminatedUnion('kind', [
    z.strictObject({ kind: z.literal('accepted'), reason: Reason }),
    z.strictObject({
      kind: z.literal('repeated'),
      repeatedAsScanId: Id,
      reason: z.string().trim().max(1000).default(''),
    }),
  ]),
  reply: Finding,
})

export const withdrawAnswer = defineRoute({
  id: 'withdrawAnswer',
  method: 'delete',
  path: '/api/projects/:projectId/scans/:scanId/findings/:findingId/answer',
  group,
  summary: 'Take the answer to a finding back',
  access: { right: 'edit-scans' },
  params: FindingParams,
  reply: Nothing,
})

export const CheckThreshold = z.object({
  name: z.string(),
  meaning: z.string(),
  unit: z.string(),
  defaultValue: z.number(),
  value: z.number(),
})
/** The checks with the project's thresholds. */
export const Thresholds = z
  .object({
    version: z.int().min(0).meta({ description: 'Zero while every threshold has its default' }),
    checks: z.array(
      z.object({
        check: z.string(),
        title: z.string(),
        inputs: z.array(z.string()),
        advice: z.string(),
        thresholds: z.array(CheckThreshold),
      }),
    ),
  })
  .meta({ id: 'Thresholds' })
export type Thresholds = z.infer<typeof Thresholds>

export const readThresholds = defineRoute({
  id: 'readThresholds',
  method: 'get',
  path: '/api/projects/:projectId/thresholds',
  group,
  summary: 'The checks with their thresholds in this project',
  access: { right: 'read' },
  params: ProjectParams,
  reply: Thresholds,
})

export const updateThresholds = defineRoute({
  id: 'updateThresholds',
  method: 'put',
  path: '/api/projects/:projectId/thresholds',
  group,
  summary: 'Change thresholds; every scan of the project is checked again by a job',
  access: { right: 'edit-scans' },
  params: ProjectParams,
  body: z.strictObject({
    version: z.int().min(0),
    settings: z
      .record(z.string(), z.record(z.string(), Finite))
      .meta({ description: 'By check and threshold; what is left out has its default' }),
  }),
  reply: z.object({ thresholds: Thresholds, job: Job }),
})
