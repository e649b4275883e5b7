import { Router } from 'express'
import * as routes from '../../shared/contract/devices.js'
import type { MakeRouter } from '../app.js'
import { createDevice } from '../services/devices/createDevice.js'
import { deleteDevice } from '../services/devices/deleteDevice.js'
import { listDeletedDevices } from '../services/devices/listDeletedDevices.js'
import { readDevice } from '../services/devices/readDevice.js'
import { restoreDevice } from '../services/devices/restoreDevice.js'
import { updateDevice } from '../services/devices/updateDevice.js'
import { serve } from './serve.js'

export const devicesRouter: MakeRouter = ({ database }) => {
  const router = Router()
  serve(router, routes.createDevice, ({ actor, params, body }) => createDevice(database, actor, params.projectId, body))
  serve(router, routes.readDevice, ({ actor, params }) =>
    readDevice(database, actor, params.projectId, params.deviceId),
  )
  serve(router, routes.updateDevice, ({ actor, params, body }) =>
    updateDevice(database, actor, params.projectId, params.deviceId, body),
  )
  serve(router, routes.deleteDevice, ({ actor, params }) =>
    deleteDevice(database, actor, params.projectId, params.deviceId),
  )
  serve(router, routes.restoreDevice, ({ actor, params }) =>
    restoreDevice(database, actor, params.projectId, params.deviceId),
  )
  serve(router, routes.listDeletedDevices, ({ actor, params, query }) =>
    listDeletedDevices(database, actor, params.projectId, query),
  )
  return router
}
