import { useEventListener } from '@vueuse/core'
import { ref, toValue, type MaybeRefOrGetter } from 'vue'
import { onBeforeRouteLeave, onBeforeRouteUpdate } from 'vue-router'

/**
 * Holds the reader back while a form has edits. Show `UnsavedDialog` with `isAsking`, and call `stay` or `leave`.
 * Closing the tab asks in the browser's own words.
 */
export function useUnsavedGuard(hasEdits: MaybeRefOrGetter<boolean>) {
  const isAsking = ref(false)
  let answer: ((mayLeave: boolean) => void) | null = null

  function ask(): Promise<boolean> | boolean {
    if (!toValue(hasEdits)) return true
    isAsking.value = true
    return new Promise((resolve) => (answer = resolve))
  }
  function reply(mayLeave: boolean): void {
    isAsking.value = false
    answer?.(mayLeave)
    answer = null
  }
  onBeforeRouteLeave(ask)
  onBeforeRouteUpdate((to, from) => (to.path === from.path ? true : ask()))
  useEventListener(window, 'beforeunload', (event) => {
    if (toValue(hasEdits)) event.preventDefault()
  })
  return { isAsking, stay: () => reply(false), leave: () => reply(true) }
}
