import { ApiError } from '../../../shared/contract/errors.js'
import type { Finding } from '../../database/entities/Finding.js'
import { findingOfScan } from '../../database/repositories/scanChecks.js'
import type { Work } from '../../database/transaction.js'

export async function findFinding(work: Work, scanId: string, findingId: string): Promise<Finding> {
  const finding = await findingOfScan(work, scanId, findingId)
  if (!finding)
    throw new ApiError(
      'NOT_FOUND',
      { what: 'finding' },
      'The scan has no such finding any more; it was checked again since you looked.',
    )
  return finding
}
