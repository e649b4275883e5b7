import { toValue, watchEffect, type MaybeRefOrGetter } from 'vue'

/** Names the browser's tab after what the screen shows, once it is known. */
export function usePageTitle(title: MaybeRefOrGetter<string | undefined>): void {
  watchEffect(() => {
    const text = toValue(title)
    if (text) document.title = `${text} · Tierlight`
  })
}
