import * as routes from '../../shared/contract/devices.js'
import type { BodySent, QuerySent } from '../../shared/contract/route.js'
import { call } from './http.js'

export const createDevice = (projectId: string, body: BodySent<typeof routes.createDevice>) =>
  call(routes.createDevice, { params: { projectId }, body })
export const readDevice = (projectId: string, deviceId: string, signal?: AbortSignal) =>
  call(routes.readDevice, { params: { projectId, deviceId }, signal })
export const updateDevice = (projectId: string, deviceId: string, body: BodySent<typeof routes.updateDevice>) =>
  call(routes.updateDevice, { params: { projectId, deviceId }, body })
export const deleteDevice = (projectId: string, deviceId: string) =>
  call(routes.deleteDevice, { params: { projectId, deviceId } })
export const restoreDevice = (projectId: string, deviceId: string) =>
  call(routes.restoreDevice, { params: { projectId, deviceId } })
export const listDeletedDevices = (
  projectId: string,
  query: QuerySent<typeof routes.listDeletedDevices>,
  signal?: AbortSignal,
) => call(routes.listDeletedDevices, { params: { projectId }, query, signal })
