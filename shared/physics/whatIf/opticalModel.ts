import type { DeviceState } from './parameters.js'

/** What a model of the optics tells the anchoring, segment by segment. */
export interface OpticalModel {
  /** Absorptance of the junction in the measured device, and its share of the light that reaches it. */
  measured(segment: number): { readonly absorptance: Float64Array; readonly ownShare: Float64Array }
  /** Takes the changed device. @throws DomainError when a material does not reach far enough. */
  begin(state: DeviceState): void
  /**
   * A'/A and A' of the segment's junction for the state begun with, and the part of A'/A that the junctions above make;
   * one where a model cannot tell it apart. The three arrays are filled.
   */
  fill(segment: number, ratio: Float64Array, absorptance: Float64Array, through: Float64Array): void
}
