import { Router } from 'express'
import * as routes from '../../shared/contract/scenarios.js'
import type { MakeRouter } from '../app.js'
import { createScenario } from '../services/scenarios/createScenario.js'
import { deleteScenario } from '../services/scenarios/deleteScenario.js'
import { exportScenarios } from '../services/scenarios/exportScenarios.js'
import { listScenarios } from '../services/scenarios/listScenarios.js'
import { readScenario } from '../services/scenarios/readScenario.js'
import { restoreScenario } from '../services/scenarios/restoreScenario.js'
import { updateScenario } from '../services/scenarios/updateScenario.js'
import { serve } from './serve.js'

export const scenariosRouter: MakeRouter = ({ database }) => {
  const router = Router()
  serve(router, routes.listScenarios, ({ actor, params }) =>
    listScenarios(database, actor, params.projectId, params.deviceId),
  )
  serve(router, routes.exportScenarios, async ({ actor, params, query, response }) => {
    const { projectId, deviceId } = params
    const { name, bytes } = await exportScenarios(database, actor, projectId, deviceId, query.format)
    response.attachment(name).send(bytes)
    return null
  })
  serve(router, routes.createScenario, ({ actor, params, body }) =>
    createScenario(database, actor, params.projectId, params.deviceId, body),
  )
  serve(router, routes.readScenario, ({ actor, params }) =>
    readScenario(database, actor, params.projectId, params.scenarioId),
  )
  serve(router, routes.updateScenario, ({ actor, params, body }) =>
    updateScenario(database, actor, params.projectId, params.scenarioId, body),
  )
  serve(router, routes.deleteScenario, ({ actor, params }) =>
    deleteScenario(database, actor, params.projectId, params.scenarioId),
  )
  serve(router, routes.restoreScenario, ({ actor, params }) =>
    restoreScenario(database, actor, params.projectId, params.scenarioId),
  )
  return router
}
