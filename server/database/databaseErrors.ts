import { QueryFailedError } from 'typeorm'

/** Errors of the database are recognised by their number, never by their words. */
const DUPLICATE_KEY = 1062
const UNAVAILABLE = new Set(['ECONNREFUSED', 'ECONNRESET', 'PROTOCOL_CONNECTION_LOST', 'ETIMEDOUT', 'EPIPE'])
/** Deadlock and lock wait timeout: the transaction was rolled back whole and may be tried again. */
const RETRIABLE = new Set([1205, 1213])

interface DriverError {
  errno?: number
  code?: string
  sqlMessage?: string
}

function driverErrorOf(error: unknown): DriverError | null {
  if (error instanceof QueryFailedError) return error.driverError as DriverError
  return error instanceof Error ? (error as DriverError) : null
}

export const isDuplicateKey = (error: unknown) => driverErrorOf(error)?.errno === DUPLICATE_KEY
export const isRetriable = (error: unknown) => RETRIABLE.has(driverErrorOf(error)?.errno ?? 0)
export const isDatabaseUnavailable = (error: unknown) => UNAVAILABLE.has(driverErrorOf(error)?.code ?? '')
