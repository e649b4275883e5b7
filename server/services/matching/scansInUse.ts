import type { ScanQuantity, ScanState } from '../../../shared/contract/scans.js'

/** What decides whether a scan stands for its junction; no curve. Deleted scans are never among them. */
export interface ScanHead {
  id: string
  deviceId: string
  junctionId: string | null
  quantity: ScanQuantity
  state: ScanState
  uploadedAt: Date
}

/**
 * The scans that stand for their junctions: of each junction's EQE scans that are not excluded the latest accepted one,
 * or the latest checked one where none is accepted; of each device's reflectance scans likewise.
 */
export function scansInUse<Head extends ScanHead>(heads: readonly Head[]): Head[] {
  const chosen = new Map<string, Head>()
  for (const head of heads) {
    if (head.state === 'excluded' || (head.quantity === 'eqe' && head.junctionId === null)) continue
    const place = head.quantity === 'eqe' ? `${head.deviceId} ${head.junctionId}` : `${head.deviceId} reflectance`
    const rival = chosen.get(place)
    if (!rival || outranks(head, rival)) chosen.set(place, head)
  }
  return [...chosen.values()]
}

/** Ids are UUIDs of version 7, so they order scans that were saved in the same millisecond. */
function outranks(head: ScanHead, rival: ScanHead): boolean {
  if (head.state !== rival.state) return head.state === 'accepted'
  const later = head.uploadedAt.getTime() - rival.uploadedAt.getTime()
  return later !== 0 ? later > 0 : head.id > rival.id
}
