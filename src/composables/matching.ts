import { useQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import type { SpectrumChoice } from '../../shared/contract/spectra.js'
import * as api from '../api/matching.js'
import { queryKeys } from './queryKeys.js'

export function useMatching(
  projectId: MaybeRefOrGetter<string>,
  deviceId: MaybeRefOrGetter<string>,
  choice: MaybeRefOrGetter<SpectrumChoice>,
) {
  return useQuery({
    queryKey: computed(() => queryKeys.matching(toValue(projectId), toValue(deviceId), toValue(choice))),
    queryFn: ({ signal }) => api.readMatching(toValue(projectId), toValue(deviceId), toValue(choice), signal),
    placeholderData: (previous) => (previous?.deviceId === toValue(deviceId) ? previous : undefined),
  })
}

/** The curves of the scans in use; they change only when a scan does. */
export function useDeviceCurves(projectId: MaybeRefOrGetter<string>, deviceId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => queryKeys.curves(toValue(projectId), toValue(deviceId))),
    queryFn: ({ signal }) => api.readDeviceCurves(toValue(projectId), toValue(deviceId), signal),
    structuralSharing: false,
  })
}
