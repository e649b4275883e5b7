import { beforeEach, describe, expect, test, vi } from 'vitest'
import { signIn, updateAccount } from '../../../shared/contract/account.js'
import { ApiError } from '../../../shared/contract/errors.js'
import { listDevices, readMatching } from '../../../shared/contract/matching.js'
import { downloadSourceFile } from '../../../shared/contract/scans.js'
import { FakeServer } from '../fakeServer.js'
import { device, idOf, matching, page, person, session } from '../samples.js'

/** The module keeps the token of the session; each test starts with a page that has just been opened. */
async function openedPage() {
  vi.resetModules()
  return import('../../../src/api/http.js')
}
const json = (body: unknown, status = 200, type = 'application/json') =>
  new Response(JSON.stringify(body), { status, headers: { 'content-type': type } })

describe('call', () => {
  let server: FakeServer
  beforeEach(() => {
    server = new FakeServer(session())
  })

  test('fills the path, leaves empty query values out and parses the reply', async () => {
    const { call } = await openedPage()
    server.on(readMatching, () => matching(device(), [18.5, 20.1]))
    const reply = await call(readMatching, {
      params: { projectId: idOf(100), deviceId: idOf(200) },
      query: { spectrum: 'AM0', scaleToWM2: undefined },
    })
    expect(reply.jLimMaCm2).toBe(18.5)
    expect(server.requests[0]?.params).toEqual({ projectId: idOf(100), deviceId: idOf(200) })
    expect(server.requests[0]?.query).toEqual({ spectrum: 'AM0' })
  })

  test('reads the session first when a change has no token yet, and sends the token it got', async () => {
    const { call } = await openedPage()
    server.on(updateAccount, () => ({ ...person, name: 'Ines O.' }))
    await call(updateAccount, { body: { name: 'Ines O.' } })
    expect(server.requests.map((request) => [request.route.id, request.csrfToken])).toEqual([
      ['readSession', null],
      ['updateAccount', 'first-token'],
    ])
  })

  test('tries a change once more with a new token when the old one was refused', async () => {
    const { call } = await openedPage()
    const tokens = ['old-token', 'new-token']
    server.on((await import('../../../shared/contract/account.js')).readSession, () =>
      session({ csrfToken: tokens.shift() ?? 'none' }),
    )
    server.on(updateAccount, (request) => {
      if (request.csrfToken !== 'new-token') throw new ApiError('CSRF_TOKEN_WRONG', {})
      return { ...person, name: 'Ines O.' }
    })
    expect((await call(updateAccount, { body: { name: 'Ines O.' } })).name).toBe('Ines O.')
    expect(server.requestsOf(updateAccount).map((request) => request.csrfToken)).toEqual(['old-token', 'new-token'])
  })

  test('gives up when the new token is refused too', async () => {
    const { call } = await openedPage()
    server.on(updateAccount, () => {
      throw new ApiError('CSRF_TOKEN_WRONG', {})
    })
    await expect(call(updateAccount, { body: { name: 'Ines O.' } })).rejects.toMatchObject({ code: 'CSRF_TOKEN_WRONG' })
    expect(server.requestsOf(updateAccount)).toHaveLength(2)
  })

  test('a reply that carries a session replaces the token', async () => {
    const { call } = await openedPage()
    server.on(signIn, () => session({ csrfToken: 'after-sign-in' }))
    server.on(updateAccount, () => person)
    await call(signIn, { body: { email: person.email, password: 'correct horse battery' } })
    await call(updateAccount, { body: { name: person.name } })
    expect(server.requestsOf(updateAccount)[0]?.csrfToken).toBe('after-sign-in')
  })

  test('a problem document becomes an error with code, details and sentence', async () => {
    const { call } = await openedPage()
    server.on(listDevices, () => {
      throw new ApiError('NOT_FOUND', { what: 'project' }, 'There is no such project.')
    })
    const error = await call(listDevices, { params: { projectId: idOf(100) }, query: {} }).catch((one: unknown) => one)
    expect(error).toMatchObject({
      name: 'ApiError',
      code: 'NOT_FOUND',
      message: 'There is no such project.',
      details: { what: 'project' },
    })
  })

  test('sentences about fields come along with their paths', async () => {
    const { call } = await openedPage()
    server.on(updateAccount, () => person)
    const error = await call(updateAccount, { body: { name: '  ' } }).catch((one: unknown) => one)
    expect(error).toMatchObject({
      code: 'INPUT_INVALID',
      details: { errors: [{ path: ['name'], message: 'A name is needed.' }] },
    })
  })

  test('errors that stand beside the details are found as well', async () => {
    const { call } = await openedPage()
    const errors = [{ path: ['scans', 0, 'junctionId'], message: 'Choose the junction.' }]
    const problem = { type: 'x', title: 'x', status: 422, detail: 'No.', code: 'INPUT_INVALID', details: {}, errors }
    vi.stubGlobal('fetch', () => Promise.resolve(json(problem, 422, 'application/problem+json')))
    const error = await call(listDevices, { params: { projectId: idOf(100) } }).catch((one: unknown) => one)
    expect(error).toMatchObject({ details: { errors } })
  })

  test.each([
    ['a broken connection', () => Promise.reject(new TypeError('Failed to fetch')), /cannot be reached/],
    [
      'an answer from something else',
      () => Promise.resolve(new Response('<h1>502</h1>', { status: 502 })),
      /answered 502/,
    ],
    ['a reply against the contract', () => Promise.resolve(json({ items: 'none' })), /does not understand/],
    ['a reply that is no JSON', () => Promise.resolve(new Response('hello')), /does not understand/],
  ])('%s gives a sentence', async (_, fetch, sentence) => {
    const { call, ConnectionError } = await openedPage()
    vi.stubGlobal('fetch', fetch)
    const failed = call(listDevices, { params: { projectId: idOf(100) } })
    await expect(failed).rejects.toThrow(sentence)
    await expect(failed).rejects.toBeInstanceOf(ConnectionError)
  })

  test('an aborted call stays an abort', async () => {
    const { call } = await openedPage()
    const aborting = new AbortController()
    vi.stubGlobal('fetch', () => {
      aborting.abort()
      return Promise.reject(new DOMException('aborted', 'AbortError'))
    })
    const failed = call(listDevices, { params: { projectId: idOf(100) }, signal: aborting.signal })
    await expect(failed).rejects.toMatchObject({ name: 'AbortError' })
  })
})

test('addressOf escapes what stands in the path', async () => {
  const { addressOf } = await openedPage()
  expect(addressOf(downloadSourceFile, { params: { projectId: 'a/b', sourceFileId: 'c d' } })).toBe(
    '/api/projects/a%2Fb/source-files/c%20d/content',
  )
})

test('everyItem follows the cursors and keeps the order', async () => {
  const { everyItem } = await import('../../../src/api/pages.js')
  const pages = [
    { ...page(['a', 'b']), nextCursor: 'two' },
    { ...page(['c']), nextCursor: null },
  ]
  const asked: (string | undefined)[] = []
  const items = await everyItem((cursor) => {
    asked.push(cursor)
    return Promise.resolve(pages[asked.length - 1]!)
  })
  expect(items).toEqual(['a', 'b', 'c'])
  expect(asked).toEqual([undefined, 'two'])
})
