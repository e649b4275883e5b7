import { defineStore } from 'pinia'
import { computed, shallowRef } from 'vue'
import type { Session } from '../../shared/contract/account.js'
import type { BodySent } from '../../shared/contract/route.js'
import type { createFirstAdministrator, signIn } from '../../shared/contract/account.js'
import * as api from '../api/account.js'

/** Who is signed in, and what the installation offers to those who are not. */
export const useSessionStore = defineStore('session', () => {
  const session = shallowRef<Session | null>(null)
  const person = computed(() => session.value?.person ?? null)
  const installation = computed(() => session.value?.installation ?? null)
  let reading: Promise<Session> | null = null

  /** Reads the session once; a failed reading is tried again by the next caller. */
  async function ensure(): Promise<Session> {
    if (session.value) return session.value
    reading ??= api.readSession().finally(() => (reading = null))
    session.value = await reading
    return session.value
  }
  async function reread(): Promise<void> {
    session.value = await api.readSession()
  }
  async function enter(body: BodySent<typeof signIn>): Promise<void> {
    session.value = await api.signIn(body)
  }
  async function enterAsFirst(body: BodySent<typeof createFirstAdministrator>): Promise<void> {
    session.value = await api.createFirstAdministrator(body)
  }
  async function leave(): Promise<void> {
    session.value = await api.signOut()
  }
  function replace(next: Session): void {
    session.value = next
  }
  function rename(name: string): void {
    if (session.value?.person) session.value = { ...session.value, person: { ...session.value.person, name } }
  }
  /** The server says that nobody is signed in any more. */
  function forget(): void {
    session.value = session.value ? { ...session.value, person: null } : null
  }
  return { session, person, installation, ensure, reread, enter, enterAsFirst, leave, replace, rename, forget }
})
