import { z } from 'zod'
import { Id, PersonReference, Timestamp } from './primitives.js'

export const SEVERITIES = ['note', 'caution', 'reject'] as const
export const Severity = z.enum(SEVERITIES).meta({ id: 'Severity' })
export type Severity = z.infer<typeof Severity>

/** What somebody said to a finding. It stays while the finding is the same: same check, severity and numbers. */
export const FindingAnswer = z
  .object({
    kind: z.enum(['repeated', 'accepted']),
    repeatedAsScanId: Id.nullable().meta({ description: 'The scan that replaces this one, of a repeated one' }),
    reason: z.string(),
    by: PersonReference,
    at: Timestamp,
  })
  .meta({ id: 'FindingAnswer' })
export type FindingAnswer = z.infer<typeof FindingAnswer>

/** What a check found on a scan: what fired, the numbers that made it fire, where, and what to do at the bench. */
export const Finding = z
  .object({
    check: z.string(),
    title: z.string(),
    severity: Severity,
    message: z.string(),
    advice: z.string(),
    bandsNm: z.array(z.tuple([z.number(), z.number()])),
    numbers: z.record(z.string(), z.object({ value: z.number(), unit: z.string() })),
    id: Id,
    scanId: Id,
    junctionPosition: z.int().nullable(),
    answer: FindingAnswer.nullable(),
  })
  .meta({ id: 'Finding' })
export type Finding = z.infer<typeof Finding>
