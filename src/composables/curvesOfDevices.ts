import { useQueries } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import type { DeviceCurves } from '../../shared/contract/matching.js'
import * as api from '../api/matching.js'
import { queryKeys } from './queryKeys.js'

/** The curves of several devices by device id; a device whose curves are still on their way is left out. */
export function useCurvesOfDevices(
  projectId: MaybeRefOrGetter<string>,
  deviceIds: MaybeRefOrGetter<readonly string[]>,
) {
  const replies = useQueries({
    queries: computed(() =>
      toValue(deviceIds).map((deviceId) => ({
        queryKey: queryKeys.curves(toValue(projectId), deviceId),
        queryFn: ({ signal }: { signal: AbortSignal }) => api.readDeviceCurves(toValue(projectId), deviceId, signal),
        structuralSharing: false,
      })),
    ),
  })
  return computed(() => {
    const curves = new Map<string, DeviceCurves>()
    toValue(deviceIds).forEach((deviceId, i) => {
      const data = replies.value[i]?.data
      if (data) curves.set(deviceId, data)
    })
    return curves
  })
}
