import { createMemoryHistory } from 'vue-router'
import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, test, vi } from 'vitest'
import { createAppRouter } from '../../../src/router/index.js'
import { nextOf } from '../../../src/router/access.js'
import { FakeServer } from '../fakeServer.js'
import { idOf, person, session } from '../samples.js'

const empty = { needsFirstAdministrator: true, demonstrationPeople: [], mailDelivery: 'outbox' as const }
const guest = session({ person: null })
const member = session()
const administrator = session({ person: { ...person, isAdministrator: true } })
const project = `/projects/${idOf(100)}`

async function arrivalAt(address: string, as: ReturnType<typeof session>): Promise<string> {
  new FakeServer(as)
  setActivePinia(createPinia())
  const router = createAppRouter(createMemoryHistory())
  await router.push(address)
  return router.currentRoute.value.fullPath
}

describe('who may open what', () => {
  beforeEach(() => void vi.unstubAllGlobals())

  test.each([
    ['a guest asks for home', '/', guest, '/sign-in'],
    ['a guest asks for a project', `${project}?spectrum=AM0`, guest, `/sign-in?next=${project}?spectrum%3DAM0`],
    [
      'a guest opens an invitation',
      '/invitations/abcdefghijklmnopqrstuvwx',
      guest,
      '/invitations/abcdefghijklmnopqrstuvwx',
    ],
    ['a guest resets a password', '/reset-password', guest, '/reset-password'],
    ['a member signs in again', '/sign-in', member, '/'],
    ['a member signs in with a way to go', `/sign-in?next=${project}`, member, project],
    ['a member opens a project', project, member, project],
    ['a member asks for the accounts', '/administration/accounts', member, '/administration/accounts'],
    ['an administrator opens the administration', '/administration', administrator, '/administration/accounts'],
    ['an empty installation', '/sign-in', session({ person: null, installation: empty }), '/first-administrator'],
    ['the first administrator is there already', '/first-administrator', member, '/'],
  ])('%s', async (_, address, as, arrival) => {
    expect(decodeURIComponent(await arrivalAt(address, as))).toBe(decodeURIComponent(arrival))
  })

  test('the administration is not found by those who are no administrators', async () => {
    new FakeServer(member)
    setActivePinia(createPinia())
    const router = createAppRouter(createMemoryHistory())
    await router.push('/administration/accounts')
    expect(router.currentRoute.value.name).toBe('not-found')
    expect(document.title).toBe('Not found · Tierlight')
  })

  test('without a server the way back is kept', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('Failed to fetch')))
    setActivePinia(createPinia())
    const router = createAppRouter(createMemoryHistory())
    await router.push(project)
    expect(router.currentRoute.value.name).toBe('unreachable')
    expect(router.currentRoute.value.query).toEqual({ next: project })
  })
})

test.each([
  ['/projects/1', '/projects/1'],
  ['//elsewhere.example', '/'],
  ['/\\elsewhere.example', '/'],
  ['https://elsewhere.example', '/'],
  ['', '/'],
])('the page after the sign-in stays in the application: %s', (next, expected) => {
  expect(nextOf({ query: { next } })).toBe(expected)
})
