import { Router } from 'express'
import * as routes from '../../shared/contract/rawPasses.js'
import type { MakeRouter } from '../app.js'
import { createRawScan } from '../services/rawPasses/createRawScan.js'
import { previewRaw } from '../services/rawPasses/previewRaw.js'
import { readRawScan } from '../services/rawPasses/readRawScan.js'
import { updateRawScan } from '../services/rawPasses/updateRawScan.js'
import { serve } from './serve.js'

export const rawPassesRouter: MakeRouter = ({ database }) => {
  const router = Router()
  serve(router, routes.previewRaw, ({ actor, params, body }) => previewRaw(database, actor, params.projectId, body))
  serve(router, routes.createRawScan, ({ actor, params, body }) =>
    createRawScan(database, actor, params.projectId, body),
  )
  serve(router, routes.readRawScan, ({ actor, params }) =>
    readRawScan(database, actor, params.projectId, params.scanId),
  )
  serve(router, routes.updateRawScan, ({ actor, params, body }) =>
    updateRawScan(database, actor, params.projectId, params.scanId, body),
  )
  return router
}
