import { z } from 'zod'
import { Id } from './primitives.js'

export const SEVERITIES = ['note', 'caution', 'reject'] as const
export const Severity = z.enum(SEVERITIES).meta({ id: 'Severity' })
export type Severity = z.infer<typeof Severity>

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
    scanId: Id,
    junctionPosition: z.int().nullable(),
  })
  .meta({ id: 'Finding' })
export type Finding = z.infer<typeof Finding>
