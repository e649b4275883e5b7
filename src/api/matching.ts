import * as routes from '../../shared/contract/matching.js'
import type { QuerySent } from '../../shared/contract/route.js'
import { call } from './http.js'

export const listDevices = (projectId: string, query: QuerySent<typeof routes.listDevices>, signal?: AbortSignal) =>
  call(routes.listDevices, { params: { projectId }, query, signal })
export const readMatching = (
  projectId: string,
  deviceId: string,
  query: QuerySent<typeof routes.readMatching>,
  signal?: AbortSignal,
) => call(routes.readMatching, { params: { projectId, deviceId }, query, signal })
export const readDeviceCurves = (projectId: string, deviceId: string, signal?: AbortSignal) =>
  call(routes.readDeviceCurves, { params: { projectId, deviceId }, signal })
