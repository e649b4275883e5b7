import type { Device as DeviceReply } from '../../../shared/contract/devices.js'
import type { Page, PageQuery } from '../../../shared/contract/primitives.js'
import { devicesDeletedSince } from '../../database/repositories/devices.js'
import type { Database } from '../../database/transaction.js'
import { presentDevice } from '../../presenters/device.js'
import type { Actor } from '../actor.js'
import { cursorAfter, timePosition } from '../cursor.js'
import { restorableSince } from '../deletion.js'
import { requireMember } from '../rights.js'

/** What can still be brought back, latest deletion first. */
export async function listDeletedDevices(
  { work }: Database,
  actor: Actor,
  projectId: string,
  query: PageQuery,
): Promise<Page<DeviceReply>> {
  await requireMember(work, actor, projectId, 'read')
  const after = timePosition(query.cursor)
  const { devices, total } = await devicesDeletedSince(work, projectId, restorableSince(), after, query.limit)
  const nextCursor = cursorAfter(devices, query.limit, ({ id, deletedAt }) => ({ at: deletedAt!, id }))
  return { items: devices.map(presentDevice), total, nextCursor }
}
