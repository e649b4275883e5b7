import { ApiError, isApiError, type FieldError } from '../../shared/contract/errors.js'

/** What an error says to the person in front of the screen. */
export function sentenceOf(error: unknown): string {
  if (isApiError(error, 'TOO_MANY_REQUESTS')) {
    const seconds = Math.ceil(error.details.retryAfterSeconds)
    return `${error.message}${/\d/.test(error.message) ? '' : ` Try again in ${seconds} s.`}`
  }
  if (isApiError(error, 'INTERNAL') && error.details.id) return `${error.message} (error number ${error.details.id})`
  if (error instanceof Error && error.message) return error.message
  return 'Something went wrong. Try again; if it happens again, tell the administrator.'
}

/** The sentences about single fields that the server sent with an error. */
export function fieldErrorsOf(error: unknown): FieldError[] {
  if (isApiError(error, 'INPUT_INVALID')) return error.details.errors ?? []
  if (isApiError(error, 'ALREADY_EXISTS')) return [{ path: [error.details.field], message: error.message }]
  return []
}

/** Whether asking again could help: not when the answer was a clear no. */
export function isWorthRepeating(error: unknown): boolean {
  return !(error instanceof ApiError) || error.code === 'DATABASE_UNAVAILABLE'
}
