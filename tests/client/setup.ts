import { afterEach, vi } from 'vitest'
import { enableAutoUnmount } from '@vue/test-utils'

/** What the test's document lacks and the components need: sizes that never change, and no animation frames to wait for. */
class StillResizeObserver {
  observe(): void {}
  unobserve(): void {}
  disconnect(): void {}
}
vi.stubGlobal('ResizeObserver', StillResizeObserver)
vi.stubGlobal('visualViewport', new EventTarget())

enableAutoUnmount(afterEach)
afterEach(() => {
  localStorage.clear()
  document.body.innerHTML = ''
})
