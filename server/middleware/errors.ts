import type { ErrorRequestHandler, RequestHandler } from 'express'
import { randomUUID } from 'node:crypto'
import type { Logger } from 'pino'
import { ApiError, ERROR_TITLES, isApiError, type Problem } from '../../shared/contract/errors.js'
import { isDatabaseUnavailable, isDuplicateKey } from '../database/databaseErrors.js'
import { ERROR_STATUS } from './errorStatus.js'

/** An API address that no route serves. */
export const unknownRoute: RequestHandler = (request) => {
  throw new ApiError(
    'ROUTE_NOT_FOUND',
    { path: request.path },
    `The API has no address ${request.method} ${request.path}.`,
  )
}

/** Every error leaves here, as an RFC 9457 problem document; what was not foreseen keeps its details in the log. */
export function problems(log: Logger): ErrorRequestHandler {
  return (error: unknown, request, response, next) => {
    if (response.headersSent) return next(error)
    const known = translate(error)
    if (known) return void send(known)
    const id = randomUUID()
    log.error({ id, err: error, method: request.method, path: request.path }, 'unexpected error')
    send(
      new ApiError(
        'INTERNAL',
        { id },
        `Something went wrong on the server. Give this number to the administrator: ${id}`,
      ),
    )

    function send(problem: ApiError): void {
      const document: Problem = {
        type: `urn:tierlight:problem:${problem.code.toLowerCase().replaceAll('_', '-')}`,
        title: ERROR_TITLES[problem.code],
        status: ERROR_STATUS[problem.code],
        detail: problem.message,
        code: problem.code,
        details: problem.details as Record<string, unknown>,
        ...(isApiError(problem, 'INPUT_INVALID') ? { errors: problem.details.errors } : {}),
      }
      if (isApiError(problem, 'TOO_MANY_REQUESTS'))
        response.setHeader('Retry-After', String(problem.details.retryAfterSeconds))
      response.status(document.status).type('application/problem+json').send(JSON.stringify(document))
    }
  }
}

/** What the framework's own errors carry. */
interface HttpError {
  type?: string
  status?: number
  limit?: number
}

function translate(error: unknown): ApiError | null {
  if (isApiError(error)) return error
  if (isDatabaseUnavailable(error))
    return new ApiError('DATABASE_UNAVAILABLE', {}, 'The database does not answer. Try again in a moment.', {
      cause: error,
    })
  if (isDuplicateKey(error))
    return new ApiError('ALREADY_EXISTS', { what: 'entry', field: '', value: '' }, 'Such an entry exists already.')
  if (error instanceof URIError) return new ApiError('NOT_FOUND', { what: 'address' }, 'Nothing has this address.')
  const { type, status, limit } = (error ?? {}) as HttpError
  const problem = type === undefined ? undefined : BODY_PROBLEMS[type]
  if (problem) return new ApiError('BODY_MALFORMED', {}, problem)
  if (type === 'entity.too.large')
    return new ApiError('BODY_TOO_LARGE', { limitBytes: limit ?? 0 }, `The request is larger than ${limit ?? 0} bytes.`)
  if (status === 400) return new ApiError('BODY_MALFORMED', {}, 'The request cannot be understood.')
  return null
}

/** Sentences for what the body parser could not read, by its type of error. */
const BODY_PROBLEMS: Record<string, string> = {
  'entity.parse.failed': 'The body of the request is not valid JSON.',
  'charset.unsupported': 'The body of the request is in an unknown character set. Send JSON in UTF-8.',
  'encoding.unsupported': 'The body of the request is compressed in an unknown way. Send plain JSON.',
  'request.size.invalid': 'The body of the request is shorter or longer than its header says.',
  'request.aborted': 'The request broke off before its body was complete.',
}
