import { z } from 'zod'
import {
  Id,
  LongText,
  Name,
  Nothing,
  PageQuery,
  Positive,
  ShortText,
  Timestamp,
  Version,
  pageOf,
} from './primitives.js'
import { ProjectParams } from './projects.js'
import { defineRoute } from './route.js'

/**
 * How the junctions are wired. `2-terminal`: two junctions in series; `3-junction` and `4-junction`: series stacks;
 * `4-terminal`: two junctions, each with its own pair of terminals.
 */
export const TERMINALS = ['2-terminal', '4-terminal', '3-junction', '4-junction'] as const
export const Terminals = z.enum(TERMINALS).meta({ id: 'Terminals' })
export type Terminals = z.infer<typeof Terminals>

export const TERMINALS_LABELS: Record<Terminals, string> = {
  '2-terminal': '2-terminal series, two junctions',
  '4-terminal': '4-terminal, two independent junctions',
  '3-junction': '2-terminal series, three junctions',
  '4-junction': '2-terminal series, four junctions',
}
export const JUNCTION_COUNT: Record<Terminals, number> = {
  '2-terminal': 2,
  '4-terminal': 2,
  '3-junction': 3,
  '4-junction': 4,
}

export const JunctionInput = z.strictObject({
  id: Id.optional().meta({ description: 'Of an existing junction, so that its scans stay with it' }),
  label: z.string().trim().min(1, 'A junction needs a label.').max(60),
  absorber: ShortText.default(''),
  nominalGapEv: Positive.max(10).nullable().default(null),
  thicknessNm: Positive.max(1e7).nullable().default(null),
})
export const LayerInput = z.strictObject({
  name: z.string().trim().min(1, 'A layer needs a name.').max(60),
  material: ShortText.default(''),
  thicknessNm: Positive.max(1e8).nullable().default(null),
  junctionIndex: z
    .int()
    .min(0)
    .max(3)
    .nullable()
    .default(null)
    .meta({ description: 'Which junction this layer absorbs for, counted from 0 at the sunward side' }),
})

const deviceFields = {
  name: Name,
  sampleId: ShortText.default(''),
  description: LongText.default(''),
  series: ShortText.default('').meta({ description: 'Name of the series (split) the device belongs to' }),
  apertureAreaCm2: Positive.max(1e5).nullable().default(null),
  deviceAreaCm2: Positive.max(1e5).nullable().default(null),
  terminals: Terminals,
  junctions: z.array(JunctionInput).min(2, 'A stack has at least two junctions.').max(4),
  layers: z.array(LayerInput).max(60).default([]),
}

/** Number of junctions and wiring have to agree. */
const junctionsAgree = (device: { terminals: Terminals; junctions: unknown[] }) =>
  device.junctions.length === JUNCTION_COUNT[device.terminals]
const agreement = { path: ['junctions'], error: 'The number of junctions does not fit the terminals chosen.' }

export const NewDevice = z.strictObject(deviceFields).refine(junctionsAgree, agreement)
export type NewDevice = z.infer<typeof NewDevice>
export const DeviceUpdate = z.strictObject({ ...deviceFields, version: Version }).refine(junctionsAgree, agreement)
export type DeviceUpdate = z.infer<typeof DeviceUpdate>

export const Junction = z
  .object({
    id: Id,
    position: z.int().min(1).meta({ description: '1 is the junction on the sunward side' }),
    label: z.string(),
    absorber: z.string(),
    nominalGapEv: z.number().nullable(),
    thicknessNm: z.number().nullable(),
  })
  .meta({ id: 'Junction' })
export type Junction = z.infer<typeof Junction>

export const Layer = z
  .object({
    position: z.int().min(1),
    name: z.string(),
    material: z.string(),
    thicknessNm: z.number().nullable(),
    junctionIndex: z.int().nullable(),
  })
  .meta({ id: 'Layer' })
export type Layer = z.infer<typeof Layer>

export const Device = z
  .object({
    id: Id,
    projectId: Id,
    name: z.string(),
    sampleId: z.string(),
    description: z.string(),
    series: z.string(),
    apertureAreaCm2: z.number().nullable(),
    deviceAreaCm2: z.number().nullable(),
    terminals: Terminals,
    junctions: z.array(Junction),
    layers: z.array(Layer),
    version: Version,
    createdAt: Timestamp,
    updatedAt: Timestamp,
    deletedAt: Timestamp.nullable(),
  })
  .meta({ id: 'Device' })
export type Device = z.infer<typeof Device>

export const DeviceParams = ProjectParams.extend({ deviceId: Id })
const group = 'Devices'

export const createDevice = defineRoute({
  id: 'createDevice',
  method: 'post',
  path: '/api/projects/:projectId/devices',
  group,
  summary: 'Describe a device and its junctions',
  access: { right: 'edit-devices' },
  params: ProjectParams,
  body: NewDevice,
  reply: Device,
  status: 201,
})

export const readDevice = defineRoute({
  id: 'readDevice',
  method: 'get',
  path: '/api/projects/:projectId/devices/:deviceId',
  group,
  summary: 'One device with junctions and layers',
  access: { right: 'read' },
  params: DeviceParams,
  reply: Device,
})

export const updateDevice = defineRoute({
  id: 'updateDevice',
  method: 'put',
  path: '/api/projects/:projectId/devices/:deviceId',
  group,
  summary: 'Save a device; junctions keep their scans by id',
  access: { right: 'edit-devices' },
  params: DeviceParams,
  body: DeviceUpdate,
  reply: Device,
})

export const deleteDevice = defineRoute({
  id: 'deleteDevice',
  method: 'delete',
  path: '/api/projects/:projectId/devices/:deviceId',
  group,
  summary: 'Delete a device; it can be restored for thirty days',
  access: { right: 'edit-devices' },
  params: DeviceParams,
  reply: Nothing,
})

export const restoreDevice = defineRoute({
  id: 'restoreDevice',
  method: 'post',
  path: '/api/projects/:projectId/devices/:deviceId/restoration',
  group,
  summary: 'Bring a deleted device back',
  access: { right: 'edit-devices' },
  params: DeviceParams,
  reply: Device,
})

export const listDeletedDevices = defineRoute({
  id: 'listDeletedDevices',
  method: 'get',
  path: '/api/projects/:projectId/deleted-devices',
  group,
  summary: 'Devices deleted in the last thirty days',
  access: { right: 'read' },
  params: ProjectParams,
  query: PageQuery,
  reply: pageOf(Device),
})
