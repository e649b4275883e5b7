import { Router } from 'express'
import * as routes from '../../shared/contract/matching.js'
import type { MakeRouter } from '../app.js'
import { listDevices } from '../services/matching/listDevices.js'
import { readDeviceCurves } from '../services/matching/readDeviceCurves.js'
import { readMatching } from '../services/matching/readMatching.js'
import { serve } from './serve.js'

export const matchingRouter: MakeRouter = ({ database }) => {
  const router = Router()
  serve(router, routes.listDevices, ({ actor, params, query }) => listDevices(database, actor, params.projectId, query))
  serve(router, routes.readMatching, ({ actor, params, query }) =>
    readMatching(database, actor, params.projectId, params.deviceId, query),
  )
  serve(router, routes.readDeviceCurves, ({ actor, params }) =>
    readDeviceCurves(database, actor, params.projectId, params.deviceId),
  )
  return router
}
