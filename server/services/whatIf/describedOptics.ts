import type { WhatIfModel } from '../../../shared/contract/whatIf.js'
import type { DeviceWithStack } from '../../database/repositories/devices.js'
import { whatIfModelOf } from '../../database/repositories/whatIfModels.js'
import type { Work } from '../../database/transaction.js'
import { derivedDescription } from './derivedDescription.js'

/** The description that was saved; the one that follows from the stack where none was, or where its junctions went. */
export async function describedOptics(work: Work, device: DeviceWithStack): Promise<WhatIfModel> {
  const saved = await whatIfModelOf(work, device.id)
  const version = saved?.version ?? 0
  if (saved && saved.description.junctions.length === device.junctions.length)
    return { deviceId: device.id, description: saved.description, assumptions: [], version }
  return { deviceId: device.id, ...derivedDescription(device), version }
}
