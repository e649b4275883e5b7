import type { RequestHandler } from 'express'
import { randomBytes, timingSafeEqual } from 'node:crypto'
import { ApiError } from '../../shared/contract/errors.js'

const READING = new Set(['GET', 'HEAD', 'OPTIONS'])

/** Every change carries the token that `GET /api/session` gave to this session, as the header X-CSRF-Token. */
export const csrfProtection: RequestHandler = (request, _response, next) => {
  if (READING.has(request.method)) return next()
  const expected = request.session.csrfToken
  const sent = request.get('X-CSRF-Token') ?? ''
  if (!expected || !sameText(expected, sent))
    throw new ApiError('CSRF_TOKEN_WRONG', {}, 'The page is out of date. Reload it and try again.')
  next()
}

export function newCsrfToken(): string {
  return randomBytes(32).toString('base64url')
}

function sameText(a: string, b: string): boolean {
  const left = Buffer.from(a)
  const right = Buffer.from(b)
  return left.length === right.length && timingSafeEqual(left, right)
}
