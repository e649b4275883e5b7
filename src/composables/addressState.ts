import { computed, type WritableComputedRef } from 'vue'
import { useRoute, useRouter } from 'vue-router'

/** A piece of a screen's state that lives in the address, so that a link shows the same; empty values leave no trace. */
export function useAddressState(name: string, fallback = ''): WritableComputedRef<string> {
  const route = useRoute()
  const router = useRouter()
  return computed({
    get: () => {
      const value = route.query[name]
      return typeof value === 'string' ? value : fallback
    },
    set: (value) => {
      const query = { ...route.query, [name]: value === fallback || value === '' ? undefined : value }
      void router.replace({ query, hash: route.hash })
    },
  })
}
