import { gapShiftRangeEv } from '../absorption/index.js'
import { STANDARD_TEMPERATURE_K } from '../constants.js'
import { assertCurve } from '../curve.js'
import { assertNotNegative, assertPositive, DomainError } from '../errors.js'
import { weightedSum } from '../uncertainty/currentWeights.js'
import { absorberRangeNm, commonRange, resolveAbsorber, type JunctionAbsorber } from './absorbers.js'
import { BeerLambertModel } from './beerLambertModel.js'
import { statedGapEv, type Change, type DeviceModel, type OpticalModelName, type WhatIfInput } from './device.js'
import type { OpticalModel } from './opticalModel.js'
import { changedState, measuredState, parameterKeys, parseParameter, valueIn, type DeviceState } from './parameters.js'
import { PartialModel, spanWithin, trimmed, type Span } from './partialModel.js'
import { PowerEstimator } from './powerEstimate.js'
import { anchor, anchorBeyond, anchorScan, makeSegments, type Segment, type SegmentBase } from './segment.js'
import { stackRangeNm, TransferMatrixModel } from './transferMatrixModel.js'

/** Work space of one segment. */
interface Buffers {
  readonly ratio: Float64Array
  readonly absorptance: Float64Array
  readonly through: Float64Array
  readonly eqe: Float64Array
  readonly continued: Float64Array
}

/**
 * A measured device made ready for what-if: materials looked up, the spectrum turned into weights with which every J is a
 * dot product equal to the exact integral, the optics of the measured stack solved, and work space allocated. Made once,
 * asked many times; one answer never depends on those before it.
 */
export class CompiledDevice {
  readonly device: DeviceModel
  readonly model: OpticalModelName
  readonly power: PowerEstimator
  readonly segments: readonly Segment[]
  readonly bases: readonly SegmentBase[]
  readonly absorbers: readonly JunctionAbsorber[]
  /** J of each junction as measured, mA cm⁻². */
  readonly measuredCurrentsMaCm2: Float64Array
  readonly optics: OpticalModel
  /** Where the optical model speaks on each segment. */
  readonly spans: readonly Span[]
  private readonly buffers: readonly Buffers[]
  private readonly input: WhatIfInput

  /**
   * @throws DomainError naming what is wrong: a curve for each junction, values in their domains, materials that are known
   * and reach over the scans. Cost: some milliseconds.
   */
  constructor(input: WhatIfInput) {
    const { device, eqe, spectrum } = input
    assertDevice(input)
    const absorbers = device.junctions.map((junction, p) => resolveAbsorber(junction, p + 1, input.materials))
    const measured = measuredState(device)
    this.input = input
    this.device = device
    this.absorbers = absorbers
    this.model = input.model ?? 'beer-lambert'
    const isMatrix = this.model === 'transfer-matrix'
    const ranges = device.junctions.map((_, p) =>
      isMatrix
        ? stackRangeNm(device, absorbers, input.materials)
        : commonRange(absorbers.slice(0, p + 1).map(absorberRangeNm)),
    )
    const segments = makeSegments(
      eqe,
      spectrum,
      ranges.map(([, to]) => to),
    )
    const isPartial = input.outsideMaterials === 'keep-measured'
    const spans = segments.map((segment): Span =>
      isPartial ? spanWithin(segment, ranges[segment.junction]!) : [0, segment.wavelengthNm.length],
    )
    const known = isPartial ? segments.map((segment, s) => trimmed(segment, spans[s]!)) : segments
    const optics = isMatrix
      ? new TransferMatrixModel(known, device, absorbers, input.materials, measured)
      : new BeerLambertModel(known, absorbers, measured)
    const lengths = segments.map(({ wavelengthNm }) => wavelengthNm.length)
    this.segments = segments
    this.spans = spans
    this.optics = isPartial ? new PartialModel(optics, spans, lengths) : optics
    const ownShare = input.continuation?.ownShare ?? 0.01
    const least = input.continuation?.absorptance ?? 0.001
    const scans = device.junctions.map((_, p) => {
      const optics = this.optics.measured(p)
      return anchorScan(segments[p]!, optics.absorptance, optics.ownShare, ownShare, least)
    })
    this.bases = segments.map((segment, s) =>
      segment.isBeyond ? anchorBeyond(this.optics.measured(s).absorptance, scans[segment.junction]!) : scans[s]!,
    )
    this.buffers = segments.map(({ wavelengthNm: { length } }) => ({
      ratio: new Float64Array(length),
      absorptance: new Float64Array(length),
      through: new Float64Array(length),
      eqe: new Float64Array(length),
      continued: new Float64Array(length),
    }))
    this.measuredCurrentsMaCm2 = Float64Array.from(device.junctions, (_, p) =>
      weightedSum(segments[p]!.weights, segments[p]!.eqe),
    )
    this.power = new PowerEstimator(input, input.temperatureK ?? STANDARD_TEMPERATURE_K)
  }

  /** The state that a change leads to. @throws DomainError naming the key. */
  state(change: Change): DeviceState {
    return changedState(this.device, change)
  }

  /** J of each junction for a state, mA cm⁻²; `out` is filled and returned. Cost: some exponentials a wavelength. */
  currents(state: DeviceState, out: Float64Array = new Float64Array(this.device.junctions.length)): Float64Array {
    this.optics.begin(state)
    out.fill(0)
    for (let s = 0; s < this.segments.length; s++) {
      const segment = this.segments[s]!
      if (!this.counts(segment, state)) continue
      out[segment.junction]! += weightedSum(segment.weights, this.solveSegment(s).eqe)
    }
    return out
  }

  /** A segment beyond a scan counts only when that junction's gap is lowered. */
  counts(segment: Segment, state: DeviceState): boolean {
    return !segment.isBeyond || state.gapShiftEv[segment.junction]! < 0
  }

  /** EQE' and its continued part of a segment for the state last begun with; overwritten by the next call. */
  solveSegment(s: number): { readonly eqe: Float64Array; readonly continued: Float64Array } {
    const { ratio, absorptance, through, eqe, continued } = this.buffers[s]!
    this.optics.fill(s, ratio, absorptance, through)
    anchor(this.segments[s]!, this.bases[s]!, ratio, absorptance, through, eqe, continued)
    return this.buffers[s]!
  }

  /** Every parameter with its unit, measured value and the limits within which the materials can answer. */
  parameters(): ParameterInfo[] {
    const measured = measuredState(this.device)
    return parameterKeys(this.device).map((key) => {
      const parameter = parseParameter(this.device, key)
      const value = valueIn(this.device, measured, parameter)
      if (parameter.kind === 'pathFactor') return { key, unit: '1', measured: value, low: 1, high: Math.max(50, value) }
      if (parameter.kind === 'thickness' || parameter.kind === 'layerThickness')
        return { key, unit: 'nm', measured: value, low: value > 0 ? value / 4 : 1, high: value > 0 ? 3 * value : 500 }
      const [low, high] = this.gapShiftLimitsEv(parameter.junction)
      return { key, unit: 'eV', measured: value, low: value + Math.max(low, -0.3), high: value + Math.min(high, 0.3) }
    })
  }

  private gapShiftLimitsEv(junction: number): [number, number] {
    const { absorber, measuredShiftEv } = this.absorbers[junction]!
    const grids = this.input.eqe.slice(this.model === 'transfer-matrix' ? 0 : junction).map((c) => c.wavelengthNm)
    const spans = this.spans.slice(this.model === 'transfer-matrix' ? 0 : junction, this.input.eqe.length)
    const from = Math.min(...grids.map((grid, g) => grid[spans[g]![0]]!))
    const to = Math.max(...grids.map((grid, g) => grid[spans[g]![1] - 1]!))
    const [low, high] = gapShiftRangeEv(absorber, from, to)
    return [Math.min(0, low - measuredShiftEv), Math.max(0, high - measuredShiftEv)]
  }
}

/** One control of the what-if workspace. */
export interface ParameterInfo {
  readonly key: string
  readonly unit: 'nm' | 'eV' | '1'
  readonly measured: number
  readonly low: number
  readonly high: number
}

/** Makes a device ready for what-if; see `CompiledDevice`. */
export function compileDevice(input: WhatIfInput): CompiledDevice {
  return new CompiledDevice(input)
}

function assertDevice(input: WhatIfInput): void {
  const { device, eqe, spectrum } = input
  assertCurve(spectrum, 'spectrum')
  if (device.junctions.length === 0)
    throw new DomainError('junctions', 'The device has no junctions; it needs at least one.')
  if (eqe.length !== device.junctions.length)
    throw new DomainError(
      'eqe',
      `There are ${eqe.length} EQE curves for ${device.junctions.length} junctions; each junction needs one.`,
    )
  eqe.forEach((curve, p) => assertCurve(curve, `eqe[${p}]`))
  device.junctions.forEach((junction, p) => {
    assertPositive(junction.thicknessNm, `${p + 1}.thicknessNm`)
    assertPositive(junction.pathFactor ?? 1, `${p + 1}.pathFactor`)
    const gap = statedGapEv(junction)
    if (gap !== undefined) assertPositive(gap, `${p + 1}.bandGapEv`)
  })
  for (const layer of device.layers ?? [])
    if ('name' in layer) assertNotNegative(layer.thicknessNm, `layer.${layer.name}.thicknessNm`)
  assertNotNegative(device.seriesResistanceOhmCm2 ?? 0, 'seriesResistanceOhmCm2')
}
