import { useQuery } from '@tanstack/vue-query'
import { computed, toValue, type MaybeRefOrGetter } from 'vue'
import type { BodySent } from '../../shared/contract/route.js'
import type { createSpectrum } from '../../shared/contract/spectra.js'
import * as api from '../api/spectra.js'
import { useChange } from './change.js'
import { queryKeys } from './queryKeys.js'
import { useRefresh } from './refresh.js'

/** The reference spectra and those that the project uploaded. */
export function useSpectra(projectId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => queryKeys.spectrumList(toValue(projectId))),
    queryFn: async ({ signal }) => (await api.listSpectra(toValue(projectId), signal)).items,
    staleTime: 5 * 60_000,
  })
}

/** One spectrum with its curve, W m⁻² nm⁻¹; a spectrum never changes. */
export function useSpectrum(projectId: MaybeRefOrGetter<string>, spectrumId: MaybeRefOrGetter<string>) {
  return useQuery({
    queryKey: computed(() => queryKeys.spectrum(toValue(projectId), toValue(spectrumId))),
    queryFn: ({ signal }) => api.readSpectrum(toValue(projectId), toValue(spectrumId), signal),
    enabled: () => toValue(spectrumId) !== '',
    staleTime: Infinity,
    structuralSharing: false,
  })
}

export function useCreateSpectrum(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (body: BodySent<typeof createSpectrum>) => api.createSpectrum(toValue(projectId), body),
    () => Promise.all([refresh.spectra(toValue(projectId)), refresh.project(toValue(projectId))]),
  )
}

export function useDeleteSpectrum(projectId: MaybeRefOrGetter<string>) {
  const refresh = useRefresh()
  return useChange(
    (spectrumId: string) => api.deleteSpectrum(toValue(projectId), spectrumId),
    () => refresh.spectra(toValue(projectId)),
  )
}
