import { assertFinite, assertNotNegative, assertPositive, DomainError } from '../errors.js'
import { statedGapEv, type Change, type DeviceModel } from './device.js'

/** What one key of a change speaks of; junctions and layers from 0. */
export type Parameter =
  | { readonly kind: 'thickness' | 'gap' | 'gapShift' | 'pathFactor'; readonly junction: number }
  | { readonly kind: 'layerThickness'; readonly layer: number }

/** Every value that a change can touch. Gaps are shifts from the measured device, eV. */
export interface DeviceState {
  readonly thicknessNm: number[]
  readonly pathFactor: number[]
  readonly gapShiftEv: number[]
  /** Of all layers; those of junctions stand here too and are not used. */
  readonly layerThicknessNm: number[]
}

const KINDS = {
  thicknessNm: 'thickness',
  bandGapEv: 'gap',
  gapShiftEv: 'gapShift',
  pathFactor: 'pathFactor',
} as const

/** Reads a key such as `1.thicknessNm`. @throws DomainError that says which keys the device has. */
export function parseParameter(device: DeviceModel, key: string): Parameter {
  const layerName = /^layer\.(.+)\.thicknessNm$/.exec(key)?.[1]
  if (layerName !== undefined) {
    const layer = device.layers?.findIndex((l) => 'name' in l && l.name === layerName) ?? -1
    if (layer >= 0) return { kind: 'layerThickness', layer }
  }
  const match = /^(\d+)\.(thicknessNm|bandGapEv|gapShiftEv|pathFactor)$/.exec(key)
  const junction = Number(match?.[1]) - 1
  if (!match || !(junction >= 0 && junction < device.junctions.length))
    throw new DomainError(key, `"${key}" is no parameter of this device; it has ${parameterKeys(device).join(', ')}.`)
  const kind = KINDS[match[2] as keyof typeof KINDS]
  if (kind === 'gap' && statedGapEv(device.junctions[junction]!) === undefined)
    throw new DomainError(
      key,
      `Junction ${junction + 1} states no band gap, so "${key}" means nothing; state bandGapEv or use ${junction + 1}.gapShiftEv.`,
    )
  return { kind, junction }
}

/** All keys that a device understands, in the order of its stack. `gapShiftEv` stands for a gap that is not stated. */
export function parameterKeys(device: DeviceModel): string[] {
  const keys = device.junctions.flatMap((junction, i) => [
    `${i + 1}.thicknessNm`,
    `${i + 1}.${statedGapEv(junction) === undefined ? 'gapShiftEv' : 'bandGapEv'}`,
    `${i + 1}.pathFactor`,
  ])
  for (const layer of device.layers ?? []) if ('name' in layer) keys.push(`layer.${layer.name}.thicknessNm`)
  return keys
}

/** The state of the measured device. */
export function measuredState(device: DeviceModel): DeviceState {
  return {
    thicknessNm: device.junctions.map((j) => j.thicknessNm),
    pathFactor: device.junctions.map((j) => j.pathFactor ?? 1),
    gapShiftEv: device.junctions.map(() => 0),
    layerThicknessNm: (device.layers ?? []).map((l) => ('name' in l ? l.thicknessNm : 0)),
  }
}

/** The value of a parameter in a state, in the unit of its key. */
export function valueIn(device: DeviceModel, state: DeviceState, parameter: Parameter): number {
  switch (parameter.kind) {
    case 'thickness':
      return state.thicknessNm[parameter.junction]!
    case 'pathFactor':
      return state.pathFactor[parameter.junction]!
    case 'gapShift':
      return state.gapShiftEv[parameter.junction]!
    case 'gap':
      return statedGapEv(device.junctions[parameter.junction]!)! + state.gapShiftEv[parameter.junction]!
    case 'layerThickness':
      return state.layerThicknessNm[parameter.layer]!
  }
}

/**
 * Sets a parameter in a state. A gap equal to the measured one is a shift of exactly zero.
 * @throws DomainError naming the key when the value is out of its domain.
 */
export function setIn(device: DeviceModel, state: DeviceState, parameter: Parameter, value: number, key: string): void {
  switch (parameter.kind) {
    case 'thickness':
      assertPositive(value, key)
      state.thicknessNm[parameter.junction] = value
      return
    case 'pathFactor':
      assertPositive(value, key)
      state.pathFactor[parameter.junction] = value
      return
    case 'gapShift':
      assertFinite(value, key)
      state.gapShiftEv[parameter.junction] = value
      return
    case 'gap':
      assertPositive(value, key)
      state.gapShiftEv[parameter.junction] = value - statedGapEv(device.junctions[parameter.junction]!)!
      return
    case 'layerThickness':
      assertNotNegative(value, key)
      state.layerThicknessNm[parameter.layer] = value
      return
  }
}

/** The measured state with a change applied. @throws DomainError naming the key. */
export function changedState(device: DeviceModel, change: Change): DeviceState {
  const state = measuredState(device)
  for (const [key, value] of Object.entries(change)) setIn(device, state, parseParameter(device, key), value, key)
  return state
}
