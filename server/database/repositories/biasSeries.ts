import { In, IsNull } from 'typeorm'
import { BiasSeries } from '../entities/BiasSeries.js'
import { Scan } from '../entities/Scan.js'
import type { Work } from '../transaction.js'

export type BiasSeriesRow = Omit<BiasSeries, 'project' | 'junction'>

export async function biasSeriesOfProject(
  work: Work,
  projectId: string,
  deviceId: string | undefined,
): Promise<BiasSeriesRow[]> {
  return work.find(BiasSeries, {
    where: { projectId, ...(deviceId && { deviceId }) },
    order: { name: 'ASC', id: 'ASC' },
  })
}

export async function biasSeriesById(work: Work, projectId: string, id: string): Promise<BiasSeriesRow | null> {
  return work.findOneBy(BiasSeries, { id, projectId })
}

export async function insertBiasSeries(work: Work, row: BiasSeriesRow): Promise<void> {
  await work.insert(BiasSeries, row)
}

export async function updateBiasSeriesRow(
  work: Work,
  { id, ...row }: Pick<BiasSeriesRow, 'id' | 'name' | 'varied' | 'version' | 'junctionId' | 'deviceId'>,
): Promise<void> {
  await work.update(BiasSeries, { id }, row)
}

export async function removeBiasSeries(work: Work, id: string): Promise<void> {
  await work.delete(BiasSeries, { id })
}

/** The scans of these series with their curves, oldest first. */
export async function scansOfSeries(
  work: Work,
  seriesIds: string[],
): Promise<Pick<Scan, 'id' | 'biasSeriesId' | 'label' | 'conditions' | 'wavelengthNm' | 'values'>[]> {
  if (seriesIds.length === 0) return []
  return work.find(Scan, {
    select: { id: true, biasSeriesId: true, label: true, conditions: true, wavelengthNm: true, values: true },
    where: { biasSeriesId: In(seriesIds), deletedAt: IsNull() },
    order: { id: 'ASC' },
  })
}

/** What a series may be made of. */
export async function seriesCandidates(
  work: Work,
  projectId: string,
  scanIds: string[],
): Promise<Pick<Scan, 'id' | 'deviceId' | 'junctionId' | 'quantity' | 'biasSeriesId' | 'label'>[]> {
  return work.find(Scan, {
    select: { id: true, deviceId: true, junctionId: true, quantity: true, biasSeriesId: true, label: true },
    where: { id: In(scanIds), projectId, deletedAt: IsNull(), device: { deletedAt: IsNull() } },
  })
}

/** These scans, and no others, belong to the series from now on. */
export async function setScansOfSeries(work: Work, seriesId: string, scanIds: string[]): Promise<void> {
  await work.update(Scan, { biasSeriesId: seriesId }, { biasSeriesId: null })
  await work.update(Scan, { id: In(scanIds) }, { biasSeriesId: seriesId })
}
