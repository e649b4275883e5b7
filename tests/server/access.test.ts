import type { Response } from 'supertest'
import { v7 as uuid } from 'uuid'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { ROLES, hasRight, type Role } from '../../shared/contract/rights.js'
import type { Route } from '../../shared/contract/route.js'
import { ROUTES } from '../../shared/contract/routes.js'
import { CALLERS, startApplication, type Application, type Caller, type CallerName } from '../support/application.js'
import { SAMPLE_BODIES } from '../support/sampleBodies.js'

let application: Application
beforeAll(async () => {
  application = await startApplication()
})
afterAll(() => application?.stop())

type Expected = { status: number; code: string; detail?: object } | 'let in'
const SIGN_IN = { status: 401, code: 'SIGN_IN_NEEDED' }
const isRole = (who: CallerName): who is Role => (ROLES as readonly string[]).includes(who)

/** What the contract's `access` promises to a caller. */
function promised({ access }: Route, who: CallerName): Expected {
  if (access === 'public') return 'let in'
  if (who === 'signed-out') return SIGN_IN
  if (access === 'signed-in') return 'let in'
  if (access === 'administrator')
    return who === 'administrator'
      ? 'let in'
      : { status: 403, code: 'RIGHT_MISSING', detail: { right: 'administrator' } }
  if (!isRole(who)) return { status: 404, code: 'NOT_FOUND', detail: { what: 'project' } }
  return hasRight([who], access.right)
    ? 'let in'
    : { status: 403, code: 'RIGHT_MISSING', detail: { right: access.right } }
}

/** Codes that turn somebody away, and those that would mean the test sent nonsense. */
const TURNED_AWAY = ['SIGN_IN_NEEDED', 'RIGHT_MISSING', 'CSRF_TOKEN_WRONG']
const MEANT_OTHERWISE = ['INTERNAL', 'ROUTE_NOT_FOUND', 'BODY_MALFORMED', 'INPUT_INVALID']

async function send(route: Route, caller: Caller, projectId: string): Promise<Response> {
  const path = route.path.replace(/:(\w+)/g, (_, name: string) =>
    name === 'projectId' ? projectId : name === 'token' ? 'a-token-that-nobody-was-given' : uuid(),
  )
  const request = caller[route.method](path)
  if (route.transfer === 'files') return request.attach('files', Buffer.from('nm,EQE\n400,0.5\n500,0.6\n'), 'scan.csv')
  return route.body ? request.send(SAMPLE_BODIES[route.id] as object) : request
}

const withBody = ROUTES.filter((route) => route.body)
test.each(withBody.map((route) => [route.id, route] as const))(
  'the sample body of %s is one that it takes',
  (id, route) => {
    expect(route.body?.safeParse(SAMPLE_BODIES[id]).error?.issues).toBeUndefined()
  },
)

describe.each(ROUTES.map((route) => [`${route.method.toUpperCase()} ${route.path}`, route] as const))(
  '%s',
  (_, route) => {
    test.each(CALLERS)('as %s', async (who) => {
      const project = await application.addProject('One of many')
      const endsSession = route.id === 'signOut' && who !== 'signed-out'
      const caller = endsSession ? await application.open(application.people[who].email) : application.as(who)

      const reply = await send(route, caller, project.id)

      const expected = promised(route, who)
      if (expected !== 'let in') {
        expect(reply.type).toBe('application/problem+json')
        expect(reply.body).toMatchObject({
          status: expected.status,
          code: expected.code,
          details: expected.detail ?? {},
        })
        expect(reply.status).toBe(expected.status)
        return
      }
      expect(TURNED_AWAY).not.toContain(reply.body?.code)
      expect(MEANT_OTHERWISE).not.toContain(reply.body?.code)
      expect(reply.body?.details?.what).not.toBe('project')
      if (reply.ok) expect(reply.status).toBe(route.status ?? 200)
    })
  },
)
