import { Router } from 'express'
import * as plans from '../../shared/contract/biasPlan.js'
import * as series from '../../shared/contract/biasSeries.js'
import * as unmixing from '../../shared/contract/unmixing.js'
import type { MakeRouter } from '../app.js'
import { planBias } from '../services/biasPlan/planBias.js'
import {
  createBiasSeries,
  deleteBiasSeries,
  listBiasSeries,
  updateBiasSeries,
} from '../services/biasSeries/biasSeries.js'
import { acceptUnmixing } from '../services/unmixing/acceptUnmixing.js'
import { readUnmixing } from '../services/unmixing/readUnmixing.js'
import { serve } from './serve.js'

/** What a device's scans are worth together: bias series, unmixing and the plan of the next measurement. */
export const measuringRouter: MakeRouter = ({ database }) => {
  const router = Router()
  serve(router, series.listBiasSeries, ({ actor, params, query }) =>
    listBiasSeries(database, actor, params.projectId, query.deviceId),
  )
  serve(router, series.createBiasSeries, ({ actor, params, body }) =>
    createBiasSeries(database, actor, params.projectId, body),
  )
  serve(router, series.updateBiasSeries, ({ actor, params, body }) =>
    updateBiasSeries(database, actor, params.projectId, params.seriesId, body),
  )
  serve(router, series.deleteBiasSeries, ({ actor, params }) =>
    deleteBiasSeries(database, actor, params.projectId, params.seriesId),
  )
  serve(router, unmixing.readUnmixing, ({ actor, params }) =>
    readUnmixing(database, actor, params.projectId, params.deviceId),
  )
  serve(router, unmixing.acceptUnmixing, ({ actor, params, body }) =>
    acceptUnmixing(database, actor, params.projectId, params.deviceId, body),
  )
  serve(router, plans.planBias, ({ actor, params, body }) =>
    planBias(database, actor, params.projectId, params.deviceId, body),
  )
  return router
}
