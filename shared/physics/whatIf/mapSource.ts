import type { CompiledDevice } from './compiledDevice.js'
import type { Change } from './device.js'
import type { ResolvedAxis } from './mapAxis.js'
import { setIn, type DeviceState } from './parameters.js'
import { SeparableSegment } from './separableSegment.js'

/** Fills the currents of some columns of one row: `out[p][row × columns + column]`. */
export interface MapSource {
  fillRow(row: number, columns: Int32Array, count: number, out: readonly Float64Array[]): void
}

/** The state of a point. Gaps and thicknesses that no axis touches come from `change`. */
export function stateAt(
  compiled: CompiledDevice,
  change: Change,
  axes: readonly { readonly axis: ResolvedAxis; readonly value: number }[],
): DeviceState {
  const state = compiled.state(change)
  for (const { axis, value } of axes) setIn(compiled.device, state, axis.parameter, value, axis.key)
  return state
}

/** Every point by itself: transfer matrix, and two parameters of one junction. */
class PointwiseSource implements MapSource {
  private readonly currents: Float64Array

  constructor(
    private readonly compiled: CompiledDevice,
    private readonly change: Change,
    private readonly x: ResolvedAxis,
    private readonly y: ResolvedAxis,
  ) {
    this.currents = new Float64Array(compiled.device.junctions.length)
  }

  fillRow(row: number, columns: Int32Array, count: number, out: readonly Float64Array[]): void {
    const width = this.x.values.length
    const state = stateAt(this.compiled, this.change, [{ axis: this.y, value: this.y.values[row]! }])
    for (let c = 0; c < count; c++) {
      const column = columns[c]!
      setIn(this.compiled.device, state, this.x.parameter, this.x.values[column]!, this.x.key)
      this.compiled.currents(state, this.currents)
      for (let p = 0; p < out.length; p++) out[p]![row * width + column] = this.currents[p]!
    }
  }
}

/**
 * Beer–Lambert with the axes on two different junctions: every factor of A'/A belongs to one junction, so that each axis
 * has its table of factors and a point is a dot product.
 */
class SeparableSource implements MapSource {
  private readonly segments: readonly SeparableSegment[]
  private readonly width: number

  constructor(compiled: CompiledDevice, change: Change, x: ResolvedAxis, y: ResolvedAxis) {
    this.width = x.values.length
    this.segments = compiled.segments.flatMap((_, s) => {
      const made = SeparableSegment.make(compiled, s, change, x, y)
      return made ? [made] : []
    })
  }

  fillRow(row: number, columns: Int32Array, count: number, out: readonly Float64Array[]): void {
    const start = row * this.width
    for (const currents of out) for (let c = 0; c < count; c++) currents[start + columns[c]!] = 0
    for (const segment of this.segments) segment.addRow(row, columns, count, out[segment.junction]!, start)
  }
}

function junctionOf(axis: ResolvedAxis): number {
  return 'junction' in axis.parameter ? axis.parameter.junction : -1
}

/** The cheapest exact source for a map. */
export function mapSource(compiled: CompiledDevice, change: Change, x: ResolvedAxis, y: ResolvedAxis): MapSource {
  const isSeparable =
    compiled.model === 'beer-lambert' && junctionOf(x) !== junctionOf(y) && junctionOf(x) >= 0 && junctionOf(y) >= 0
  return isSeparable ? new SeparableSource(compiled, change, x, y) : new PointwiseSource(compiled, change, x, y)
}
