import { vi } from 'vitest'
import type { z } from 'zod'
import { readSession, type Session } from '../../shared/contract/account.js'
import { ApiError, ERROR_TITLES, type ErrorCode, type FieldError } from '../../shared/contract/errors.js'
import type { ReplyOf, Route } from '../../shared/contract/route.js'
import { ROUTES } from '../../shared/contract/routes.js'

/**
 * A server that exists only in the test: it answers `fetch` by the contract. What it is sent and what it replies both
 * have to pass the route's schemas, so a test cannot agree with itself against the contract.
 */
export interface FakeRequest {
  route: Route
  params: Record<string, string>
  query: Record<string, string>
  body: unknown
  csrfToken: string | null
}
type Answer<R extends Route> = (request: FakeRequest) => ReplyOf<R>

const STATUS: Partial<Record<ErrorCode, number>> = {
  SIGN_IN_NEEDED: 401,
  SIGN_IN_FAILED: 401,
  CSRF_TOKEN_WRONG: 403,
  RIGHT_MISSING: 403,
  NOT_FOUND: 404,
  STALE_VERSION: 409,
  ALREADY_EXISTS: 409,
  TOO_MANY_REQUESTS: 429,
  DATABASE_UNAVAILABLE: 503,
  INTERNAL: 500,
}

export class FakeServer {
  readonly requests: FakeRequest[] = []
  private readonly answers = new Map<string, (request: FakeRequest) => unknown>()

  constructor(session: Session) {
    this.on(readSession, () => session)
    vi.stubGlobal('fetch', (url: string, init: RequestInit = {}) => Promise.resolve(this.answer(url, init)))
  }

  on<R extends Route>(route: R, answer: Answer<R>): this {
    this.answers.set(route.id, answer)
    return this
  }

  requestsOf(route: Route): FakeRequest[] {
    return this.requests.filter((request) => request.route.id === route.id)
  }

  private answer(url: string, init: RequestInit): Response {
    const address = new URL(url, 'http://tierlight.test')
    const method = (init.method ?? 'GET').toLowerCase()
    const found = ROUTES.flatMap((route) => {
      const match = route.method === method ? patternOf(route).exec(address.pathname) : null
      return match ? [{ route, params: match.groups ?? {} }] : []
    })[0]
    if (!found) return problem(new ApiError('ROUTE_NOT_FOUND', { path: address.pathname }))
    const { route } = found
    const request: FakeRequest = {
      route,
      params: { ...found.params },
      query: Object.fromEntries(address.searchParams),
      body: typeof init.body === 'string' ? JSON.parse(init.body) : undefined,
      csrfToken: new Headers(init.headers).get('x-csrf-token'),
    }
    this.requests.push(request)
    try {
      checkInput(route, request)
      const answer = this.answers.get(route.id)
      if (!answer) throw new Error(`The test says nothing about ${route.id}.`)
      return Response.json((route.reply as z.ZodType).parse(answer(request)), { status: route.status ?? 200 })
    } catch (error) {
      if (error instanceof ApiError) return problem(error)
      throw error
    }
  }
}

function patternOf(route: Route): RegExp {
  return new RegExp(`^${route.path.replace(/:(\w+)/g, '(?<$1>[^/]+)')}$`)
}

function checkInput(route: Route, request: FakeRequest): void {
  const parts = [
    [route.params, request.params],
    [route.query, request.query],
    [route.body, request.body],
  ] as const
  for (const [schema, value] of parts) {
    const parsed = (schema as z.ZodType | undefined)?.safeParse(value)
    if (!parsed || parsed.success) continue
    const errors = parsed.error.issues.map((issue) => ({ path: issue.path, message: issue.message }) as FieldError)
    throw new ApiError('INPUT_INVALID', { errors }, 'Some of the fields need another look.')
  }
}

function problem(error: ApiError): Response {
  const body = {
    type: `urn:tierlight:${error.code}`,
    title: ERROR_TITLES[error.code],
    status: STATUS[error.code] ?? 400,
    detail: error.message,
    code: error.code,
    details: error.details,
    ...('errors' in error.details ? { errors: error.details.errors } : {}),
  }
  return new Response(JSON.stringify(body), {
    status: body.status,
    headers: { 'content-type': 'application/problem+json' },
  })
}
