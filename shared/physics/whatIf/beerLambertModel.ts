import { opticalDepth } from '../optics/index.js'
import { AbsorptionOnGrid, type JunctionAbsorber } from './absorbers.js'
import type { OpticalModel } from './opticalModel.js'
import type { DeviceState } from './parameters.js'
import type { Segment } from './segment.js'

interface SegmentOptics {
  readonly junction: number
  /** Absorbers of this junction and those above it. */
  readonly alpha: readonly AbsorptionOnGrid[]
  /** m α d of the measured device, for each of them. */
  readonly depth: readonly Float64Array[]
  /** Share that the junctions above let through. */
  readonly arriving: Float64Array
  readonly ownShare: Float64Array
  readonly absorptance: Float64Array
}

/**
 * Beer–Lambert anchoring. A'/A is taken as a product of factors, one for each changed junction:
 * `e^{−Δ(mαd)}` for those above, `(1 − e^{−m'α'd'})/(1 − e^{−mαd})` for the junction itself; so the change through a junction
 * above is exact, and a junction that stays as it was needs no data where its material is not known.
 */
export class BeerLambertModel implements OpticalModel {
  private readonly segments: readonly SegmentOptics[]
  private state: DeviceState

  constructor(
    segments: readonly Segment[],
    absorbers: readonly JunctionAbsorber[],
    private readonly measuredDevice: DeviceState,
  ) {
    this.state = measuredDevice
    this.segments = segments.map((segment) => {
      const points = segment.wavelengthNm.length
      const above = absorbers.slice(0, segment.junction + 1)
      const alpha = above.map((absorber) => new AbsorptionOnGrid(absorber, segment.wavelengthNm))
      const depth = alpha.map((a, p) => {
        const known = p === segment.junction ? a.perCm(0) : a.knownPerCm()
        return known.map((x) => opticalDepth(x, measuredDevice.thicknessNm[p]!, measuredDevice.pathFactor[p]!))
      })
      const arriving = new Float64Array(points).fill(1)
      for (const d of depth.slice(0, -1)) for (let i = 0; i < points; i++) arriving[i]! *= Math.exp(-d[i]!)
      const ownShare = depth[segment.junction]!.map((d) => -Math.expm1(-d))
      const absorptance = ownShare.map((a, i) => a * arriving[i]!)
      return { junction: segment.junction, alpha, depth, arriving, ownShare, absorptance }
    })
  }

  measured(segment: number): { absorptance: Float64Array; ownShare: Float64Array } {
    return this.segments[segment]!
  }

  begin(state: DeviceState): void {
    this.state = state
  }

  fill(segment: number, ratio: Float64Array, absorptance: Float64Array, through: Float64Array): void {
    const optics = this.segments[segment]!
    ratio.fill(1)
    absorptance.set(optics.absorptance)
    for (let p = 0; p < optics.junction; p++) if (this.isChanged(p)) this.passThrough(optics, p, ratio, absorptance)
    through.set(ratio)
    if (this.isChanged(optics.junction)) this.absorbOwn(optics, ratio, absorptance)
  }

  /** Multiplies by the change of what junction `p` lets through. */
  private passThrough(optics: SegmentOptics, p: number, ratio: Float64Array, absorptance: Float64Array): void {
    const alpha = optics.alpha[p]!.perCm(this.state.gapShiftEv[p]!)
    const depth = optics.depth[p]!
    const [thickness, pathFactor] = [this.state.thicknessNm[p]!, this.state.pathFactor[p]!]
    for (let i = 0; i < ratio.length; i++) {
      const factor = Math.exp(depth[i]! - opticalDepth(alpha[i]!, thickness, pathFactor))
      ratio[i]! *= factor
      absorptance[i]! *= factor
    }
  }

  /** Multiplies by the change of the junction's own share of the light. Called last. */
  private absorbOwn(optics: SegmentOptics, ratio: Float64Array, absorptance: Float64Array): void {
    const p = optics.junction
    const alpha = optics.alpha[p]!.perCm(this.state.gapShiftEv[p]!)
    const [thickness, pathFactor] = [this.state.thicknessNm[p]!, this.state.pathFactor[p]!]
    const { ownShare, arriving } = optics
    for (let i = 0; i < ratio.length; i++) {
      const share = -Math.expm1(-opticalDepth(alpha[i]!, thickness, pathFactor))
      const before = ownShare[i]!
      absorptance[i] = arriving[i]! * ratio[i]! * share
      ratio[i]! *= before === share ? 1 : before > 0 ? share / before : 0
    }
  }

  private isChanged(p: number): boolean {
    const [now, was] = [this.state, this.measuredDevice]
    return (
      now.gapShiftEv[p] !== was.gapShiftEv[p] ||
      now.thicknessNm[p] !== was.thicknessNm[p] ||
      now.pathFactor[p] !== was.pathFactor[p]
    )
  }
}
