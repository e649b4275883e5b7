import { Router } from 'express'
import { listMaterials as listMaterialsRoute } from '../../shared/contract/materials.js'
import * as routes from '../../shared/contract/whatIf.js'
import type { MakeRouter } from '../app.js'
import { listMaterials } from '../services/whatIf/listMaterials.js'
import { readWhatIfModel } from '../services/whatIf/readWhatIfModel.js'
import { saveWhatIfModel } from '../services/whatIf/saveWhatIfModel.js'
import { serve } from './serve.js'

export const whatIfRouter: MakeRouter = ({ database }) => {
  const router = Router()
  serve(router, listMaterialsRoute, ({ actor, params }) => listMaterials(database, actor, params.projectId))
  serve(router, routes.readWhatIfModel, ({ actor, params }) =>
    readWhatIfModel(database, actor, params.projectId, params.deviceId),
  )
  serve(router, routes.saveWhatIfModel, ({ actor, params, body }) =>
    saveWhatIfModel(database, actor, params.projectId, params.deviceId, body),
  )
  return router
}
