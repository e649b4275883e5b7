import {
  extinctionFromAbsorption,
  materialById,
  opticalColumnAt,
  opticalRangeNm,
  type MaterialLibrary,
} from '../absorption/index.js'
import { DomainError } from '../errors.js'
import { StackSolver, type Dispersion, type StackLayer, type StackOptics } from '../optics/index.js'
import { absorberRangeNm, AbsorptionOnGrid, commonRange, type JunctionAbsorber } from './absorbers.js'
import type { DeviceModel, LayerModel } from './device.js'
import type { OpticalModel } from './opticalModel.js'
import type { DeviceState } from './parameters.js'
import type { Segment } from './segment.js'

/** Index of a parametric absorber that states none; a usual value of lead halides in the red, from memory. */
const USUAL_INDEX = 2.4

/** The layers on one wavelength grid, shared by the segments that have it. */
interface GridOptics {
  readonly wavelengthNm: Float64Array
  readonly solver: StackSolver
  readonly alpha: readonly AbsorptionOnGrid[]
  readonly index: readonly Dispersion[]
  readonly shiftEv: number[]
  isSolved: boolean
}

/**
 * Transfer-matrix anchoring: A of a junction is what its layers absorb. A changed gap shifts k through α; n stays as it
 * is tabulated, because the law of the shift speaks of α alone.
 */
export class TransferMatrixModel implements OpticalModel {
  private readonly layers: readonly LayerModel[]
  private readonly grids: GridOptics[] = []
  private readonly optics = new Map<GridOptics, StackOptics>()
  private readonly gridOf: readonly GridOptics[]
  private readonly base: readonly { absorptance: Float64Array; ownShare: Float64Array }[]
  private readonly junctionOf: readonly number[]
  private state: DeviceState

  constructor(
    segments: readonly Segment[],
    private readonly device: DeviceModel,
    private readonly absorbers: readonly JunctionAbsorber[],
    private readonly materials: MaterialLibrary,
    measured: DeviceState,
  ) {
    this.layers = checkedLayers(device)
    this.state = measured
    this.junctionOf = segments.map((segment) => segment.junction)
    this.gridOf = segments.map((segment) => this.gridFor(segment.wavelengthNm, measured))
    this.base = segments.map((segment, s) => {
      const optics = this.solved(this.gridOf[s]!)
      const absorptance = this.absorptanceOf(optics, segment.junction)
      const ownShare = absorptance.map((a, i) => {
        let arriving = 1 - optics.reflectance[i]!
        for (let p = 0; p < segment.junction; p++) arriving -= this.layerSum(optics, p, i)
        return arriving > 0 ? a / arriving : 0
      })
      return { absorptance, ownShare }
    })
  }

  measured(segment: number): { absorptance: Float64Array; ownShare: Float64Array } {
    return this.base[segment]!
  }

  begin(state: DeviceState): void {
    this.state = state
    for (const grid of this.grids) grid.isSolved = false
  }

  fill(segment: number, ratio: Float64Array, absorptance: Float64Array, through: Float64Array): void {
    through.fill(1)
    const optics = this.solved(this.gridOf[segment]!)
    const before = this.base[segment]!.absorptance
    const junction = this.junctionOf[segment]!
    for (let i = 0; i < ratio.length; i++) {
      const now = this.layerSum(optics, junction, i)
      absorptance[i] = now
      ratio[i] = now === before[i] ? 1 : before[i]! > 0 ? Math.max(0, now / before[i]!) : 0
    }
  }

  private absorptanceOf(optics: StackOptics, junction: number): Float64Array {
    return optics.reflectance.map((_, i) => this.layerSum(optics, junction, i))
  }

  private layerSum(optics: StackOptics, junction: number, i: number): number {
    let sum = 0
    for (let l = 0; l < this.layers.length; l++) {
      const layer = this.layers[l]!
      if ('junction' in layer && layer.junction === junction + 1) sum += optics.absorptance[l]![i]!
    }
    return sum
  }

  /** Brings the solver of a grid to the state, once for each state. */
  private solved(grid: GridOptics): StackOptics {
    if (!grid.isSolved) {
      this.layers.forEach((layer, l) => {
        if ('name' in layer) return grid.solver.setThickness(l, this.state.layerThicknessNm[l]!)
        const p = layer.junction - 1
        const shift = this.state.gapShiftEv[p]!
        if (grid.shiftEv[l] !== shift) {
          grid.solver.setIndex(l, grid.index[l]!, extinction(grid.alpha[p]!.perCm(shift), grid.wavelengthNm))
          grid.shiftEv[l] = shift
        }
        grid.solver.setThickness(l, this.state.thicknessNm[p]!)
      })
      grid.isSolved = true
      this.optics.set(grid, grid.solver.solve())
    }
    return this.optics.get(grid)!
  }

  private gridFor(wavelengthNm: Float64Array, measured: DeviceState): GridOptics {
    const same = this.grids.find(
      (g) => g.wavelengthNm.length === wavelengthNm.length && g.wavelengthNm.every((x, i) => x === wavelengthNm[i]),
    )
    if (same) return same
    const alpha = this.absorbers.map((absorber) => new AbsorptionOnGrid(absorber, wavelengthNm))
    const stack: StackLayer[] = this.layers.map((layer, l): StackLayer => {
      const coherent = layer.coherent ?? true
      if ('junction' in layer) {
        const p = layer.junction - 1
        const k = extinction(alpha[p]!.perCm(0), wavelengthNm)
        return { n: this.junctionIndex(p, wavelengthNm), k, thicknessNm: measured.thicknessNm[p]!, coherent }
      }
      const { n, k } = this.materialOn(layer.material, wavelengthNm, `layer.${layer.name}.material`)
      return { n, k, thicknessNm: measured.layerThicknessNm[l]!, coherent }
    })
    const solver = new StackSolver({
      wavelengthNm,
      incidentIndex: this.device.incidentIndex ?? 1,
      layers: stack,
      exit: this.materialOn(this.device.exit ?? 1, wavelengthNm, 'exit'),
      angleDeg: this.device.angleDeg ?? 0,
    })
    const index = stack.map((layer) => layer.n)
    const grid = { wavelengthNm, solver, alpha, index, shiftEv: stack.map(() => 0), isSolved: false }
    this.grids.push(grid)
    return grid
  }

  private materialOn(material: string | number, wavelengthNm: Float64Array, argument: string) {
    if (typeof material === 'number') return { n: material, k: 0 }
    const table = materialById(this.materials, material, argument)
    return {
      n: opticalColumnAt(table, table.n, wavelengthNm),
      k: opticalColumnAt(table, table.k, wavelengthNm),
    }
  }

  private junctionIndex(p: number, wavelengthNm: Float64Array): Dispersion {
    const { absorber } = this.absorbers[p]!
    if (absorber.kind === 'table') return opticalColumnAt(absorber.table, absorber.table.n, wavelengthNm)
    const model = this.device.junctions[p]!.absorber
    const index = ('refractiveIndex' in model ? model.refractiveIndex : undefined) ?? USUAL_INDEX
    if (typeof index === 'number') return index
    return this.materialOn(index.material, wavelengthNm, `${p + 1}.absorber.refractiveIndex`).n
  }
}

/** The wavelengths at which every material of the stack is known, nm. */
export function stackRangeNm(
  device: DeviceModel,
  absorbers: readonly JunctionAbsorber[],
  materials: MaterialLibrary,
): [number, number] {
  const ranges = absorbers.map(absorberRangeNm)
  const add = (material: string | number | undefined, argument: string): void => {
    if (typeof material === 'string') ranges.push(opticalRangeNm(materialById(materials, material, argument)))
  }
  for (const layer of device.layers ?? []) if ('name' in layer) add(layer.material, `layer.${layer.name}.material`)
  device.junctions.forEach(({ absorber }, p) => {
    if ('refractiveIndex' in absorber && typeof absorber.refractiveIndex === 'object')
      add(absorber.refractiveIndex.material, `${p + 1}.absorber.refractiveIndex`)
  })
  add(device.exit, 'exit')
  return commonRange(ranges)
}

function extinction(alphaPerCm: Float64Array, wavelengthNm: Float64Array): Float64Array {
  return alphaPerCm.map((alpha, i) => extinctionFromAbsorption(alpha, wavelengthNm[i]!))
}

function checkedLayers(device: DeviceModel): readonly LayerModel[] {
  const layers = device.layers ?? []
  device.junctions.forEach((_, p) => {
    if (!layers.some((layer) => 'junction' in layer && layer.junction === p + 1))
      throw new DomainError(
        'layers',
        `The transfer matrix needs a layer for each junction; none says "junction": ${p + 1}.`,
      )
  })
  layers.forEach((layer, l) => {
    if ('junction' in layer && !(layer.junction >= 1 && layer.junction <= device.junctions.length))
      throw new DomainError(
        `layers[${l}].junction`,
        `layers[${l}].junction is ${layer.junction}; the device has junctions 1 to ${device.junctions.length}.`,
      )
  })
  return layers
}
