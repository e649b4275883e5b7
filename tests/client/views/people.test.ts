import { beforeEach, describe, expect, test } from 'vitest'
import { ApiError } from '../../../shared/contract/errors.js'
import {
  createInvitation,
  deleteProject,
  listInvitations,
  listMembers,
  listProjects,
  readProject,
  removeMember,
  restoreProject,
  updateMember,
  updateProject,
  withdrawInvitation,
  type Invitation,
} from '../../../shared/contract/projects.js'
import { listDeletedDevices, restoreDevice } from '../../../shared/contract/devices.js'
import { listScans } from '../../../shared/contract/scans.js'
import { FakeServer } from '../fakeServer.js'
import { device, idOf, page, person, project, session } from '../samples.js'
import { arrival, openScreen, press, shownText, submit, type } from '../screen.js'

const address = `/projects/${idOf(100)}`
const other = { id: idOf(2), name: 'Tomasz Reyes', email: 'tomasz@heliolab.example', isAdministrator: false }
const member = { person: other, roles: ['designer' as const], since: '2026-04-01T08:00:00.000Z' }
const invitation: Invitation = {
  id: idOf(600),
  email: 'new@heliolab.example',
  roles: ['collaborator'],
  invitedBy: { id: person.id, name: person.name },
  createdAt: '2026-05-01T08:00:00.000Z',
  expiresAt: '2026-05-15T08:00:00.000Z',
  state: 'open',
}
let server: FakeServer
beforeEach(() => {
  server = new FakeServer(session())
    .on(readProject, () => project())
    .on(listMembers, () => page([member]))
    .on(listInvitations, () => page([invitation]))
})

describe('people', () => {
  test('shows who holds which role and what each role may do', async () => {
    const { screen } = await openScreen(`${address}/people`)
    expect(screen.find('section[aria-labelledby="members-heading"] tbody').text()).toContain('Tomasz Reyes')
    const rights = screen
      .findAll('section[aria-labelledby="rights-heading"] tbody tr')
      .map((row) => [row.find('th').text(), ...row.findAll('td').map((cell) => cell.text())])
    expect(rights).toContainEqual(['upload scans, edit conditions, accept or exclude scans', 'yes', '', 'yes', ''])
    expect(rights).toContainEqual(['run analyses, save and edit scenarios', 'yes', 'yes', '', ''])
    expect(rights).toHaveLength(10)
  })

  test('an invitation goes out with address and roles', async () => {
    server.on(createInvitation, () => invitation)
    const { screen } = await openScreen(`${address}/people`)
    await type('E-mail address', 'new@heliolab.example')
    await submit(screen, 'section[aria-labelledby="invite-heading"] form')
    expect(server.requestsOf(createInvitation)[0]?.body).toEqual({
      email: 'new@heliolab.example',
      roles: ['collaborator'],
    })
    expect(shownText()).toContain('is in the outbox, where an administrator can read it')
  })

  test('a withdrawn invitation can be sent again', async () => {
    server
      .on(withdrawInvitation, () => ({ ...invitation, state: 'withdrawn' as const }))
      .on(createInvitation, () => invitation)
    await openScreen(`${address}/people`)
    await press('Withdraw the invitation of new@heliolab.example')
    await press('Invite again')
    expect(server.requestsOf(withdrawInvitation)[0]?.params['invitationId']).toBe(invitation.id)
    expect(server.requestsOf(createInvitation)[0]?.body).toEqual({ email: invitation.email, roles: invitation.roles })
  })

  test('removing a member asks first, and says why it cannot be', async () => {
    server.on(removeMember, () => {
      throw new ApiError('STATE_CONFLICT', { reason: 'last lead' }, 'A project keeps at least one lead.')
    })
    await openScreen(`${address}/people`)
    await press('Remove Tomasz Reyes')
    expect(server.requestsOf(removeMember)).toHaveLength(0)
    expect(shownText()).toContain('Remove Tomasz Reyes?')
    await press('Remove')
    expect(shownText()).toContain('A project keeps at least one lead.')
  })

  test('the roles of a member change', async () => {
    server.on(updateMember, (request) => ({ ...member, roles: (request.body as { roles: 'designer'[] }).roles }))
    const { screen } = await openScreen(`${address}/people`)
    await press('Change the roles of Tomasz Reyes')
    await submit(screen, 'section[aria-labelledby="members-heading"] form')
    expect(server.requestsOf(updateMember)[0]?.body).toEqual({ roles: ['designer'] })
    expect(shownText()).toContain('Tomasz Reyes is now designer.')
  })

  test('who does not manage the project sees neither invitations nor buttons', async () => {
    server.on(readProject, () => project({ myRoles: ['designer'] }))
    await openScreen(`${address}/people`)
    expect(server.requestsOf(listInvitations)).toHaveLength(0)
    expect(shownText()).not.toContain('Invite someone')
    expect(shownText()).not.toContain('Change roles')
  })
})

describe('project settings', () => {
  beforeEach(() => {
    server
      .on(listDeletedDevices, () => page([device({ deletedAt: '2026-05-02T08:00:00.000Z' })]))
      .on(listScans, () => page([]))
      .on(listProjects, () => page([]))
  })

  test('a newer version of someone else is offered before it is written over', async () => {
    const theirs = project({ name: 'Their name', version: 2 })
    server.on(updateProject, (request) => {
      const sent = request.body as { version: number; name: string }
      if (sent.version === 1) {
        throw new ApiError('STALE_VERSION', { sentVersion: 1, currentVersion: 2, current: theirs })
      }
      return project({ name: sent.name, version: 3 })
    })
    const { screen } = await openScreen(`${address}/settings`)
    await type('Name', 'My name')
    await submit(screen, 'form')
    expect(shownText()).toContain('Someone else saved this project while you were editing it.')
    await press('Save mine over it')
    expect(server.requestsOf(updateProject).map((request) => request.body)).toEqual([
      { version: 1, name: 'My name', description: '' },
      { version: 2, name: 'My name', description: '' },
    ])
  })

  test('a project goes into the archive', async () => {
    server.on(updateProject, () => project({ archived: true, version: 2 }))
    await openScreen(`${address}/settings`)
    await press('Put into the archive')
    expect(server.requestsOf(updateProject)[0]?.body).toEqual({ version: 1, archived: true })
  })

  test('a deleted project comes back by the notice', async () => {
    server.on(deleteProject, () => project()).on(restoreProject, () => project())
    const { router } = await openScreen(`${address}/settings`)
    await press('Delete the project')
    expect(server.requestsOf(deleteProject)).toHaveLength(0)
    await press('Delete the project', document.querySelector('.v-overlay-container')!)
    await arrival(router, 'home')
    await press('Undo')
    expect(server.requestsOf(restoreProject)).toHaveLength(1)
  })

  test('a deleted device is restored', async () => {
    server.on(restoreDevice, () => device())
    await openScreen(`${address}/settings`)
    await press('Restore T-01')
    expect(shownText()).toContain('T-01 is back.')
  })
})
