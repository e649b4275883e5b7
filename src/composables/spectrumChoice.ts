import { computed } from 'vue'
import { useRoute, useRouter } from 'vue-router'
import { SpectrumChoice } from '../../shared/contract/spectra.js'

/** Spectrum and scaling of a screen, kept in the address so that a link shows the same numbers. */
export function useSpectrumChoice() {
  const route = useRoute()
  const router = useRouter()
  const choice = computed<SpectrumChoice>(() => {
    const parsed = SpectrumChoice.safeParse({
      spectrum: one(route.query['spectrum']),
      scaleToWM2: one(route.query['scale']),
    })
    return parsed.success ? parsed.data : { spectrum: 'AM1.5G' }
  })
  const spectrumId = computed<SpectrumChoice['spectrum']>({
    get: () => choice.value.spectrum,
    set: (spectrum) => change({ spectrum: spectrum === 'AM1.5G' ? undefined : spectrum }),
  })
  const scaleToWM2 = computed<number | null>({
    get: () => choice.value.scaleToWM2 ?? null,
    set: (scale) => change({ scale: scale === null ? undefined : String(scale) }),
  })
  function change(part: Record<string, string | undefined>): void {
    void router.replace({ query: { ...route.query, ...part }, hash: route.hash })
  }
  /** The choice as a query, to carry it along in a link; empty for AM1.5G unscaled. */
  const asQuery = computed(() => ({
    ...(choice.value.spectrum === 'AM1.5G' ? {} : { spectrum: choice.value.spectrum }),
    ...(choice.value.scaleToWM2 === undefined ? {} : { scale: String(choice.value.scaleToWM2) }),
  }))
  return { choice, spectrumId, scaleToWM2, asQuery }
}

function one(value: string | null | (string | null)[] | undefined): string | undefined {
  return (Array.isArray(value) ? value[0] : value) ?? undefined
}
