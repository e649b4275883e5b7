import { z } from 'zod'
import { ProjectParams } from './projects.js'
import { defineRoute } from './route.js'
import { MaterialId } from './whatIf.js'

export const Material = z
  .object({
    id: MaterialId,
    name: z.string(),
    source: z.string(),
    caveat: z.string(),
    bandGapEv: z.number().nullable(),
    wavelengthNm: z.array(z.number()),
    n: z.array(z.number()),
    k: z.array(z.number()),
  })
  .meta({ id: 'Material', description: 'Optical constants, linear between the rows and unknown outside them' })
export type Material = z.infer<typeof Material>

export const listMaterials = defineRoute({
  id: 'listMaterials',
  method: 'get',
  path: '/api/projects/:projectId/materials',
  group: 'Materials',
  summary: 'The materials with their optical constants, sources and caveats',
  access: { right: 'read' },
  params: ProjectParams,
  reply: z.object({ items: z.array(Material) }),
})
