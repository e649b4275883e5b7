import { z } from 'zod'

/**
 * Every error that the API tells on purpose: its code, the type of its details, and its sentence. Services throw
 * meaning (`new ApiError('DEVICE_STATE', …)`); one table in the server gives the HTTP status.
 */
export interface FieldError {
  path: (string | number)[]
  message: string
}

export interface ErrorDetails {
  INPUT_INVALID: { errors: FieldError[] }
  BODY_MALFORMED: Record<string, never>
  BODY_TOO_LARGE: { limitBytes: number }
  SIGN_IN_NEEDED: Record<string, never>
  SIGN_IN_FAILED: Record<string, never>
  PASSWORD_WRONG: Record<string, never>
  CSRF_TOKEN_WRONG: Record<string, never>
  RIGHT_MISSING: { right: string }
  NOT_FOUND: { what: string }
  ROUTE_NOT_FOUND: { path: string }
  STALE_VERSION: { sentVersion: number; currentVersion: number; current: unknown }
  ALREADY_EXISTS: { what: string; field: string; value: string }
  STATE_CONFLICT: { reason: string }
  LINK_EXPIRED: { what: string }
  FILE_UNREADABLE: {
    fileName: string
    reason: string
    line?: number | undefined
    column?: string | undefined
    value?: string | undefined
    expected?: string | undefined
  }
  TOO_MANY_REQUESTS: { retryAfterSeconds: number }
  DATABASE_UNAVAILABLE: Record<string, never>
  INTERNAL: { id: string }
}
export type ErrorCode = keyof ErrorDetails

/** Short title of each error, for people; the detail sentence says what happened this time. */
export const ERROR_TITLES: Record<ErrorCode, string> = {
  INPUT_INVALID: 'Some of the input cannot be used',
  BODY_MALFORMED: 'The request is not valid JSON',
  BODY_TOO_LARGE: 'The request is too large',
  SIGN_IN_NEEDED: 'Sign in first',
  SIGN_IN_FAILED: 'The address and password do not match',
  PASSWORD_WRONG: 'The current password is wrong',
  CSRF_TOKEN_WRONG: 'The page is out of date; reload it',
  RIGHT_MISSING: 'Your role does not allow this',
  NOT_FOUND: 'Nothing was found here',
  ROUTE_NOT_FOUND: 'There is no such address',
  STALE_VERSION: 'Someone else saved a newer version',
  ALREADY_EXISTS: 'It exists already',
  STATE_CONFLICT: 'This cannot be done now',
  LINK_EXPIRED: 'The link is no longer valid',
  FILE_UNREADABLE: 'The file cannot be read',
  TOO_MANY_REQUESTS: 'Too many attempts',
  DATABASE_UNAVAILABLE: 'The database does not answer',
  INTERNAL: 'Something went wrong on the server',
}

/** RFC 9457 problem document. */
export const Problem = z
  .object({
    type: z.string(),
    title: z.string(),
    status: z.int(),
    detail: z.string(),
    code: z.string(),
    details: z.record(z.string(), z.unknown()),
    errors: z.array(z.object({ path: z.array(z.union([z.string(), z.number()])), message: z.string() })).optional(),
  })
  .meta({ id: 'Problem' })
export type Problem = z.infer<typeof Problem>

export class ApiError<Code extends ErrorCode = ErrorCode> extends Error {
  override readonly name = 'ApiError'

  constructor(
    readonly code: Code,
    readonly details: ErrorDetails[Code],
    /** One sentence: what is wrong, where, what would be right. */
    detail: string = ERROR_TITLES[code],
    options?: ErrorOptions,
  ) {
    super(detail, options)
  }
}

export function isApiError<Code extends ErrorCode>(error: unknown, code?: Code): error is ApiError<Code> {
  return error instanceof ApiError && (code === undefined || error.code === code)
}
