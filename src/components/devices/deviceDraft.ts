import type { z } from 'zod'
import { JUNCTION_COUNT, NewDevice, type Device, type Terminals } from '../../../shared/contract/devices.js'
import type { FieldError } from '../../../shared/contract/errors.js'
import { numberOf, textOf } from '../../formats/numberInput.js'

/** A device while it is being described: numbers are still text, as typed. */
export interface JunctionDraft {
  key: number
  id: string | null
  label: string
  absorber: string
  nominalGapEv: string
  thicknessNm: string
}
export interface LayerDraft {
  key: number
  name: string
  material: string
  thicknessNm: string
  junctionIndex: number | null
}
export interface DeviceDraft {
  name: string
  sampleId: string
  description: string
  series: string
  apertureAreaCm2: string
  deviceAreaCm2: string
  terminals: Terminals
  junctions: JunctionDraft[]
  layers: LayerDraft[]
}

let keys = 0
const nextKey = () => (keys += 1)

const LABELS: Record<number, readonly string[]> = {
  2: ['top', 'bottom'],
  3: ['top', 'middle', 'bottom'],
  4: ['top', 'second', 'third', 'bottom'],
}
const emptyJunction = (label: string): JunctionDraft => ({
  key: nextKey(),
  id: null,
  label,
  absorber: '',
  nominalGapEv: '',
  thicknessNm: '',
})

export function emptyDraft(): DeviceDraft {
  return {
    name: '',
    sampleId: '',
    description: '',
    series: '',
    apertureAreaCm2: '',
    deviceAreaCm2: '',
    terminals: '2-terminal',
    junctions: LABELS[2]!.map(emptyJunction),
    layers: [],
  }
}

export function draftOf(device: Device): DeviceDraft {
  return {
    name: device.name,
    sampleId: device.sampleId,
    description: device.description,
    series: device.series,
    apertureAreaCm2: textOf(device.apertureAreaCm2),
    deviceAreaCm2: textOf(device.deviceAreaCm2),
    terminals: device.terminals,
    junctions: device.junctions.map((junction) => ({
      key: nextKey(),
      id: junction.id,
      label: junction.label,
      absorber: junction.absorber,
      nominalGapEv: textOf(junction.nominalGapEv),
      thicknessNm: textOf(junction.thicknessNm),
    })),
    layers: device.layers.map((layer) => ({
      key: nextKey(),
      name: layer.name,
      material: layer.material,
      thicknessNm: textOf(layer.thicknessNm),
      junctionIndex: layer.junctionIndex,
    })),
  }
}

/** Another wiring: junctions that stay keep what was typed; the last one stays last. */
export function withTerminals(draft: DeviceDraft, terminals: Terminals): DeviceDraft {
  const count = JUNCTION_COUNT[terminals]
  const kept = draft.junctions
  if (kept.length === count) return { ...draft, terminals }
  const labels = LABELS[count]!
  const first = kept.slice(0, Math.min(kept.length, count) - 1)
  const last = kept.at(-1)!
  const added = labels.slice(first.length, count - 1).map(emptyJunction)
  const isOwnLabel = (label: string) => Object.values(LABELS).some((list) => list.includes(label))
  const junctions = [...first, ...added, last].map((junction, i) =>
    isOwnLabel(junction.label) ? { ...junction, label: labels[i]! } : junction,
  )
  const layers = draft.layers.map((layer) =>
    layer.junctionIndex === null || layer.junctionIndex < count ? layer : { ...layer, junctionIndex: null },
  )
  return { ...draft, terminals, junctions, layers }
}

export const addedLayer = (): LayerDraft => ({
  key: nextKey(),
  name: '',
  material: '',
  thicknessNm: '',
  junctionIndex: null,
})

/** What is sent: text becomes numbers, the keys of the form stay behind. */
export function inputOf(draft: DeviceDraft): z.input<typeof NewDevice> {
  return {
    name: draft.name,
    sampleId: draft.sampleId,
    description: draft.description,
    series: draft.series,
    apertureAreaCm2: numberOf(draft.apertureAreaCm2),
    deviceAreaCm2: numberOf(draft.deviceAreaCm2),
    terminals: draft.terminals,
    junctions: draft.junctions.map((junction) => ({
      ...(junction.id === null ? {} : { id: junction.id }),
      label: junction.label,
      absorber: junction.absorber,
      nominalGapEv: numberOf(junction.nominalGapEv),
      thicknessNm: numberOf(junction.thicknessNm),
    })),
    layers: draft.layers.map((layer) => ({
      name: layer.name,
      material: layer.material,
      thicknessNm: numberOf(layer.thicknessNm),
      junctionIndex: layer.junctionIndex,
    })),
  }
}

/** What the contract would object to, before anything is sent. */
export function problemsOf(draft: DeviceDraft): FieldError[] {
  const parsed = NewDevice.safeParse(inputOf(draft))
  if (parsed.success) return []
  return parsed.error.issues.map((issue) => ({
    path: issue.path.map((step) => (typeof step === 'symbol' ? String(step) : step)),
    message: sentence(issue),
  }))
}

function sentence(issue: z.core.$ZodIssue): string {
  if (issue.code === 'invalid_type') return 'This is not a number. Write it like 1.68.'
  if (issue.code === 'too_small' && issue.origin === 'number') return 'Give a number above zero.'
  if (issue.code === 'too_big' && issue.origin === 'number') return `The largest number here is ${issue.maximum}.`
  if (issue.code === 'too_big') return `At most ${issue.maximum} characters.`
  return issue.message
}
