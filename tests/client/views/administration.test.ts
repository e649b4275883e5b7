import { beforeEach, describe, expect, test } from 'vitest'
import {
  listAccounts,
  listAuditEvents,
  listOutbox,
  readHealth,
  updateAccountByAdministrator,
  type Account,
} from '../../../shared/contract/administration.js'
import { listActivity, listMembers, readProject, type Activity } from '../../../shared/contract/projects.js'
import { FakeServer } from '../fakeServer.js'
import { idOf, page, person, project, session } from '../samples.js'
import { openScreen, press, shownText } from '../screen.js'

const account: Account = {
  id: idOf(2),
  name: 'Tomasz Reyes',
  email: 'tomasz@heliolab.example',
  isAdministrator: false,
  disabled: false,
  createdAt: '2026-04-01T08:00:00.000Z',
  lastSignInAt: null,
  projectCount: 1,
}
const happened = (n: number, change: Partial<Activity> = {}): Activity => ({
  id: idOf(700 + n),
  at: `2026-05-0${n}T08:00:00.000Z`,
  actor: { id: person.id, name: person.name },
  action: 'scan.accepted',
  sentence: `Ines Okafor accepted scan ${n}.`,
  subject: null,
  ...change,
})
let server: FakeServer
beforeEach(() => {
  server = new FakeServer(session({ person: { ...person, isAdministrator: true } }))
})

describe('administration', () => {
  test('an account that was disabled can be enabled again at once', async () => {
    server
      .on(listAccounts, () => page([account]))
      .on(updateAccountByAdministrator, (request) => ({
        ...account,
        ...(request.body as object),
      }))
    await openScreen('/administration/accounts')
    await press('Disable Tomasz Reyes')
    await press('Undo')
    expect(server.requestsOf(updateAccountByAdministrator).map((request) => request.body)).toEqual([
      { disabled: true },
      { disabled: false },
    ])
  })

  test('the mail that is kept can be read, and its link followed', async () => {
    server.on(listOutbox, () =>
      page([
        {
          id: idOf(800),
          to: 'new@heliolab.example',
          subject: 'You are invited',
          text: 'Ines invites you.\nhttps://tierlight.example/invitations/abc\nUntil 15 May.',
          kind: 'invitation',
          createdAt: '2026-05-01T08:00:00.000Z',
          state: 'kept' as const,
          attempts: 0,
          lastError: null,
          sentAt: null,
        },
      ]),
    )
    const { screen } = await openScreen('/administration/outbox')
    expect(shownText()).toContain('No mail server is configured')
    const link = screen.find('details a')
    expect(link.attributes('href')).toBe('https://tierlight.example/invitations/abc')
    expect(screen.find('details pre').text()).toContain('Until 15 May.')
  })

  test('health says what needs a look', async () => {
    server.on(readHealth, () => ({
      version: '0.1.0',
      engineVersion: '1.0.0',
      startedAt: '2026-05-01T08:00:00.000Z',
      database: { answers: true, version: '10.11', roundTripMs: 1.23, migrations: 4 },
      mail: { delivery: 'smtp' as const, waiting: 0, failed: 2 },
      storage: { sourceFiles: 1, sourceFileBytes: 6400, scans: 3 },
    }))
    const { screen } = await openScreen('/administration/health')
    expect(screen.find('.ill').element.parentElement?.textContent).toContain('2 failed')
    expect(shownText()).toContain('10.11, answers in 1.2 ms, 4 migrations')
    expect(shownText()).toContain('6.4\u00a0kB'.replace('\u00a0', ' '))
  })

  test('the audit trail goes on to older pages', async () => {
    server
      .on(listAccounts, () => page([account]))
      .on(listAuditEvents, (request) =>
        request.query['cursor'] === 'older'
          ? { items: [happened(1)], total: 2, nextCursor: null }
          : { items: [happened(2)], total: 2, nextCursor: 'older' },
      )
    await openScreen('/administration/audit-trail')
    expect(shownText()).toContain('1 of 2')
    await press('Show older')
    expect(shownText()).toContain('accepted scan 2.')
    expect(shownText()).toContain('accepted scan 1.')
    expect(shownText()).not.toContain('Show older')
  })
})

describe('activity of a project', () => {
  beforeEach(() => {
    server.on(readProject, () => project()).on(listMembers, () => page([]))
  })

  test('the filter of the address goes to the server, days as spans of time', async () => {
    server.on(listActivity, () => page([happened(2)]))
    await openScreen(`/projects/${idOf(100)}/activity?what=scan.accepted&from=2026-05-02&to=2026-05-02`)
    const query = server.requestsOf(listActivity)[0]?.query
    expect(query).toMatchObject({ action: 'scan.accepted', limit: '50' })
    expect(Date.parse(query!['to']!) - Date.parse(query!['from']!)).toBe(24 * 3_600_000)
  })

  test('what happened to a device leads there', async () => {
    server.on(listActivity, () =>
      page([
        happened(2, {
          sentence: 'Ines Okafor saved T-01.',
          subject: { kind: 'device', id: idOf(200), name: 'T-01' },
        }),
      ]),
    )
    const { screen } = await openScreen(`/projects/${idOf(100)}/activity`)
    expect(screen.find('ol a').text()).toBe('T-01')
    expect(screen.find('ol a').attributes('href')).toBe(`/projects/${idOf(100)}/devices/${idOf(200)}`)
  })

  test('an empty list tells filters from silence', async () => {
    server.on(listActivity, () => page([]))
    await openScreen(`/projects/${idOf(100)}/activity?what=device.deleted`)
    expect(shownText()).toContain('Nothing fits these filters.')
    await openScreen(`/projects/${idOf(100)}/activity`)
    expect(shownText()).toContain('Nothing has happened here yet.')
  })
})
