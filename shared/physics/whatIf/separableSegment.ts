import { dot, lowRankOf, project } from '../numerics/lowRank.js'
import type { CompiledDevice } from './compiledDevice.js'
import type { Change } from './device.js'
import { OVERFULL } from './segment.js'
import type { ResolvedAxis } from './mapAxis.js'
import { measuredState, setIn, type DeviceState } from './parameters.js'

/** Factors of A'/A and of A' over the values of one group of changes: value × stride + point. */
interface Factors {
  /** 0 when the axis does not touch this junction's light: one row of ones serves every value. */
  readonly stride: number
  readonly ratio: Float64Array
  readonly absorptance: Float64Array
  readonly through: Float64Array
  /** Whether the segment's own junction belongs to this group. */
  readonly holdsOwn: boolean
  /** With `holdsOwn`: 1 for each value at which a segment beyond its scan counts. */
  readonly counts: Uint8Array
}

/** Wavelengths where EQE/A may have to be continued, packed for the two axes. */
interface WeakPoints {
  readonly count: number
  readonly measured: Float64Array
  readonly collection: Float64Array
  readonly before: Float64Array
  readonly ratioX: Float64Array
  readonly ratioY: Float64Array
  readonly absorptanceX: Float64Array
  readonly absorptanceY: Float64Array
  /** Change of what arrives where the EQE is above A; one elsewhere. */
  readonly isOverfull: Uint8Array
  readonly throughX: Float64Array
  readonly throughY: Float64Array
}

/** Error of a low-rank current, as a share of the longest row: a few roundings. */
const ROUNDING = 4e-16

/**
 * One segment of a map whose two axes belong to different junctions. At ordinary wavelengths the current is
 * `Σ (w EQE f_x) f_y`. The rows of f_x are values of a smooth function and nearly dependent, so that the sum over
 * wavelengths is done once for a few directions of them, to within rounding, and a point costs a dot product of that few;
 * where they are not, the sum over wavelengths is done at every point. The wavelengths where EQE/A may have to be
 * continued are added point by point.
 */
export class SeparableSegment {
  readonly junction: number
  private readonly length: number
  private readonly left: Float64Array
  private readonly right: Float64Array
  private readonly weak: WeakPoints
  /** True when the x axis does not touch this junction's light. */
  private readonly isColumnFixed: boolean
  /** Currents by column, when the y axis does not touch it. */
  private readonly byColumn: Float64Array | null

  /** Null for what lies beyond a scan when no point of the map lowers that junction's gap. */
  static make(
    compiled: CompiledDevice,
    s: number,
    change: Change,
    x: ResolvedAxis,
    y: ResolvedAxis,
  ): SeparableSegment | null {
    const segment = compiled.segments[s]!
    if (segment.isBeyond) {
      // Axes rise, so the first values have the lowest gaps.
      const lowest = compiled.state(change)
      for (const { parameter, values, key } of [x, y]) setIn(compiled.device, lowest, parameter, values[0]!, key)
      if (!compiled.counts(segment, lowest)) return null
    }
    return new SeparableSegment(compiled, s, change, x, y)
  }

  private constructor(compiled: CompiledDevice, s: number, change: Change, x: ResolvedAxis, y: ResolvedAxis) {
    const { junction, weights, eqe, isBeyond, wavelengthNm } = compiled.segments[s]!
    const base = compiled.bases[s]!
    this.junction = junction
    const fx = axisFactors(compiled, s, change, x)
    const fy = axisFactors(compiled, s, change, y)
    const fixed = fixedFactors(compiled, s, change, [ownerOf(x), ownerOf(y)])
    const ordinary: number[] = []
    const weak: number[] = []
    for (let k = 0; k < wavelengthNm.length; k++) (base.isWeak[k] ? weak : ordinary).push(k)
    // An axis that this junction's light does not meet has one row for all its values.
    const width = fx.stride > 0 ? x.values.length : 1
    const height = fy.stride > 0 ? y.values.length : 1

    const left = gather(fx.ratio, fx.stride, width, isBeyond ? [] : ordinary)
    const right = gather(fy.ratio, fy.stride, height, isBeyond ? [] : ordinary)
    const points = isBeyond ? 0 : ordinary.length
    for (let i = 0; i < width; i++)
      for (let n = 0; n < points; n++) {
        const k = ordinary[n]!
        left[i * points + n]! *= weights[k]! * (eqe[k]! * fixed.ratio[k]!)
      }
    const isBoth = points > 0 && width > 1 && height > 1
    const short = isBoth ? shorten(left, right, width, height, points, isAnalytic(x), isAnalytic(y)) : null
    this.length = short?.rank ?? points
    this.left = short?.left ?? left
    this.right = short?.right ?? right

    const count = weak.length
    // Beyond its scan a segment counts only at some values: there A' stands at nothing, which is never a gain.
    const absorptanceX = gather(fx.absorptance, fx.stride, width, weak)
    const absorptanceY = gather(fy.absorptance, fy.stride, height, weak)
    if (isBeyond && fx.holdsOwn) silence(absorptanceX, fx.counts, count)
    if (isBeyond && fy.holdsOwn) silence(absorptanceY, fy.counts, count)
    const ratioX = gather(fx.ratio, fx.stride, width, weak)
    for (let i = 0; i < width; i++)
      for (let w = 0; w < count; w++) {
        const k = weak[w]!
        ratioX[i * count + w]! *= weights[k]! * (eqe[k]! * fixed.ratio[k]!)
        absorptanceX[i * count + w]! *= fixed.absorptance[k]!
      }
    const throughX = gather(fx.through, fx.stride, width, weak)
    const throughY = gather(fy.through, fy.stride, height, weak)
    weak.forEach((k, w) => {
      const isOverfull = base.isWeak[k] === OVERFULL
      for (let i = 0; i < width; i++)
        throughX[i * count + w] = isOverfull ? throughX[i * count + w]! * fixed.through[k]! : 1
      if (!isOverfull) for (let j = 0; j < height; j++) throughY[j * count + w] = 1
    })
    this.weak = {
      count,
      isOverfull: Uint8Array.from(weak, (k) => (base.isWeak[k] === OVERFULL ? 1 : 0)),
      throughX,
      throughY,
      measured: Float64Array.from(weak, (k) => weights[k]! * eqe[k]!),
      collection: Float64Array.from(weak, (k) => weights[k]! * base.collection[k]!),
      before: Float64Array.from(weak, (k) => base.absorptance[k]!),
      ratioX,
      ratioY: gather(fy.ratio, fy.stride, height, weak),
      absorptanceX,
      absorptanceY,
    }
    this.isColumnFixed = width === 1
    this.byColumn = height === 1 ? Float64Array.from({ length: width }, (_, i) => this.currentAt(i, 0)) : null
  }

  /** Adds this segment's current to some columns of a row. */
  addRow(row: number, columns: Int32Array, count: number, out: Float64Array, start: number): void {
    const { byColumn } = this
    if (this.isColumnFixed) {
      const current = byColumn ? byColumn[0]! : this.currentAt(0, row)
      for (let c = 0; c < count; c++) out[start + columns[c]!]! += current
    } else if (byColumn) for (let c = 0; c < count; c++) out[start + columns[c]!]! += byColumn[columns[c]!]!
    else for (let c = 0; c < count; c++) out[start + columns[c]!]! += this.currentAt(columns[c]!, row)
  }

  private currentAt(column: number, row: number): number {
    const { left, right, length, weak } = this
    const current = dot(left, column * length, right, row * length, length)
    return weak.count > 0 ? current + weakCurrent(weak, column * weak.count, row * weak.count) : current
  }
}

function weakCurrent(weak: WeakPoints, x: number, y: number): number {
  const {
    count,
    measured,
    collection,
    before,
    ratioX,
    ratioY,
    absorptanceX,
    absorptanceY,
    throughX,
    throughY,
    isOverfull,
  } = weak
  let sum = 0
  for (let w = 0; w < count; w++) {
    const arriving = throughX[x + w]! * throughY[y + w]!
    const gained = absorptanceX[x + w]! * absorptanceY[y + w]! - before[w]! * arriving
    if (!(gained > 0)) sum += ratioX[x + w]! * ratioY[y + w]!
    else if (isOverfull[w])
      sum += Math.max(measured[w]! * arriving, collection[w]! * absorptanceX[x + w]! * absorptanceY[y + w]!)
    else sum += measured[w]! * arriving + collection[w]! * gained
  }
  return sum
}

/** Some points of every row, packed. A stride of 0 repeats the first row. */
function gather(table: Float64Array, stride: number, rows: number, points: readonly number[]): Float64Array {
  const packed = new Float64Array(rows * points.length)
  for (let r = 0; r < rows; r++)
    for (let n = 0; n < points.length; n++) packed[r * points.length + n] = table[r * stride + points[n]!]!
  return packed
}

/** Transmission is analytic in a thickness and a path factor; in a gap it has the kinks of tables and of the tail. */
function isAnalytic(axis: ResolvedAxis): boolean {
  return axis.parameter.kind === 'thickness' || axis.parameter.kind === 'pathFactor'
}

/** Both tables along the few directions that the rows of one of them span; null where neither is known to have few. */
function shorten(
  left: Float64Array,
  right: Float64Array,
  width: number,
  height: number,
  points: number,
  isLeftAnalytic: boolean,
  isRightAnalytic: boolean,
): { left: Float64Array; right: Float64Array; rank: number } | null {
  const highestRank = points >> 3
  const ofLeft = isLeftAnalytic ? lowRankOf(left, width, points, ROUNDING, highestRank) : null
  if (ofLeft) {
    const { rank, basis, coefficients } = ofLeft
    return { rank, left: coefficients, right: project(right, height, points, basis, rank) }
  }
  const ofRight = isRightAnalytic ? lowRankOf(right, height, points, ROUNDING, highestRank) : null
  if (!ofRight) return null
  const { rank, basis, coefficients } = ofRight
  return { rank, left: project(left, width, points, basis, rank), right: coefficients }
}

function silence(absorptance: Float64Array, counts: Uint8Array, points: number): void {
  counts.forEach((isCounted, v) => {
    if (!isCounted) absorptance.fill(0, v * points, (v + 1) * points)
  })
}

function ownerOf(axis: ResolvedAxis): number {
  return 'junction' in axis.parameter ? axis.parameter.junction : -1
}

/** Factors for the values of one axis: the measured device with all changes of that axis's junction, and no others. */
function axisFactors(compiled: CompiledDevice, s: number, change: Change, axis: ResolvedAxis): Factors {
  const segment = compiled.segments[s]!
  const points = segment.wavelengthNm.length
  const owner = ownerOf(axis)
  if (owner > segment.junction) {
    const ones = new Float64Array(points).fill(1)
    return { stride: 0, ratio: ones, absorptance: ones, through: ones, counts: Uint8Array.of(0), holdsOwn: false }
  }
  const state = measuredState(compiled.device)
  copyJunction(state, compiled.state(change), owner)
  const size = axis.values.length * points
  const ratio = new Float64Array(size)
  const absorptance = new Float64Array(size)
  const through = new Float64Array(size)
  const counts = new Uint8Array(axis.values.length)
  const holdsOwn = owner === segment.junction
  axis.values.forEach((value, v) => {
    setIn(compiled.device, state, axis.parameter, value, axis.key)
    compiled.optics.begin(state)
    const [from, to] = [v * points, (v + 1) * points]
    compiled.optics.fill(s, ratio.subarray(from, to), absorptance.subarray(from, to), through.subarray(from, to))
    counts[v] = holdsOwn && compiled.counts(segment, state) ? 1 : 0
  })
  // A' itself stands in the group that holds the segment's own junction; in the others only what it is multiplied by.
  return { stride: points, ratio, absorptance: holdsOwn ? absorptance : ratio, through, counts, holdsOwn }
}

/** Factors of the changes of all junctions that no axis belongs to. */
function fixedFactors(compiled: CompiledDevice, s: number, change: Change, owners: readonly number[]): Factors {
  const segment = compiled.segments[s]!
  const points = segment.wavelengthNm.length
  const changed = compiled.state(change)
  const state = measuredState(compiled.device)
  for (let p = 0; p < state.thicknessNm.length; p++) if (!owners.includes(p)) copyJunction(state, changed, p)
  const ratio = new Float64Array(points)
  const absorptance = new Float64Array(points)
  const through = new Float64Array(points)
  compiled.optics.begin(state)
  compiled.optics.fill(s, ratio, absorptance, through)
  const holdsOwn = !owners.includes(segment.junction)
  return { stride: 0, ratio, absorptance: holdsOwn ? absorptance : ratio, through, counts: Uint8Array.of(1), holdsOwn }
}

function copyJunction(to: DeviceState, from: DeviceState, p: number): void {
  to.thicknessNm[p] = from.thicknessNm[p]!
  to.pathFactor[p] = from.pathFactor[p]!
  to.gapShiftEv[p] = from.gapShiftEv[p]!
}
