import type { z } from 'zod'
import type { Right } from './rights.js'

/**
 * Who may call a route. `public`: anyone. `signed-in`: any person with an account. `administrator`: the site role.
 * `{ right }`: a member of the project in the path who holds the right; outsiders get 404.
 */
export type Access = 'public' | 'signed-in' | 'administrator' | { right: Right }

/** One route of the API as data: the server serves it, the client calls it, the OpenAPI document describes it. */
export interface Route<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
  Reply extends z.ZodType = z.ZodType,
  Who extends Access = Access,
> {
  readonly id: string
  readonly method: 'get' | 'post' | 'put' | 'patch' | 'delete'
  /** Express path, for example `/api/projects/:projectId/devices`. */
  readonly path: string
  readonly group: string
  readonly summary: string
  readonly access: Who
  readonly params?: Params
  readonly query?: Query
  readonly body?: Body
  /** `files`: multipart/form-data with one or more parts named `files`. `bytes`: the reply is a file. */
  readonly transfer?: 'files' | 'bytes'
  readonly reply: Reply
  /** Status of success, 200 unless said. */
  readonly status?: 200 | 201 | 202 | 204
}

export function defineRoute<
  Params extends z.ZodType,
  Query extends z.ZodType,
  Body extends z.ZodType,
  Reply extends z.ZodType,
  const Who extends Access,
>(route: Route<Params, Query, Body, Reply, Who>): Route<Params, Query, Body, Reply, Who> {
  return route
}

type Parsed<Schema> = Schema extends z.ZodType ? z.output<Schema> : undefined
type Sent<Schema> = Schema extends z.ZodType ? z.input<Schema> : undefined
export type ParamsOf<R> = R extends Route<infer Params, z.ZodType, z.ZodType, z.ZodType> ? Parsed<Params> : never
export type QueryOf<R> = R extends Route<z.ZodType, infer Query, z.ZodType, z.ZodType> ? Parsed<Query> : never
export type BodyOf<R> = R extends Route<z.ZodType, z.ZodType, infer Body, z.ZodType> ? Parsed<Body> : never
export type QuerySent<R> = R extends Route<z.ZodType, infer Query, z.ZodType, z.ZodType> ? Sent<Query> : never
export type BodySent<R> = R extends Route<z.ZodType, z.ZodType, infer Body, z.ZodType> ? Sent<Body> : never
export type ReplyOf<R> = R extends Route<z.ZodType, z.ZodType, z.ZodType, infer Reply> ? Parsed<Reply> : never
