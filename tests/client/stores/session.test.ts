import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, expect, test, vi } from 'vitest'
import { readSession, signOut } from '../../../shared/contract/account.js'
import { rememberedTheme, useAppearanceStore } from '../../../src/stores/appearance.js'
import { useNoticesStore } from '../../../src/stores/notices.js'
import { useSessionStore } from '../../../src/stores/session.js'
import { FakeServer } from '../fakeServer.js'
import { person, session } from '../samples.js'

beforeEach(() => setActivePinia(createPinia()))

test('the session is read once, however many ask for it', async () => {
  const server = new FakeServer(session())
  const store = useSessionStore()
  await Promise.all([store.ensure(), store.ensure()])
  await store.ensure()
  expect(server.requestsOf(readSession)).toHaveLength(1)
  expect(store.person?.name).toBe('Ines Okafor')
})

test('a failed reading is not kept', async () => {
  vi.stubGlobal('fetch', () => Promise.reject(new TypeError('Failed to fetch')))
  const store = useSessionStore()
  await expect(store.ensure()).rejects.toThrow('cannot be reached')
  new FakeServer(session())
  await expect(store.ensure()).resolves.toMatchObject({ person })
})

test('signing out leaves nobody behind', async () => {
  new FakeServer(session()).on(signOut, () => session({ person: null, csrfToken: 'next' }))
  const store = useSessionStore()
  await store.ensure()
  await store.leave()
  expect(store.person).toBeNull()
})

test('forgetting keeps what is known of the installation', async () => {
  new FakeServer(session())
  const store = useSessionStore()
  await store.ensure()
  store.forget()
  expect(store.person).toBeNull()
  expect(store.installation?.mailDelivery).toBe('outbox')
})

test('the choice of light or dark outlives the page; an unknown one does not', () => {
  useAppearanceStore().theme = 'dark'
  expect(rememberedTheme()).toBe('dark')
  localStorage.setItem('tierlight.theme', 'sepia')
  expect(rememberedTheme()).toBe('system')
})

test('a new notice takes the place of the last, whose end no longer matters', () => {
  const store = useNoticesStore()
  store.add({ text: 'first', kind: 'done' })
  const first = store.current!.id
  store.add({ text: 'second', kind: 'failed' })
  store.drop(first)
  expect(store.current?.text).toBe('second')
  store.drop(store.current!.id)
  expect(store.current).toBeNull()
})
