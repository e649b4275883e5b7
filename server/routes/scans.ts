import { Router } from 'express'
import * as routes from '../../shared/contract/scans.js'
import type { MakeRouter } from '../app.js'
import { decideScan } from '../services/scans/decideScan.js'
import { deleteScan } from '../services/scans/deleteScan.js'
import { listScans } from '../services/scans/listScans.js'
import { readScan } from '../services/scans/readScan.js'
import { restoreScan } from '../services/scans/restoreScan.js'
import { updateConditions } from '../services/scans/updateConditions.js'
import { serve } from './serve.js'

export const scansRouter: MakeRouter = ({ database }) => {
  const router = Router()
  serve(router, routes.listScans, ({ actor, params, query }) => listScans(database, actor, params.projectId, query))
  serve(router, routes.readScan, ({ actor, params }) => readScan(database, actor, params.projectId, params.scanId))
  serve(router, routes.updateConditions, ({ actor, params, body }) =>
    updateConditions(database, actor, params.projectId, params.scanId, body),
  )
  serve(router, routes.decideScan, ({ actor, params, body }) =>
    decideScan(database, actor, params.projectId, params.scanId, body),
  )
  serve(router, routes.deleteScan, ({ actor, params }) => deleteScan(database, actor, params.projectId, params.scanId))
  serve(router, routes.restoreScan, ({ actor, params }) =>
    restoreScan(database, actor, params.projectId, params.scanId),
  )
  return router
}
