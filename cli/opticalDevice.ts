import { z } from 'zod'
import { OPTICAL_CONSTANT_IDS } from '../shared/data/optical-constants/index.js'
import type { DeviceModel, JunctionModel, LayerModel } from '../shared/physics/whatIf/index.js'
import { CommandError } from './commandError.js'
import type { StatedOptics } from './deviceFile.js'

const Material = z.enum(OPTICAL_CONSTANT_IDS)
const Absorber = z.union([
  z.strictObject({ material: Material }),
  z.strictObject({
    bandGapEv: z.number().positive(),
    alpha0PerCm: z.number().positive(),
    urbachMev: z.number().positive(),
    refractiveIndex: z.union([z.number().positive(), z.strictObject({ material: Material })]).optional(),
  }),
])
const coherent = z.boolean().optional()
const Layer = z.union([
  z.strictObject({ junction: z.int().min(1), coherent }),
  z.strictObject({
    name: z.string().min(1),
    thicknessNm: z.number().nonnegative(),
    material: z.union([Material, z.number().positive()]),
    coherent,
  }),
])

/** The stack of a device file for the optical models. @throws CommandError that names the junction or layer. */
export function opticalDevice(stated: StatedOptics): DeviceModel {
  const { layers, incidentIndex, exit, angleDeg } = stated
  return {
    junctions: stated.junctions.map(opticalJunction),
    ...(layers !== undefined && { layers: layers.map(opticalLayer) }),
    ...(incidentIndex !== undefined && { incidentIndex }),
    ...(exit !== undefined && { exit }),
    ...(angleDeg !== undefined && { angleDeg }),
  }
}

function opticalJunction({ name, thicknessNm, pathFactor, absorber }: StatedOptics['junctions'][number], i: number) {
  const which = `Junction ${i + 1} ("${name}")`
  if (thicknessNm === undefined)
    throw new CommandError(`${which} has no "thicknessNm"; a what-if starts from the measured thickness in nm.`)
  const read = Absorber.safeParse(absorber)
  if (!read.success)
    throw new CommandError(
      `${which} ${absorber === undefined ? 'has no "absorber"' : 'has an "absorber" that cannot be used'}; give ` +
        '{"bandGapEv": 1.68, "alpha0PerCm": 150000, "urbachMev": 15} or {"material": "…"} with one of ' +
        `${OPTICAL_CONSTANT_IDS.join(', ')}.`,
    )
  const { data } = read
  return {
    thicknessNm,
    ...(pathFactor !== undefined && { pathFactor }),
    absorber: 'material' in data ? data : withIndex(data),
  } satisfies JunctionModel
}

type StatedEdge = Exclude<z.output<typeof Absorber>, { material: unknown }>

function withIndex({ refractiveIndex, ...edge }: StatedEdge) {
  return { ...edge, ...(refractiveIndex !== undefined && { refractiveIndex }) }
}

function opticalLayer(layer: unknown, i: number): LayerModel {
  const read = Layer.safeParse(layer)
  if (!read.success)
    throw new CommandError(
      `Layer ${i + 1} cannot be used; give {"name": "…", "thicknessNm": 100, "material": "…"}, where the material is an ` +
        `index or one of ${OPTICAL_CONSTANT_IDS.join(', ')}, or {"junction": 1} for the absorber of a junction.`,
    )
  const { coherent: isCoherent, ...rest } = read.data
  return { ...rest, ...(isCoherent !== undefined && { coherent: isCoherent }) }
}
