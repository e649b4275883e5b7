import type { Request, Response, Router } from 'express'
import type { z } from 'zod'
import { ApiError, type FieldError } from '../../shared/contract/errors.js'
import type { Access, Route } from '../../shared/contract/route.js'
import { requireAdministrator, type Actor } from '../services/actor.js'

type Parsed<Schema extends z.ZodType> = z.output<Schema>

/** What a handler gets: everything checked, and who acts. */
export interface Call<Params, Query, Body, Who> {
  params: Params
  query: Query
  body: Body
  actor: Who
  request: Request
  response: Response
}

type WhoOf<Who extends Access> = Who extends 'public' ? Actor | null : Actor

/**
 * Serves one route of the contract: parses path, query and body by its schemas, asks for a sign-in where the route
 * needs one, and sends what the handler gives with the route's status. Rights in a project are the services' own.
 * In tests the reply is parsed too, so that a reply that drifts from the contract fails.
 */
export function serve<
  Params extends z.ZodType,
  Query extends z.ZodType,
  Body extends z.ZodType,
  Reply extends z.ZodType,
  Who extends Access,
>(
  router: Router,
  route: Route<Params, Query, Body, Reply, Who>,
  handler: (call: Call<Parsed<Params>, Parsed<Query>, Parsed<Body>, WhoOf<Who>>) => Promise<z.input<Reply>>,
): void {
  router[route.method](route.path, async (request, response) => {
    const actor = actorOf(request)
    if (route.access !== 'public' && !actor) throw new ApiError('SIGN_IN_NEEDED', {}, 'Sign in to see this.')
    if (route.access === 'administrator' && actor) requireAdministrator(actor)
    const call = {
      params: parse(route.params, request.params, 'address'),
      query: parse(route.query, request.query, 'address'),
      body: parse(route.body, request.body, 'body'),
      actor,
      request,
      response,
    } as Call<Parsed<Params>, Parsed<Query>, Parsed<Body>, WhoOf<Who>>
    const reply = await handler(call)
    if (route.transfer === 'bytes') return
    if (request.app.get('check replies')) route.reply.parse(reply)
    response.status(route.status ?? 200).json(reply)
  })
}

function actorOf(request: Request): Actor | null {
  return (request.user as Actor | undefined) ?? null
}

function parse(schema: z.ZodType | undefined, value: unknown, where: 'address' | 'body'): unknown {
  if (!schema) return undefined
  const result = schema.safeParse(value ?? {})
  if (result.success) return result.data
  const errors: FieldError[] = result.error.issues.map((issue) => ({
    path: issue.path.map((part) => (typeof part === 'symbol' ? String(part) : part)),
    message: issue.message,
  }))
  const isUnknownId = where === 'address' && errors.some((error) => String(error.path[0]).endsWith('Id'))
  if (isUnknownId) throw new ApiError('NOT_FOUND', { what: 'address' }, 'Nothing has this address.')
  const sentence = errors.map((error) => [error.path.join('.'), error.message].filter(Boolean).join(': ')).join('; ')
  throw new ApiError('INPUT_INVALID', { errors }, `Some of the input cannot be used: ${sentence}`)
}
