import { v7 as uuid } from 'uuid'
import type { BiasSeries as BiasSeriesReply, createBiasSeries as route } from '../../../shared/contract/biasSeries.js'
import { ApiError } from '../../../shared/contract/errors.js'
import type { BodyOf } from '../../../shared/contract/route.js'
import {
  biasSeriesById,
  biasSeriesOfProject,
  insertBiasSeries,
  removeBiasSeries,
  seriesCandidates,
  setScansOfSeries,
  updateBiasSeriesRow,
  type BiasSeriesRow,
} from '../../database/repositories/biasSeries.js'
import { lockedDevice } from '../../database/repositories/devices.js'
import type { Database, Work } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { recheckDevice } from '../checks/recheckDevice.js'
import { foundDevice } from '../devices/findDevice.js'
import { requireMember } from '../rights.js'
import { requireCurrentVersion } from '../staleVersion.js'
import { presentBiasSeries } from './presentBiasSeries.js'

type Input = BodyOf<typeof route>

export async function listBiasSeries(
  { work }: Database,
  actor: Actor,
  projectId: string,
  deviceId: string | undefined,
): Promise<{ items: BiasSeriesReply[] }> {
  await requireMember(work, actor, projectId, 'read')
  return { items: await presentBiasSeries(work, projectId, await biasSeriesOfProject(work, projectId, deviceId)) }
}

export async function createBiasSeries(
  database: Database,
  actor: Actor,
  projectId: string,
  input: Input,
): Promise<BiasSeriesReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const id = uuid()
    const { deviceId, junctionId } = await requireOneJunction(work, projectId, input.scanIds, null)
    const device = foundDevice(await lockedDevice(work, projectId, deviceId))
    const row = { id, projectId, deviceId, junctionId, name: input.name, varied: input.varied, version: 1 }
    await insertBiasSeries(work, row)
    await setScansOfSeries(work, id, input.scanIds)
    await recheckDevice(work, projectId, deviceId)
    await record(work, actor, row, `grouped ${input.scanIds.length} scans of ${device.name} into`, 'created')
    return present(work, projectId, id)
  })
}

export async function updateBiasSeries(
  database: Database,
  actor: Actor,
  projectId: string,
  seriesId: string,
  { version, ...input }: Input & { version: number },
): Promise<BiasSeriesReply> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const before = await findSeries(work, projectId, seriesId)
    foundDevice(await lockedDevice(work, projectId, before.deviceId))
    requireCurrentVersion(version, await present(work, projectId, seriesId), `the bias series ${before.name}`)
    const { deviceId, junctionId } = await requireOneJunction(work, projectId, input.scanIds, seriesId)
    const row = { ...before, deviceId, junctionId, name: input.name, varied: input.varied, version: version + 1 }
    await updateBiasSeriesRow(work, row)
    await setScansOfSeries(work, seriesId, input.scanIds)
    await recheckDevice(work, projectId, before.deviceId)
    if (deviceId !== before.deviceId) await recheckDevice(work, projectId, deviceId)
    await record(work, actor, row, 'changed', 'updated')
    return present(work, projectId, seriesId)
  })
}

export async function deleteBiasSeries(
  database: Database,
  actor: Actor,
  projectId: string,
  seriesId: string,
): Promise<null> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    const series = await findSeries(work, projectId, seriesId)
    await lockedDevice(work, projectId, series.deviceId)
    await removeBiasSeries(work, seriesId)
    await recheckDevice(work, projectId, series.deviceId)
    await record(work, actor, series, 'dissolved', 'deleted')
    return null
  })
}

async function findSeries(work: Work, projectId: string, seriesId: string): Promise<BiasSeriesRow> {
  const series = await biasSeriesById(work, projectId, seriesId)
  if (!series) throw new ApiError('NOT_FOUND', { what: 'bias series' }, 'There is no such bias series in this project.')
  return series
}

async function present(work: Work, projectId: string, seriesId: string): Promise<BiasSeriesReply> {
  const [reply] = await presentBiasSeries(work, projectId, [await findSeries(work, projectId, seriesId)])
  return reply!
}

/** A series is of one junction, and a scan belongs to one series. */
async function requireOneJunction(
  work: Work,
  projectId: string,
  scanIds: string[],
  seriesId: string | null,
): Promise<{ deviceId: string; junctionId: string }> {
  const scans = await seriesCandidates(work, projectId, scanIds)
  const [first] = scans
  const missing = scanIds.filter((id) => !scans.some((scan) => scan.id === id))
  const elsewhere = scans.find((scan) => scan.biasSeriesId !== null && scan.biasSeriesId !== seriesId)
  if (missing.length > 0)
    throw new ApiError(
      'NOT_FOUND',
      { what: 'scan' },
      `${missing.length} of the ${scanIds.length} scans are not scans of this project.`,
    )
  const message =
    new Set(scanIds).size < scanIds.length
      ? 'A scan is named twice.'
      : !first?.junctionId || scans.some((scan) => scan.quantity !== 'eqe' || scan.junctionId !== first.junctionId)
        ? 'A bias series holds EQE scans of one junction; some of these are of another.'
        : elsewhere
          ? `The scan ${elsewhere.label} belongs to another bias series.`
          : null
  if (message !== null) throw new ApiError('INPUT_INVALID', { errors: [{ path: ['scanIds'], message }] }, message)
  return { deviceId: first!.deviceId, junctionId: first!.junctionId! }
}

async function record(
  work: Work,
  actor: Actor,
  { id, projectId, name }: BiasSeriesRow,
  deed: string,
  action: string,
): Promise<void> {
  await recordAudit(work, {
    actor,
    projectId,
    action: `bias-series.${action}`,
    sentence: `${actor.name} ${deed} the bias series ${name}.`,
    subject: { kind: 'bias-series', id, name },
  })
}
