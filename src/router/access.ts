import type { RouteLocationNormalized, RouteLocationRaw } from 'vue-router'
import type { Session } from '../../shared/contract/account.js'

/** Who may open a screen. `guest`: only those who are not signed in; `anyone`: both. */
export type ScreenAccess = 'anyone' | 'guest' | 'signed-in' | 'administrator'

/** Where the way leads for this reader: on (`true`), or elsewhere. */
export function admission(to: RouteLocationNormalized, session: Session): true | RouteLocationRaw {
  const access = to.meta.access
  if (session.installation.needsFirstAdministrator) {
    return to.name === 'first-administrator' ? true : { name: 'first-administrator' }
  }
  if (to.name === 'first-administrator') return { name: 'home' }
  if (access === 'anyone') return true
  if (access === 'guest') return session.person ? nextOf(to) : true
  if (!session.person) return { name: 'sign-in', query: to.fullPath === '/' ? {} : { next: to.fullPath } }
  if (access === 'administrator' && !session.person.isAdministrator) {
    return { name: 'not-found', params: { path: to.path.split('/').slice(1) } }
  }
  return true
}

/** The page that was asked for before signing in; only ever a page of this application. */
export function nextOf(route: { query: RouteLocationNormalized['query'] }): string {
  const next = route.query['next']
  return typeof next === 'string' && /^\/(?![/\\])/.test(next) ? next : '/'
}
