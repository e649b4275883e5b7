import { describe, expect, test } from 'vitest'
import {
  changePassword,
  createFirstAdministrator,
  listSessions,
  requestPasswordReset,
  resetPassword,
  signIn,
} from '../../../shared/contract/account.js'
import { ApiError } from '../../../shared/contract/errors.js'
import { acceptInvitation, listProjects, readInvitation } from '../../../shared/contract/projects.js'
import { FakeServer } from '../fakeServer.js'
import { idOf, page, person, session } from '../samples.js'
import { arrival, fieldOf, openScreen, shownText, submit, type } from '../screen.js'

const TOKEN = 'abcdefghijklmnopqrstuvwxyz'
const demonstrationPeople = [
  { name: 'Ines Okafor', email: person.email, role: 'experimentalist', password: 'a demonstration password' },
]
const guest = session({
  person: null,
  installation: { needsFirstAdministrator: false, demonstrationPeople, mailDelivery: 'outbox' },
})

describe('sign-in', () => {
  test('one click fills in a person of the demonstration, and signing in leads home', async () => {
    const server = new FakeServer(guest).on(signIn, () => session()).on(listProjects, () => page([]))
    const { screen, router } = await openScreen('/sign-in')
    const choice = screen.findAll('section button').find((button) => button.text().includes('Ines Okafor'))
    await choice?.trigger('click')
    expect(fieldOf('E-mail address').value).toBe(person.email)
    await submit(screen)
    expect(server.requestsOf(signIn)[0]?.body).toEqual({ email: person.email, password: 'a demonstration password' })
    await arrival(router, 'home')
  })

  test('says why it failed and keeps what was typed', async () => {
    new FakeServer(guest).on(signIn, () => {
      throw new ApiError('SIGN_IN_FAILED', {}, 'The address and password do not match.')
    })
    const { screen, router } = await openScreen('/sign-in')
    await type('E-mail address', 'someone@heliolab.example')
    await type('Password', 'not the password')
    await submit(screen)
    expect(screen.find('[role="alert"]').text()).toContain('The address and password do not match.')
    expect(fieldOf('E-mail address').value).toBe('someone@heliolab.example')
    expect(router.currentRoute.value.name).toBe('sign-in')
  })

  test('marks the field that the server speaks of', async () => {
    new FakeServer(guest)
    const { screen } = await openScreen('/sign-in')
    await type('E-mail address', 'not an address')
    await type('Password', 'something')
    await submit(screen)
    expect(shownText()).toContain('This is not an e-mail address.')
  })

  test('shows nobody when the installation has no demonstration', async () => {
    new FakeServer(session({ person: null }))
    await openScreen('/sign-in')
    expect(shownText()).not.toContain('Look around as')
  })
})

test('the first administrator is made and signed in', async () => {
  const installation = { needsFirstAdministrator: true, demonstrationPeople: [], mailDelivery: 'outbox' as const }
  const server = new FakeServer(session({ person: null, installation }))
    .on(createFirstAdministrator, () => session({ person: { ...person, isAdministrator: true } }))
    .on(listProjects, () => page([]))
  const { screen, router } = await openScreen('/')
  expect(router.currentRoute.value.name).toBe('first-administrator')
  await type('Your name', 'Ines Okafor')
  await type('E-mail address', person.email)
  await type('Password', 'short')
  await submit(screen)
  expect(shownText()).toContain('A password has at least 12 characters.')
  await type('Password', 'long enough to be one')
  await submit(screen)
  expect(server.requestsOf(createFirstAdministrator).at(-1)?.body).toEqual({
    name: 'Ines Okafor',
    email: person.email,
    password: 'long enough to be one',
  })
  await arrival(router, 'home')
})

describe('password reset', () => {
  test('says the same whether or not the address is known', async () => {
    new FakeServer(guest).on(requestPasswordReset, () => null)
    const { screen } = await openScreen('/reset-password?email=someone@heliolab.example')
    await submit(screen)
    expect(screen.find('[role="status"]').text()).toContain('If there is an account with the address')
  })

  test('an old link leads to a new one', async () => {
    new FakeServer(guest).on(resetPassword, () => {
      throw new ApiError('LINK_EXPIRED', { what: 'password reset' }, 'The link is older than an hour.')
    })
    const { screen } = await openScreen(`/reset-password/${TOKEN}`)
    await type('New password', 'long enough to be one')
    await submit(screen)
    expect(screen.find('[role="alert"]').text()).toContain('The link is older than an hour.')
    expect(screen.find('[role="alert"] a').attributes('href')).toBe('/reset-password')
  })
})

describe('an invitation', () => {
  const offer = {
    projectName: 'Perovskite on silicon',
    invitedBy: 'Tomasz Reyes',
    email: 'new@heliolab.example',
    roles: ['designer' as const],
    accountExists: false,
    expiresAt: '2026-06-01T08:00:00.000Z',
  }

  test('a new person gives a name and a password that is long enough', async () => {
    const server = new FakeServer(session({ person: null }))
      .on(readInvitation, () => offer)
      .on(acceptInvitation, () => ({ projectId: idOf(100) }))
      .on(signIn, () => session())
    const { screen, router } = await openScreen(`/invitations/${TOKEN}`)
    expect(shownText()).toContain('Tomasz Reyes invites new@heliolab.example as designer')
    await type('Your name', 'Kim Sato')
    await type('Choose a password', 'short')
    await submit(screen)
    expect(server.requestsOf(acceptInvitation)).toHaveLength(0)
    expect(shownText()).toContain('A password has at least 12 characters.')
    await type('Choose a password', 'long enough to be one')
    await submit(screen)
    expect(server.requestsOf(acceptInvitation)[0]?.body).toEqual({
      name: 'Kim Sato',
      password: 'long enough to be one',
    })
    expect(server.requestsOf(signIn)[0]?.body).toEqual({ email: offer.email, password: 'long enough to be one' })
    await arrival(router, 'project')
  })

  test('a known person gives the password only', async () => {
    const server = new FakeServer(session({ person: null }))
      .on(readInvitation, () => ({ ...offer, accountExists: true }))
      .on(acceptInvitation, () => ({ projectId: idOf(100) }))
      .on(signIn, () => session())
    const { screen } = await openScreen(`/invitations/${TOKEN}`)
    await type('Your password', 'old one')
    await submit(screen)
    expect(server.requestsOf(acceptInvitation)[0]?.body).toEqual({ password: 'old one' })
  })

  test('one that is no longer good says so', async () => {
    new FakeServer(session({ person: null })).on(readInvitation, () => {
      throw new ApiError('LINK_EXPIRED', { what: 'invitation' }, 'This invitation was withdrawn.')
    })
    await openScreen(`/invitations/${TOKEN}`)
    expect(shownText()).toContain('This invitation was withdrawn.')
    expect(shownText()).toContain('Ask whoever invited you')
  })
})

test('a wrong current password is said at its field', async () => {
  new FakeServer(session())
    .on(listSessions, () => ({ items: [] }))
    .on(changePassword, () => {
      throw new ApiError('PASSWORD_WRONG', {}, 'The current password is wrong.')
    })
  const { screen } = await openScreen('/account')
  await type('Current password', 'not mine')
  await type('New password', 'long enough to be one')
  const field = fieldOf('Current password').closest('.v-input')
  await submit(screen, 'form:has(input[autocomplete="new-password"])')
  expect(field?.textContent).toContain('The current password is wrong.')
})
