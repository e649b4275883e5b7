import { z } from 'zod'
import { Id, Nothing, Version } from './primitives.js'
import { ProjectParams } from './projects.js'
import { defineRoute } from './route.js'

/** Scans of one junction at several bias intensities or voltages. */
export const BiasSeries = z
  .object({
    id: Id,
    deviceId: Id,
    junctionId: Id,
    name: z.string(),
    varied: z.enum(['irradiance', 'voltage']).meta({ description: 'Total bias irradiance in W/m², or voltage in V' }),
    scanIds: z.array(Id),
    steps: z.array(
      z.object({
        scanId: Id,
        label: z.string(),
        level: z.number(),
        jscMaCm2: z.number(),
        changeFromBelow: z.number().nullable().meta({ description: 'Relative; null at the lowest level' }),
        isOnPlateau: z.boolean(),
      }),
    ),
    plateau: z.object({ fromLevel: z.number(), toLevel: z.number(), jscMaCm2: z.number() }).nullable(),
    proposedScanId: Id.nullable(),
    problem: z.string().nullable().meta({ description: 'Why the series cannot be analysed yet, as a sentence' }),
    version: Version,
  })
  .meta({ id: 'BiasSeries' })
export type BiasSeries = z.infer<typeof BiasSeries>

const seriesFields = {
  name: z.string().trim().min(1, 'Name the series.').max(120),
  varied: z.enum(['irradiance', 'voltage']),
  scanIds: z.array(Id).min(2, 'A bias series needs two scans or more.').max(50),
}
const SeriesParams = ProjectParams.extend({ seriesId: Id })
const group = 'Bias series'

export const listBiasSeries = defineRoute({
  id: 'listBiasSeries',
  method: 'get',
  path: '/api/projects/:projectId/bias-series',
  group: group,
  summary: 'The bias series of a device: Jsc at every level, the plateau and the scan to use',
  access: { right: 'read' },
  params: ProjectParams,
  query: z.object({ deviceId: Id.optional() }),
  reply: z.object({ items: z.array(BiasSeries) }),
})

export const createBiasSeries = defineRoute({
  id: 'createBiasSeries',
  method: 'post',
  path: '/api/projects/:projectId/bias-series',
  group: group,
  summary: 'Group scans of one junction into a bias series',
  access: { right: 'edit-scans' },
  params: ProjectParams,
  body: z.strictObject(seriesFields),
  reply: BiasSeries,
  status: 201,
})

export const updateBiasSeries = defineRoute({
  id: 'updateBiasSeries',
  method: 'put',
  path: '/api/projects/:projectId/bias-series/:seriesId',
  group: group,
  summary: 'Change name, varied quantity or scans of a bias series',
  access: { right: 'edit-scans' },
  params: SeriesParams,
  body: z.strictObject({ ...seriesFields, version: Version }),
  reply: BiasSeries,
})

export const deleteBiasSeries = defineRoute({
  id: 'deleteBiasSeries',
  method: 'delete',
  path: '/api/projects/:projectId/bias-series/:seriesId',
  group: group,
  summary: 'Dissolve a bias series; its scans stay',
  access: { right: 'edit-scans' },
  params: SeriesParams,
  reply: Nothing,
})
