import { keepPreviousData, useQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import type { Device } from '../../shared/contract/devices.js'
import type { createDevice, updateDevice } from '../../shared/contract/devices.js'
import type { BodySent } from '../../shared/contract/route.js'
import type { SpectrumChoice } from '../../shared/contract/spectra.js'
import * as api from '../api/devices.js'
import { listDevices } from '../api/matching.js'
import { everyItem } from '../api/pages.js'
import { useChange } from './change.js'
import { queryKeys } from './queryKeys.js'
import { useRefresh } from './refresh.js'

/** Every device of the project with its currents under a spectrum. While another spectrum loads, the last stays. */
export function useDevices(
  projectId: MaybeRefOrGetter<string>,
  choice: MaybeRefOrGetter<SpectrumChoice> = { spectrum: 'AM1.5G' },
) {
  return useQuery({
    queryKey: computed(() => queryKeys.devices(toValue(projectId), toValue(choice))),
    queryFn: ({ signal }) =>
      everyItem((cursor) => listDevices(toValue(projectId), { ...toValue(choice), cursor, limit: 200 }, signal)),
    placeholderData: keepPreviousData,
  })
}

export function useDevice(projectId: MaybeRefOrGetter<string>, deviceId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => queryKeys.device(toValue(projectId), toValue(deviceId))),
    queryFn: ({ signal }) => api.readDevice(toValue(projectId), toValue(deviceId), signal),
    enabled: () => toValue(deviceId) !== '',
  })
}

export function useDeletedDevices(projectId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => queryKeys.deletedDevices(toValue(projectId))),
    queryFn: ({ signal }) =>
      everyItem((cursor) => api.listDeletedDevices(toValue(projectId), { cursor, limit: 200 }, signal)),
  })
}

export type DeviceToSave =
  | { deviceId: null; device: BodySent<typeof createDevice> }
  | { deviceId: string; device: BodySent<typeof updateDevice> }

/** Adds a device, or saves an edited one; a stale version fails with STALE_VERSION. */
export function useSaveDevice(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (save: DeviceToSave): Promise<Device> =>
      save.deviceId === null
        ? api.createDevice(toValue(projectId), save.device)
        : api.updateDevice(toValue(projectId), save.deviceId, save.device),
    () => refresh.project(toValue(projectId)),
  )
}

export function useDeleteDevice(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (deviceId: string) => api.deleteDevice(toValue(projectId), deviceId),
    (_, deviceId) => {
      refresh.forgetDevice(toValue(projectId), deviceId)
      return refresh.project(toValue(projectId))
    },
  )
}

export function useRestoreDevice(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (deviceId: string) => api.restoreDevice(toValue(projectId), deviceId),
    () => refresh.project(toValue(projectId)),
  )
}
