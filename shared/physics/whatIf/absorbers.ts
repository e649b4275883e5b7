import {
  absorptionPerCm,
  assertAbsorber,
  gapShiftRangeEv,
  materialById,
  opticalRangeNm,
  type Absorber,
  type MaterialLibrary,
} from '../absorption/index.js'
import { assertFinite } from '../errors.js'
import type { JunctionModel } from './device.js'

/** The absorber of a junction with the shift that its edge has in the measured device, eV. */
export interface JunctionAbsorber {
  readonly absorber: Absorber
  readonly measuredShiftEv: number
}

/** The absorber of a junction with its material looked up. @throws DomainError naming the junction (from 1). */
export function resolveAbsorber(junction: JunctionModel, number: number, materials: MaterialLibrary): JunctionAbsorber {
  const { absorber } = junction
  const argument = `${number}.absorber`
  const resolved: Absorber =
    'material' in absorber
      ? { kind: 'table', table: materialById(materials, absorber.material, `${argument}.material`) }
      : 'bandGapEv' in absorber
        ? { kind: 'edge', edge: absorber }
        : { kind: 'table', table: { ...absorber, name: absorber.name ?? `The absorber of junction ${number}` } }
  assertAbsorber(resolved, argument)
  const measuredShiftEv = junction.gapShiftEv ?? 0
  assertFinite(measuredShiftEv, `${number}.gapShiftEv`)
  return { absorber: resolved, measuredShiftEv }
}

/** The wavelengths at which an absorber is known, nm; 0 to Infinity for the parametric edge. */
export function absorberRangeNm({ absorber }: JunctionAbsorber): [number, number] {
  return absorber.kind === 'edge' ? [0, Infinity] : opticalRangeNm(absorber.table)
}

/** What several ranges have in common; the first is above the second when it is nothing. */
export function commonRange(ranges: readonly (readonly [number, number])[]): [number, number] {
  return [Math.max(...ranges.map(([from]) => from)), Math.min(...ranges.map(([, to]) => to))]
}

/** Absorption of one absorber on one grid for any shift of its gap; recent shifts are kept. */
export class AbsorptionOnGrid {
  private readonly kept = new Map<number, Float64Array>()

  constructor(
    private readonly of: JunctionAbsorber,
    private readonly wavelengthNm: Float64Array,
  ) {}

  /** α, cm⁻¹, with the gap shifted from the measured device. @throws DomainError with the range when a table does not reach. */
  perCm(gapShiftEv: number): Float64Array {
    let alpha = this.kept.get(gapShiftEv)
    if (!alpha) {
      alpha = absorptionPerCm(this.of.absorber, this.wavelengthNm, this.of.measuredShiftEv + gapShiftEv)
      if (this.kept.size >= 512) this.kept.clear()
      this.kept.set(gapShiftEv, alpha)
    }
    return alpha
  }

  /** α of the measured device where it is known, zero elsewhere: enough for a junction that does not change. */
  knownPerCm(): Float64Array {
    const { absorber, measuredShiftEv } = this.of
    if (absorber.kind === 'edge') return this.perCm(0)
    const isKnown = (nm: number): boolean => {
      const [low, high] = gapShiftRangeEv(absorber, nm, nm)
      return low <= measuredShiftEv && measuredShiftEv <= high
    }
    const alpha = absorptionPerCm(absorber, this.wavelengthNm.filter(isKnown), measuredShiftEv)
    let next = 0
    return this.wavelengthNm.map((nm) => (isKnown(nm) ? alpha[next++]! : 0))
  }
}
