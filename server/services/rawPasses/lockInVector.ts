import { rawMeasurementsOfScans } from '../../database/repositories/rawMeasurements.js'
import type { Work } from '../../database/transaction.js'
import { reduceStored } from './reduce.js'

/** X and Y of a device pass after the dark, V. */
export interface LockInVector {
  inPhaseV: Float64Array
  quadratureV: Float64Array
}

/** Of those raw scans whose lock-in gave both parts. */
export async function vectorsOfScans(work: Work, scanIds: string[]): Promise<Map<string, LockInVector>> {
  const rows = await rawMeasurementsOfScans(work, scanIds)
  return new Map(
    rows.flatMap((row) => {
      const { vector } = reduceStored(row)
      return vector ? [[row.scanId, vector] as const] : []
    }),
  )
}
