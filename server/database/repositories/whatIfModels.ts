import { WhatIfModel } from '../entities/WhatIfModel.js'
import type { Work } from '../transaction.js'

export type WhatIfModelRow = Omit<WhatIfModel, 'device'>

export async function whatIfModelOf(work: Work, deviceId: string): Promise<WhatIfModelRow | null> {
  return work.findOneBy(WhatIfModel, { deviceId })
}

export async function saveWhatIfModelRow(work: Work, row: WhatIfModelRow): Promise<void> {
  await work.upsert(WhatIfModel, row, ['deviceId'])
}
