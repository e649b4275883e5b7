import type { BodySent, QuerySent } from '../../shared/contract/route.js'
import * as routes from '../../shared/contract/scans.js'
import { addressOf, call, callWithProgress } from './http.js'

export const uploadFiles = (
  projectId: string,
  files: readonly File[],
  onProgress: (share: number) => void,
  signal?: AbortSignal,
) => callWithProgress(routes.uploadFiles, { params: { projectId }, files, signal }, onProgress)
export const listSourceFiles = (
  projectId: string,
  query: QuerySent<typeof routes.listSourceFiles>,
  signal?: AbortSignal,
) => call(routes.listSourceFiles, { params: { projectId }, query, signal })
export const readSourceFile = (projectId: string, sourceFileId: string, signal?: AbortSignal) =>
  call(routes.readSourceFile, { params: { projectId, sourceFileId }, signal })
export const previewMapping = (
  projectId: string,
  sourceFileId: string,
  body: BodySent<typeof routes.previewMapping>,
  signal?: AbortSignal,
) => call(routes.previewMapping, { params: { projectId, sourceFileId }, body, signal })
export const confirmReading = (projectId: string, sourceFileId: string, body: BodySent<typeof routes.confirmReading>) =>
  call(routes.confirmReading, { params: { projectId, sourceFileId }, body })
export const deleteSourceFile = (projectId: string, sourceFileId: string) =>
  call(routes.deleteSourceFile, { params: { projectId, sourceFileId } })
export const sourceFileAddress = (projectId: string, sourceFileId: string) =>
  addressOf(routes.downloadSourceFile, { params: { projectId, sourceFileId } })

export const listScans = (projectId: string, query: QuerySent<typeof routes.listScans>, signal?: AbortSignal) =>
  call(routes.listScans, { params: { projectId }, query, signal })
export const readScan = (projectId: string, scanId: string, signal?: AbortSignal) =>
  call(routes.readScan, { params: { projectId, scanId }, signal })
export const updateConditions = (projectId: string, scanId: string, body: BodySent<typeof routes.updateConditions>) =>
  call(routes.updateConditions, { params: { projectId, scanId }, body })
export const decideScan = (projectId: string, scanId: string, body: BodySent<typeof routes.decideScan>) =>
  call(routes.decideScan, { params: { projectId, scanId }, body })
export const deleteScan = (projectId: string, scanId: string) =>
  call(routes.deleteScan, { params: { projectId, scanId } })
export const restoreScan = (projectId: string, scanId: string) =>
  call(routes.restoreScan, { params: { projectId, scanId } })
