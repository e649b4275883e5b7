import type { Device } from '../../../shared/contract/devices.js'
import type { BodySent } from '../../../shared/contract/route.js'
import type { Conditions, FileReading, ReadingMapping, confirmReading } from '../../../shared/contract/scans.js'
import { Conditions as ConditionsSchema } from '../../../shared/contract/scans.js'
import { suggestJunctions } from './suggestJunctions.js'

/** What a person is about to confirm for one file. */
export interface FileDraft {
  reading: FileReading
  mapping: ReadingMapping | null
  /** Device and junction of each used column; a reflectance column needs only the device. */
  targets: Record<number, { deviceId: string | null; junctionId: string | null }>
  /** Null: the conditions of the whole upload apply. */
  ownConditions: Conditions | null
  state: 'open' | 'saving' | 'saved'
  problem: string | null
}

export function emptyConditions(): Conditions {
  return ConditionsSchema.parse({})
}

export function draftOf(reading: FileReading): FileDraft {
  return { reading, mapping: reading.mapping, targets: {}, ownConditions: null, state: 'open', problem: null }
}

/** Puts every EQE column without a target where it most likely belongs on `device`; reflectance goes to the device. */
export function withSuggestedTargets(drafts: readonly FileDraft[], device: Device): FileDraft[] {
  const taken = new Set(
    drafts.flatMap((draft) => Object.values(draft.targets).map((target) => target.junctionId ?? '')),
  )
  const curves = drafts.flatMap((draft, f) =>
    draft.reading.series
      .filter((series) => series.quantity === 'eqe' && isOpen(draft, series.column, device))
      .map((series) => ({
        key: `${f}:${series.column}`,
        name: `${draft.reading.file.name} ${series.label}`,
        curve: series.curve,
      })),
  )
  const suggested = suggestJunctions(curves, device, taken)
  return drafts.map((draft, f) => {
    const targets = { ...draft.targets }
    for (const series of draft.reading.series) {
      if (!isOpen(draft, series.column, device)) continue
      if (series.quantity === 'reflectance') targets[series.column] = { deviceId: device.id, junctionId: null }
      if (series.quantity === 'eqe')
        targets[series.column] = { deviceId: device.id, junctionId: suggested.get(`${f}:${series.column}`) ?? null }
    }
    return { ...draft, targets }
  })
}

/** Whether nobody has said yet where a column belongs; one given to another device is left alone. */
function isOpen(draft: FileDraft, column: number, device: Device): boolean {
  const target = draft.targets[column]
  return !target || (target.junctionId === null && target.deviceId === device.id)
}

/** What still keeps a file from being confirmed, as a sentence; null when it is ready. */
export function missingIn(draft: FileDraft): string | null {
  if (draft.reading.problem) return draft.reading.problem.reason
  if (!draft.mapping) return 'Say which column holds the wavelengths and which the values.'
  const used = draft.mapping.series.filter((series) => series.quantity === 'eqe' || series.quantity === 'reflectance')
  if (used.length === 0) return 'Choose at least one column with an EQE or a reflectance.'
  const chosen = new Set<string>()
  for (const series of used) {
    const target = draft.targets[series.column]
    if (!target?.deviceId) return `Choose the device of “${series.label}”.`
    if (series.quantity !== 'eqe') continue
    if (!target.junctionId) return `Choose the junction of “${series.label}”.`
    if (chosen.has(target.junctionId)) return 'Two columns of this file are given to the same junction.'
    chosen.add(target.junctionId)
  }
  return null
}

export function confirmationOf(draft: FileDraft, shared: Conditions): BodySent<typeof confirmReading> {
  const mapping = draft.mapping!
  return {
    mapping,
    scans: mapping.series.flatMap((series) => {
      if (series.quantity !== 'eqe' && series.quantity !== 'reflectance') return []
      const target = draft.targets[series.column]!
      return [
        {
          column: series.column,
          quantity: series.quantity,
          deviceId: target.deviceId!,
          junctionId: series.quantity === 'eqe' ? target.junctionId : null,
          label: series.label || draft.reading.file.name,
          conditions: draft.ownConditions ?? shared,
        },
      ]
    }),
  }
}
