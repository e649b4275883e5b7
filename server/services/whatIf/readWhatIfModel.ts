import type { WhatIfModel } from '../../../shared/contract/whatIf.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { findDevice } from '../devices/findDevice.js'
import { requireMember } from '../rights.js'
import { describedOptics } from './describedOptics.js'

export async function readWhatIfModel(
  { work }: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
): Promise<WhatIfModel> {
  await requireMember(work, actor, projectId, 'read')
  return describedOptics(work, await findDevice(work, projectId, deviceId))
}
