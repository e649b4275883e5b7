import type { RequestHandler } from 'express'
import { rateLimit } from 'express-rate-limit'
import { ApiError } from '../../shared/contract/errors.js'
import type { Config } from '../config.js'

/**
 * How often one address may try. The counts are each process's own: they slow guessing down and hold nothing that a
 * second server would need; with n servers the limit is n times as high.
 */
const LIMITS = {
  'sign-in': { windowMs: 10 * 60_000, limit: 20 },
  reset: { windowMs: 60 * 60_000, limit: 10 },
  invitation: { windowMs: 60 * 60_000, limit: 100 },
  upload: { windowMs: 60_000, limit: 120 },
} as const

export function limitAttempts(config: Config, kind: keyof typeof LIMITS): RequestHandler {
  if (!config.rateLimits) return (_request, _response, next) => next()
  const { windowMs, limit } = LIMITS[kind]
  return rateLimit({
    windowMs,
    limit,
    standardHeaders: 'draft-8',
    legacyHeaders: false,
    handler: (request) => {
      const resetTime = (request as { rateLimit?: { resetTime?: Date } }).rateLimit?.resetTime
      const retryAfterSeconds = Math.max(
        1,
        Math.ceil(((resetTime?.getTime() ?? Date.now() + windowMs) - Date.now()) / 1000),
      )
      throw new ApiError(
        'TOO_MANY_REQUESTS',
        { retryAfterSeconds },
        `Too many attempts from this address. Try again in ${retryAfterSeconds} s.`,
      )
    },
  })
}
