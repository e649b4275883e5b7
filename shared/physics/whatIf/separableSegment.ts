import type { CompiledDevice } from './compiledDevice.js'
import type { Change } from './device.js'
import type { ResolvedAxis } from './mapAxis.js'
import { measuredState, setIn, type DeviceState } from './parameters.js'
import type { Segment, SegmentBase } from './segment.js'

/** Factors of A'/A and of A' over the values of one axis, row by row: value × points + point. */
interface Factors {
  readonly ratio: Float64Array
  readonly absorptance: Float64Array
  /** False where the segment does not count at that value (beyond the scan, gap not lowered). */
  readonly counts: Uint8Array
}

/**
 * One segment of a map whose two axes belong to different junctions. At ordinary wavelengths the current is
 * `Σ (w EQE f_x) f_y`; the few where EQE/A may have to be continued are added point by point.
 */
export class SeparableSegment {
  readonly junction: number
  private readonly ordinary: number
  /** w EQE f of the x axis, over ordinary wavelengths. */
  private readonly left: Float64Array
  /** f of the y axis, over ordinary wavelengths. */
  private readonly right: Float64Array
  private readonly weak: Int32Array

  static make(
    compiled: CompiledDevice,
    s: number,
    change: Change,
    x: ResolvedAxis,
    y: ResolvedAxis,
  ): SeparableSegment | null {
    const segment = compiled.segments[s]!
    const made = new SeparableSegment(compiled, s, change, x, y)
    const counts = [made.x, made.y, made.fixed].some((factors) => factors.counts.includes(1))
    return segment.isBeyond && !counts ? null : made
  }

  private readonly segment: Segment
  private readonly base: SegmentBase
  private readonly x: Factors
  private readonly y: Factors
  private readonly fixed: Factors

  private constructor(compiled: CompiledDevice, s: number, change: Change, x: ResolvedAxis, y: ResolvedAxis) {
    const segment = compiled.segments[s]!
    this.segment = segment
    this.base = compiled.bases[s]!
    this.junction = segment.junction
    const [px, py] = [x, y].map((axis) => ('junction' in axis.parameter ? axis.parameter.junction : -1))
    this.x = factorsOf(compiled, s, change, px!, x)
    this.y = factorsOf(compiled, s, change, py!, y)
    this.fixed = factorsOf(compiled, s, change, -1, undefined, [px!, py!])
    const points = segment.wavelengthNm.length
    const ordinary: number[] = []
    const weak: number[] = []
    for (let k = 0; k < points; k++) (this.base.isWeak[k] ? weak : ordinary).push(k)
    this.ordinary = ordinary.length
    this.weak = Int32Array.from(weak)
    const { ratio: fx } = this.x
    const { ratio: fy } = this.y
    this.left = new Float64Array(x.values.length * ordinary.length)
    this.right = new Float64Array(y.values.length * ordinary.length)
    ordinary.forEach((k, n) => {
      const measured = segment.weights[k]! * (segment.eqe[k]! * this.fixed.ratio[k]!)
      for (let i = 0; i < x.values.length; i++) this.left[i * ordinary.length + n] = measured * fx[i * points + k]!
      for (let j = 0; j < y.values.length; j++) this.right[j * ordinary.length + n] = fy[j * points + k]!
    })
  }

  /** Adds this segment's current to some columns of a row. */
  addRow(row: number, columns: Int32Array, count: number, out: Float64Array, start: number): void {
    const { left, right, ordinary } = this
    const r = row * ordinary
    let c = 0
    if (!this.segment.isBeyond) {
      for (; c + 3 < count; c += 4) {
        const [c0, c1, c2, c3] = [columns[c]!, columns[c + 1]!, columns[c + 2]!, columns[c + 3]!]
        const [a, b, d, e] = [c0 * ordinary, c1 * ordinary, c2 * ordinary, c3 * ordinary]
        let [s0, s1, s2, s3] = [0, 0, 0, 0]
        for (let n = 0; n < ordinary; n++) {
          const f = right[r + n]!
          s0 += f * left[a + n]!
          s1 += f * left[b + n]!
          s2 += f * left[d + n]!
          s3 += f * left[e + n]!
        }
        out[start + c0]! += s0
        out[start + c1]! += s1
        out[start + c2]! += s2
        out[start + c3]! += s3
      }
      for (; c < count; c++) {
        const a = columns[c]! * ordinary
        let sum = 0
        for (let n = 0; n < ordinary; n++) sum += right[r + n]! * left[a + n]!
        out[start + columns[c]!]! += sum
      }
    }
    if (this.weak.length > 0)
      for (c = 0; c < count; c++) out[start + columns[c]!]! += this.weakCurrent(row, columns[c]!)
  }

  private weakCurrent(row: number, column: number): number {
    const { segment, base, x, y, fixed, weak } = this
    if (segment.isBeyond && !(x.counts[column] || y.counts[row] || fixed.counts[0])) return 0
    const points = segment.wavelengthNm.length
    let sum = 0
    for (let w = 0; w < weak.length; w++) {
      const k = weak[w]!
      const [ix, iy] = [column * points + k, row * points + k]
      const now = fixed.absorptance[k]! * x.absorptance[ix]! * y.absorptance[iy]!
      const gained = now - base.absorptance[k]!
      const eqe =
        gained > 0
          ? segment.eqe[k]! + base.collection[k]! * gained
          : segment.eqe[k]! * (fixed.ratio[k]! * x.ratio[ix]! * y.ratio[iy]!)
      sum += segment.weights[k]! * eqe
    }
    return sum
  }
}

/**
 * Factors for one axis: the measured device with the changes and the axis value of junction `owner` only; or, without an
 * axis, with the changes of all junctions but `others`. The absolute A' stands in the table of the group that holds the
 * segment's own junction.
 */
function factorsOf(
  compiled: CompiledDevice,
  s: number,
  change: Change,
  owner: number,
  axis?: ResolvedAxis,
  others: readonly number[] = [],
): Factors {
  const segment = compiled.segments[s]!
  const points = segment.wavelengthNm.length
  const changed = compiled.state(change)
  const state = measuredState(compiled.device)
  const takes = (p: number): boolean => (axis ? p === owner : !others.includes(p))
  for (let p = 0; p < state.thicknessNm.length; p++) if (takes(p)) copyJunction(state, changed, p)
  const values = axis?.values ?? Float64Array.of(0)
  const ratio = new Float64Array(values.length * points)
  const absorptance = new Float64Array(values.length * points)
  const counts = new Uint8Array(values.length)
  const holdsOwn = takes(segment.junction)
  values.forEach((value, v) => {
    if (axis) setIn(compiled.device, state, axis.parameter, value, axis.key)
    compiled.optics.begin(state)
    const span = [v * points, (v + 1) * points] as const
    compiled.optics.fill(s, ratio.subarray(...span), absorptance.subarray(...span))
    counts[v] = holdsOwn && compiled.counts(segment, state) ? 1 : 0
  })
  return { ratio, absorptance: holdsOwn ? absorptance : ratio, counts }
}

function copyJunction(to: DeviceState, from: DeviceState, p: number): void {
  to.thicknessNm[p] = from.thicknessNm[p]!
  to.pathFactor[p] = from.pathFactor[p]!
  to.gapShiftEv[p] = from.gapShiftEv[p]!
}
