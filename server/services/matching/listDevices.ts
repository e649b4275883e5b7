import type { DeviceSummary, listDevices as route } from '../../../shared/contract/matching.js'
import type { Page } from '../../../shared/contract/primitives.js'
import type { QueryOf } from '../../../shared/contract/route.js'
import { devicesOfProject } from '../../database/repositories/devices.js'
import type { Database } from '../../database/transaction.js'
import { presentDevice } from '../../presenters/device.js'
import type { Actor } from '../actor.js'
import { findingsOfScans } from '../checks/findingsOfScans.js'
import { cursorAfter, namePosition } from '../cursor.js'
import { requireMember } from '../rights.js'
import { chooseSpectrum } from '../spectra/chooseSpectrum.js'
import { computeMatching } from './computeMatching.js'
import { scansMeasured } from './measuredDevice.js'
import { measureDevices } from './measureDevices.js'

/** The devices by name, each with its currents; the number of queries does not grow with the number of devices. */
export async function listDevices(
  { work }: Database,
  actor: Actor,
  projectId: string,
  query: QueryOf<typeof route>,
): Promise<Page<DeviceSummary>> {
  await requireMember(work, actor, projectId, 'read')
  const spectrum = await chooseSpectrum(work, projectId, query)
  const { devices, total } = await devicesOfProject(work, projectId, namePosition(query.cursor), query.limit)
  const withScans = await measureDevices(work, devices)
  const found = await findingsOfScans(work, scansMeasured(withScans.map(({ measured }) => measured)))
  return {
    items: withScans.map(({ measured, scanCount, lastScanAt }, i) => ({
      device: presentDevice(devices[i]!),
      matching: computeMatching(measured, spectrum, found),
      scanCount,
      lastScanAt: lastScanAt?.toISOString() ?? null,
    })),
    total,
    nextCursor: cursorAfter(devices, query.limit, ({ name, id }) => ({ name, id })),
  }
}
