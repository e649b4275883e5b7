import { ApiError } from '../../shared/contract/errors.js'

/** Throws STALE_VERSION with both versions when what was sent was read before somebody else saved. */
export function requireCurrentVersion<Shown extends { version: number }>(
  sentVersion: number,
  current: Shown,
  what: string,
): void {
  if (sentVersion === current.version) return
  throw new ApiError(
    'STALE_VERSION',
    { sentVersion, currentVersion: current.version, current },
    `Your version ${sentVersion} of ${what} is older than the saved version ${current.version}. Nothing was changed.`,
  )
}
