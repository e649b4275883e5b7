import { z } from 'zod'
import { DeviceParams } from './devices.js'
import { CurveData, Id, NotNegative } from './primitives.js'
import { defineRoute } from './route.js'
import { Scan } from './scans.js'

/** One junction's scan before and after the others' response was taken out of it. */
export const UnmixedJunction = z
  .object({
    junctionId: Id,
    position: z.int(),
    scanId: Id,
    before: CurveData,
    after: CurveData,
    addedUncertainty: z.array(NotNegative).meta({ description: 'Standard uncertainty that the correction adds' }),
    weights: z.array(
      z.object({
        position: z.int().meta({ description: 'Of the other junction' }),
        weight: z.number(),
        uncertainty: z.number(),
        bandNm: z
          .tuple([z.number(), z.number()])
          .nullable()
          .meta({ description: 'Where it responds alone; null without' }),
      }),
    ),
    ownShare: z.number(),
    jscBeforeMaCm2: z.number(),
    jscAfterMaCm2: z.number(),
  })
  .meta({ id: 'UnmixedJunction' })
export type UnmixedJunction = z.infer<typeof UnmixedJunction>

export const Unmixing = z
  .object({
    deviceId: Id,
    spectrum: z.string(),
    junctions: z.array(UnmixedJunction),
    problem: z.string().nullable().meta({ description: 'Why the scans in use cannot be unmixed' }),
  })
  .meta({ id: 'Unmixing' })
export type Unmixing = z.infer<typeof Unmixing>

const group = 'Unmixing'

export const readUnmixing = defineRoute({
  id: 'readUnmixing',
  method: 'get',
  path: '/api/projects/:projectId/devices/:deviceId/unmixing',
  group,
  summary: 'What unmixing would make of the scans in use; nothing is saved',
  access: { right: 'read' },
  params: DeviceParams,
  reply: Unmixing,
})

export const acceptUnmixing = defineRoute({
  id: 'acceptUnmixing',
  method: 'post',
  path: '/api/projects/:projectId/devices/:deviceId/unmixing',
  group,
  summary: 'Keep the unmixed curve of one junction as a scan of its own, marked as corrected, with its parents',
  access: { right: 'edit-scans' },
  params: DeviceParams,
  body: z.strictObject({
    junctionId: Id,
    parentScanIds: z
      .array(Id)
      .min(2, 'Unmixing needs a scan of every junction.')
      .meta({ description: 'The scans in use that the person looked at, sunward first' }),
  }),
  reply: Scan,
  status: 201,
})
