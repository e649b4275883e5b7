import type { z } from 'zod'
import { readSession } from '../../shared/contract/account.js'
import {
  ApiError,
  ERROR_TITLES,
  Problem,
  isApiError,
  type ErrorCode,
  type ErrorDetails,
} from '../../shared/contract/errors.js'
import type { BodySent, ParamsOf, QuerySent, ReplyOf, Route } from '../../shared/contract/route.js'

/**
 * The one place that speaks HTTP. A call is a route of the contract with its parts; the reply is parsed by the route's
 * schema, a problem document becomes an `ApiError`, and a broken connection becomes a sentence.
 */
type Part<Key extends string, Value> = unknown extends Value
  ? { [K in Key]?: undefined }
  : Record<never, never> extends Value
    ? { [K in Key]?: Value }
    : { [K in Key]: Value }
type Stringly<Params> = unknown extends Params ? unknown : { [K in keyof Params]: string }

export type CallInput<R extends Route> = Part<'params', Stringly<ParamsOf<R>>> &
  Part<'query', QuerySent<R>> &
  Part<'body', BodySent<R>> & { files?: readonly File[]; signal?: AbortSignal | undefined }

interface LooseInput {
  params?: unknown
  query?: unknown
  body?: unknown
  files?: readonly File[]
  signal?: AbortSignal | undefined
}

interface RawReply {
  status: number
  contentType: string
  text: string
}

/** The server could not be reached, or answered with something that is not ours. */
export class ConnectionError extends Error {
  override readonly name = 'ConnectionError'
}

const UNREACHABLE = 'The server cannot be reached. Check the connection and try again; nothing was saved.'
const CHANGES: readonly string[] = ['post', 'put', 'patch', 'delete']
let csrfToken: string | null = null

/** Calls a route. A change whose token has gone stale is tried once more with a new one. */
export async function call<R extends Route>(route: R, ...[input]: CallArguments<R>): Promise<ReplyOf<R>> {
  const parts: LooseInput = input ?? {}
  return withToken(route, async () => parse(route, await send(route, parts)))
}
type CallArguments<R extends Route> =
  Record<never, never> extends CallInput<R> ? [input?: CallInput<R>] : [input: CallInput<R>]

/** Sends files with progress (0 to 1), which `fetch` cannot tell. */
export async function callWithProgress<R extends Route>(
  route: R,
  input: CallInput<R>,
  onProgress: (share: number) => void,
): Promise<ReplyOf<R>> {
  const parts: LooseInput = input
  return withToken(route, async () => parse(route, await sendWithProgress(route, parts, onProgress)))
}

/** Address of a route whose reply is a file, for a link. */
export function addressOf<R extends Route>(route: R, input: Pick<CallInput<R>, 'params' | 'query'>): string {
  return urlOf(route, input)
}

async function withToken<T>(route: Route, run: () => Promise<T>): Promise<T> {
  if (!CHANGES.includes(route.method)) return run()
  if (csrfToken === null) await call(readSession)
  try {
    return await run()
  } catch (error) {
    if (!isApiError(error, 'CSRF_TOKEN_WRONG')) throw error
    await call(readSession)
    return run()
  }
}

function urlOf(route: Route, { params, query }: LooseInput): string {
  const values = (params ?? {}) as Record<string, string>
  const path = route.path.replace(/:(\w+)/g, (_, key: string) => encodeURIComponent(values[key] ?? ''))
  const search = new URLSearchParams()
  for (const [key, value] of Object.entries((query ?? {}) as Record<string, unknown>)) {
    if (value !== undefined && value !== null && value !== '') search.set(key, String(value))
  }
  return search.size > 0 ? `${path}?${search}` : path
}

function headersOf(route: Route, hasJson: boolean): Record<string, string> {
  return {
    accept: 'application/json',
    ...(hasJson ? { 'content-type': 'application/json' } : {}),
    ...(CHANGES.includes(route.method) && csrfToken !== null ? { 'x-csrf-token': csrfToken } : {}),
  }
}

function formOf(files: readonly File[]): FormData {
  const form = new FormData()
  for (const file of files) form.append('files', file, file.name)
  return form
}

async function send(route: Route, input: LooseInput): Promise<RawReply> {
  const hasJson = input.body !== undefined
  const body = input.files ? formOf(input.files) : hasJson ? JSON.stringify(input.body) : null
  try {
    const response = await fetch(urlOf(route, input), {
      method: route.method.toUpperCase(),
      headers: headersOf(route, hasJson),
      credentials: 'same-origin',
      body,
      ...(input.signal ? { signal: input.signal } : {}),
    })
    return {
      status: response.status,
      contentType: response.headers.get('content-type') ?? '',
      text: await response.text(),
    }
  } catch (error) {
    if (input.signal?.aborted) throw error
    throw new ConnectionError(UNREACHABLE, { cause: error })
  }
}

function sendWithProgress(route: Route, input: LooseInput, onProgress: (share: number) => void): Promise<RawReply> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest()
    request.open(route.method.toUpperCase(), urlOf(route, input))
    for (const [name, value] of Object.entries(headersOf(route, false))) request.setRequestHeader(name, value)
    request.upload.onprogress = (event) => {
      if (event.lengthComputable && event.total > 0) onProgress(event.loaded / event.total)
    }
    request.onload = () =>
      resolve({
        status: request.status,
        contentType: request.getResponseHeader('content-type') ?? '',
        text: request.responseText,
      })
    request.onerror = () => reject(new ConnectionError(UNREACHABLE))
    request.onabort = () => reject(new DOMException('The upload was stopped.', 'AbortError'))
    input.signal?.addEventListener('abort', () => request.abort(), { once: true })
    request.send(formOf(input.files ?? []))
  })
}

function parse<R extends Route>(route: R, raw: RawReply): ReplyOf<R> {
  const json = jsonOf(raw)
  if (raw.status >= 400) throw errorOf(raw, json)
  const result = (route.reply as z.ZodType).safeParse(json)
  if (!result.success) {
    throw new ConnectionError('The server sent something that this page does not understand. Reload the page.', {
      cause: result.error,
    })
  }
  rememberToken(result.data)
  return result.data as ReplyOf<R>
}

function jsonOf({ text, contentType }: RawReply): unknown {
  if (text === '') return null
  if (!contentType.includes('json')) return undefined
  try {
    return JSON.parse(text)
  } catch {
    return undefined
  }
}

function errorOf(raw: RawReply, json: unknown): Error {
  const problem = Problem.safeParse(json)
  if (!problem.success) {
    return new ConnectionError(`The server answered ${raw.status} without a reason. Try again in a moment.`)
  }
  const { code, details, detail, errors } = problem.data
  const known: ErrorCode = code in ERROR_TITLES ? (code as ErrorCode) : 'INTERNAL'
  const all = errors && !('errors' in details) ? { ...details, errors } : details
  return new ApiError(known, all as unknown as ErrorDetails[ErrorCode], detail)
}

function rememberToken(reply: unknown): void {
  if (typeof reply === 'object' && reply !== null && 'csrfToken' in reply) csrfToken = String(reply.csrfToken)
}
