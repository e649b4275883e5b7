import { useQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import type { BodySent } from '../../shared/contract/route.js'
import type { ReadingMapping, confirmReading, decideScan, updateConditions } from '../../shared/contract/scans.js'
import { everyItem } from '../api/pages.js'
import * as api from '../api/scans.js'
import { useChange } from './change.js'
import { queryKeys } from './queryKeys.js'
import { useRefresh } from './refresh.js'

export interface ScanFilter {
  deviceId?: MaybeRefOrGetter<string | undefined>
  deleted?: 'yes' | 'no'
}

/** The scans of a project, or of one device, newest first. */
export function useScans(projectId: MaybeRefOrGetter<string>, filter: ScanFilter = {}) {
  const query = () => ({ deviceId: toValue(filter.deviceId), deleted: filter.deleted ?? 'no' })
  return useQuery({
    queryKey: computed(() => queryKeys.scans(toValue(projectId), query())),
    queryFn: ({ signal }) =>
      everyItem((cursor) => api.listScans(toValue(projectId), { ...query(), cursor, limit: 200 }, signal)),
  })
}

/** One scan with its curve. */
export function useScan(projectId: MaybeRefOrGetter<string>, scanId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => queryKeys.scan(toValue(projectId), toValue(scanId))),
    queryFn: ({ signal }) => api.readScan(toValue(projectId), toValue(scanId), signal),
    enabled: () => toValue(scanId) !== '',
    structuralSharing: false,
  })
}

/** The files of a project: those that still wait for a confirmation, those that became scans, or all. */
export function useSourceFiles(
  projectId: MaybeRefOrGetter<string>,
  state: MaybeRefOrGetter<'uploaded' | 'read' | undefined> = undefined,
) {
  return useQuery({
    queryKey: computed(() => queryKeys.sourceFiles(toValue(projectId), toValue(state) ?? 'all')),
    queryFn: ({ signal }) =>
      everyItem((cursor) =>
        api.listSourceFiles(toValue(projectId), { state: toValue(state), cursor, limit: 200 }, signal),
      ),
  })
}

/** The files that wait for a confirmation, each with what the reader understands of it. */
export function useWaitingFiles(projectId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => [...queryKeys.sourceFiles(toValue(projectId), 'uploaded'), 'readings']),
    queryFn: async ({ signal }) => {
      const files = await api.listSourceFiles(toValue(projectId), { state: 'uploaded', limit: 50 }, signal)
      return Promise.all(files.items.map((file) => api.readSourceFile(toValue(projectId), file.id, signal)))
    },
    structuralSharing: false,
  })
}

/** What the reader understands of one uploaded file. */
export function useSourceFile(projectId: MaybeRefOrGetter<string>, sourceFileId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => queryKeys.sourceFile(toValue(projectId), toValue(sourceFileId))),
    queryFn: ({ signal }) => api.readSourceFile(toValue(projectId), toValue(sourceFileId), signal),
    enabled: () => toValue(sourceFileId) !== '',
    structuralSharing: false,
  })
}

/** Reads a file under a corrected mapping; nothing is saved. */
export function usePreviewMapping(projectId: MaybeRefOrGetter<string>) {
  return useChange((input: { sourceFileId: string; mapping: ReadingMapping }) =>
    api.previewMapping(toValue(projectId), input.sourceFileId, { mapping: input.mapping }),
  )
}

/** Makes scans of a file under a mapping: all of them or none. */
export function useConfirmReading(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (input: { sourceFileId: string; body: BodySent<typeof confirmReading> }) =>
      api.confirmReading(toValue(projectId), input.sourceFileId, input.body),
    () => refresh.project(toValue(projectId)),
  )
}

export function useDeleteSourceFile(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (sourceFileId: string) => api.deleteSourceFile(toValue(projectId), sourceFileId),
    () => refresh.project(toValue(projectId)),
  )
}

/** Address of the uploaded bytes, for a link. */
export const sourceFileAddress = api.sourceFileAddress

export function useUpdateConditions(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (input: { scanId: string; body: BodySent<typeof updateConditions> }) =>
      api.updateConditions(toValue(projectId), input.scanId, input.body),
    () => refresh.project(toValue(projectId)),
  )
}

/** Accepts or excludes a scan, or takes the decision back. */
export function useDecideScan(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (input: { scanId: string; body: BodySent<typeof decideScan> }) =>
      api.decideScan(toValue(projectId), input.scanId, input.body),
    () => refresh.project(toValue(projectId)),
  )
}

export function useDeleteScan(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (scanId: string) => api.deleteScan(toValue(projectId), scanId),
    () => refresh.project(toValue(projectId)),
  )
}

export function useRestoreScan(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (scanId: string) => api.restoreScan(toValue(projectId), scanId),
    () => refresh.project(toValue(projectId)),
  )
}
