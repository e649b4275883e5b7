import { DomainError } from '../errors.js'
import type { OpticalModel } from './opticalModel.js'
import type { DeviceState } from './parameters.js'
import type { Segment } from './segment.js'

/** First and one-past-last index of the wavelengths of a segment that its materials reach. */
export type Span = readonly [number, number]

/** The wavelengths of a segment within a range, nm. @throws DomainError when there are none. */
export function spanWithin(segment: Segment, [fromNm, toNm]: readonly [number, number]): Span {
  const grid = segment.wavelengthNm
  let low = 0
  let high = grid.length
  while (low < high && grid[low]! < fromNm) low++
  while (high > low && grid[high - 1]! > toNm) high--
  if (low === high)
    throw new DomainError(
      'materials',
      `The materials are known together from ${fromNm} to ${toNm} nm; the scan of junction ${segment.junction + 1} has no ` +
        `wavelength there.`,
    )
  return [low, high]
}

/** The part of a segment inside a span. */
export function trimmed(segment: Segment, [low, high]: Span): Segment {
  return {
    ...segment,
    wavelengthNm: segment.wavelengthNm.subarray(low, high),
    eqe: segment.eqe.subarray(low, high),
    weights: segment.weights.subarray(low, high),
  }
}

/** A model that speaks only where the materials are known; elsewhere A'/A is one, so that the measured EQE stays. */
export class PartialModel implements OpticalModel {
  constructor(
    private readonly inner: OpticalModel,
    private readonly spans: readonly Span[],
    private readonly lengths: readonly number[],
  ) {}

  measured(segment: number): { absorptance: Float64Array; ownShare: Float64Array } {
    const { absorptance, ownShare } = this.inner.measured(segment)
    return { absorptance: this.padded(segment, absorptance), ownShare: this.padded(segment, ownShare) }
  }

  begin(state: DeviceState): void {
    this.inner.begin(state)
  }

  fill(segment: number, ratio: Float64Array, absorptance: Float64Array, through: Float64Array): void {
    const [low, high] = this.spans[segment]!
    ratio.fill(1)
    absorptance.fill(0)
    through.fill(1)
    this.inner.fill(segment, ratio.subarray(low, high), absorptance.subarray(low, high), through.subarray(low, high))
  }

  private padded(segment: number, values: Float64Array): Float64Array {
    const padded = new Float64Array(this.lengths[segment]!)
    padded.set(values, this.spans[segment]![0])
    return padded
  }
}
