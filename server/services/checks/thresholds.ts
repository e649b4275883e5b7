import { ApiError, type FieldError } from '../../../shared/contract/errors.js'
import type { Job } from '../../../shared/contract/jobs.js'
import type { BodyOf } from '../../../shared/contract/route.js'
import type { Thresholds, updateThresholds as route } from '../../../shared/contract/scanChecks.js'
import { CHECKS, thresholdsOf, type ThresholdSettings } from '../../../shared/physics/checks/index.js'
import { lockedProject } from '../../database/repositories/projects.js'
import { saveThresholds, thresholdsOfProject } from '../../database/repositories/thresholds.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { enqueueRecheck } from '../jobs/enqueueRecheck.js'
import { requireMember } from '../rights.js'
import { requireCurrentVersion } from '../staleVersion.js'

export async function readThresholds({ work }: Database, actor: Actor, projectId: string): Promise<Thresholds> {
  await requireMember(work, actor, projectId, 'read')
  return presentThresholds(await thresholdsOfProject(work, projectId))
}

/** Saves the thresholds and has every scan of the project checked again. */
export async function updateThresholds(
  database: Database,
  actor: Actor,
  projectId: string,
  { version, settings }: BodyOf<typeof route>,
): Promise<{ thresholds: Thresholds; job: Job }> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    await lockedProject(work, projectId)
    const before = await thresholdsOfProject(work, projectId)
    requireCurrentVersion(version, presentThresholds(before), 'the thresholds')
    requireKnown(settings)
    const after = { settings: withoutDefaults(settings), version: version + 1 }
    await saveThresholds(work, { projectId, ...after })
    await recordAudit(work, {
      actor,
      projectId,
      action: 'thresholds.updated',
      sentence: `${actor.name} changed the thresholds of the checks: ${changes(before.settings, after.settings)}.`,
    })
    const job = await enqueueRecheck(work, projectId, actor)
    return { thresholds: presentThresholds(after), job }
  })
}

function presentThresholds({ settings, version }: { settings: ThresholdSettings; version: number }): Thresholds {
  return {
    version,
    checks: CHECKS.map((check) => {
      const values = thresholdsOf(check, settings[check.name])
      return {
        check: check.name,
        title: check.title,
        inputs: [...check.inputs],
        advice: check.advice,
        thresholds: Object.entries(check.defaultThresholds).map(([name, { value, unit, meaning }]) => ({
          name,
          meaning,
          unit,
          defaultValue: value,
          value: values[name]!,
        })),
      }
    }),
  }
}

function requireKnown(settings: ThresholdSettings): void {
  const errors = Object.entries(settings).flatMap(([name, values]): FieldError[] => {
    const check = CHECKS.find((one) => one.name === name)
    if (!check) return [{ path: ['settings', name], message: `There is no check named ${name}.` }]
    return Object.entries(values).flatMap(([threshold, value]): FieldError[] => {
      const path = ['settings', name, threshold]
      const known = check.defaultThresholds[threshold]
      if (!known) {
        const there = Object.keys(check.defaultThresholds).join(', ')
        return [{ path, message: `${check.title} has no threshold ${threshold}; it has ${there}.` }]
      }
      if (known.value > 0 && !(value > 0))
        return [{ path, message: `${known.meaning}: ${value} cannot be used; it must be above zero.` }]
      return []
    })
  })
  if (errors.length > 0) throw new ApiError('INPUT_INVALID', { errors }, errors.map((error) => error.message).join(' '))
}

/** A value that is the default is not kept, so that a default that changes later holds. */
function withoutDefaults(settings: ThresholdSettings): ThresholdSettings {
  const kept = CHECKS.flatMap((check) => {
    const values = Object.entries(settings[check.name] ?? {}).filter(
      ([name, value]) => value !== check.defaultThresholds[name]!.value,
    )
    return values.length === 0 ? [] : [[check.name, Object.fromEntries(values)] as const]
  })
  return Object.fromEntries(kept)
}

function changes(before: ThresholdSettings, after: ThresholdSettings): string {
  const words = CHECKS.flatMap((check) => {
    const old = thresholdsOf(check, before[check.name])
    return Object.entries(thresholdsOf(check, after[check.name]))
      .filter(([name, value]) => old[name] !== value)
      .map(([name, value]) => `${check.title}, ${name} from ${old[name]} to ${value}`)
  })
  return words.length === 0 ? 'nothing differs' : words.join('; ')
}
