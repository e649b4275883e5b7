import { ApiError } from '../../../shared/contract/errors.js'
import type { Scan } from '../../database/entities/Scan.js'

export function foundScan(scan: Scan | null): Scan {
  if (!scan) throw new ApiError('NOT_FOUND', { what: 'scan' }, 'There is no such scan in this project.')
  return scan
}
