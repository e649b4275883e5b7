import type { BodySent } from '../../shared/contract/route.js'
import * as routes from '../../shared/contract/spectra.js'
import { call, callWithProgress } from './http.js'

export const listSpectra = (projectId: string, signal?: AbortSignal) =>
  call(routes.listSpectra, { params: { projectId }, signal })
export const readSpectrum = (projectId: string, spectrumId: string, signal?: AbortSignal) =>
  call(routes.readSpectrum, { params: { projectId, spectrumId }, signal })
export const createSpectrum = (projectId: string, body: BodySent<typeof routes.createSpectrum>) =>
  call(routes.createSpectrum, { params: { projectId }, body })
export const uploadSpectrumFiles = (
  projectId: string,
  files: readonly File[],
  onProgress: (share: number) => void,
  signal?: AbortSignal,
) => callWithProgress(routes.uploadSpectrumFiles, { params: { projectId }, files, signal }, onProgress)
export const deleteSpectrum = (projectId: string, spectrumId: string) =>
  call(routes.deleteSpectrum, { params: { projectId, spectrumId } })
