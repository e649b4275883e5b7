import { z } from 'zod'
import { OPTICAL_CONSTANT_IDS } from '../data/optical-constants/index.js'
import { DeviceParams } from './devices.js'
import { Id, NotNegative, Positive } from './primitives.js'
import { defineRoute } from './route.js'

export const MaterialId = z.enum(OPTICAL_CONSTANT_IDS).meta({ id: 'MaterialId' })
export const OpticalModel = z.enum(['beer-lambert', 'transfer-matrix']).meta({ id: 'OpticalModel' })

export const Absorber = z
  .union([
    z.strictObject({ material: MaterialId }),
    z.strictObject({
      bandGapEv: Positive.max(10),
      alpha0PerCm: Positive.max(1e8),
      urbachMev: Positive.max(1000),
    }),
  ])
  .meta({ id: 'Absorber', description: 'A material of the library, or a direct edge with its tail' })

const WhatIfJunction = z.strictObject({
  thicknessNm: Positive.max(1e7),
  pathFactor: Positive.max(1000).default(1),
  absorber: Absorber,
  externalRadiativeEfficiency: Positive.max(1).default(0.001),
})

const WhatIfLayer = z.union([
  z.strictObject({ junction: z.int().min(1).max(4), coherent: z.boolean().default(true) }),
  z.strictObject({
    name: z.string().trim().min(1).max(60),
    thicknessNm: NotNegative.max(1e8),
    material: z.union([MaterialId, Positive.max(10)]).meta({ description: 'Of the library, or an index' }),
    coherent: z.boolean().default(true),
  }),
])

/** What the optical models need of a device beside its scans. Junctions and layers from the sunward side. */
export const OpticalDescription = z
  .strictObject({
    junctions: z.array(WhatIfJunction).min(2).max(4),
    layers: z.array(WhatIfLayer).max(60).default([]),
  })
  .meta({ id: 'OpticalDescription' })
export type OpticalDescription = z.infer<typeof OpticalDescription>

export const WhatIfModel = z
  .object({
    deviceId: Id,
    description: OpticalDescription,
    assumptions: z.array(z.string()).meta({ description: 'What was taken for granted where nobody described it' }),
    version: z.int().min(0).meta({ description: '0 while nothing was saved: derived from the device' }),
  })
  .meta({ id: 'WhatIfModel' })
export type WhatIfModel = z.infer<typeof WhatIfModel>

const group = 'What-if'
const path = '/api/projects/:projectId/devices/:deviceId/what-if'

export const readWhatIfModel = defineRoute({
  id: 'readWhatIfModel',
  method: 'get',
  path,
  group,
  summary: 'The optical description of a device, saved or derived from its stack',
  access: { right: 'read' },
  params: DeviceParams,
  reply: WhatIfModel,
})

export const saveWhatIfModel = defineRoute({
  id: 'saveWhatIfModel',
  method: 'put',
  path,
  group,
  summary: 'Save the optical description of a device',
  access: { right: 'run-analyses' },
  params: DeviceParams,
  body: z.strictObject({ description: OpticalDescription, version: z.int().min(0) }),
  reply: WhatIfModel,
})
