import { createRouter, createWebHistory, type RouterHistory } from 'vue-router'
import { useSessionStore } from '../stores/session.js'
import { admission, type ScreenAccess } from './access.js'
import { routes } from './routes.js'

declare module 'vue-router' {
  interface RouteMeta {
    title?: string
    access?: ScreenAccess
  }
}

export function createAppRouter(history: RouterHistory = createWebHistory()) {
  const router = createRouter({
    history,
    routes,
    scrollBehavior: (to, from, saved) => {
      if (saved) return saved
      if (to.hash) return { el: to.hash, top: 16 }
      return to.path === from.path ? false : { top: 0 }
    },
  })
  router.beforeEach(async (to) => {
    if (to.name === 'unreachable') return true
    try {
      return admission(to, await useSessionStore().ensure())
    } catch {
      return { name: 'unreachable', query: { next: to.fullPath } }
    }
  })
  router.afterEach((to, from, failure) => {
    if (failure) return
    document.title = to.meta.title ? `${to.meta.title} · Tierlight` : 'Tierlight'
    if (from.matched.length > 0 && to.path !== from.path) moveFocusToContent()
  })
  return router
}

/** Readers who listen or use the keyboard start at the new screen, not at the link they left. */
function moveFocusToContent(): void {
  requestAnimationFrame(() => document.getElementById('content')?.focus({ preventScroll: true }))
}
