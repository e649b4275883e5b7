import { In } from 'typeorm'
import { RawMeasurement } from '../entities/RawMeasurement.js'
import type { Work } from '../transaction.js'

export type RawMeasurementRow = Omit<RawMeasurement, 'scan'>

export async function rawMeasurementsOfScans(work: Work, scanIds: string[]): Promise<RawMeasurementRow[]> {
  if (scanIds.length === 0) return []
  return work.findBy(RawMeasurement, { scanId: In(scanIds) })
}

export async function rawMeasurementOf(work: Work, scanId: string): Promise<RawMeasurementRow | null> {
  return work.findOneBy(RawMeasurement, { scanId })
}

export async function saveRawMeasurement(work: Work, row: RawMeasurementRow): Promise<void> {
  await work.upsert(RawMeasurement, row, ['scanId'])
}
