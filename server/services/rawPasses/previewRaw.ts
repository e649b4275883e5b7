import type { RawReduction, ReducedRaw } from '../../../shared/contract/rawPasses.js'
import { devicesOfProjectById } from '../../database/repositories/devices.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { foundDevice } from '../devices/findDevice.js'
import { requireMember } from '../rights.js'
import { readRaw } from './readRawColumns.js'
import { presentReduced, reduceStored } from './reduce.js'
import { reflectanceOfDevice } from './reflectanceOfDevice.js'

/** EQE of raw passes with every factor, and IQE where a device with a reflectance scan is named; nothing is saved. */
export async function previewRaw(
  { work }: Database,
  actor: Actor,
  projectId: string,
  { reduction, deviceId }: { reduction: RawReduction; deviceId: string | null },
): Promise<ReducedRaw> {
  await requireMember(work, actor, projectId, 'read')
  if (deviceId !== null) foundDevice((await devicesOfProjectById(work, projectId, [deviceId]))[0] ?? null)
  const reduced = reduceStored(await readRaw(work, projectId, reduction))
  return presentReduced(reduced, deviceId === null ? null : await reflectanceOfDevice(work, deviceId))
}
