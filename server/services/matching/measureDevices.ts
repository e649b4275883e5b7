import { makeCurve } from '../../../shared/physics/curve.js'
import type { DeviceWithStack } from '../../database/repositories/devices.js'
import { scanHeadsOfDevices, scansWithCurves, type MeasuredScanRow } from '../../database/repositories/scans.js'
import type { Work } from '../../database/transaction.js'
import type { MeasuredDevice, MeasuredScan } from './measuredDevice.js'
import { scansInUse } from './scansInUse.js'

export interface DeviceWithScans {
  measured: MeasuredDevice
  scanCount: number
  lastScanAt: Date | null
}

/** The devices with the scans that stand for their junctions, in the order given: two queries for any number. */
export async function measureDevices(
  work: Work,
  devices: readonly Pick<DeviceWithStack, 'id' | 'terminals' | 'junctions'>[],
): Promise<DeviceWithScans[]> {
  const heads = await scanHeadsOfDevices(
    work,
    devices.map((device) => device.id),
  )
  const chosen = await scansWithCurves(
    work,
    scansInUse(heads).map((head) => head.id),
  )
  const eqeOfJunction = new Map<string, MeasuredScanRow>()
  const reflectanceOfDevice = new Map<string, MeasuredScanRow>()
  for (const scan of chosen)
    if (scan.quantity === 'eqe' && scan.junctionId) eqeOfJunction.set(scan.junctionId, scan)
    else reflectanceOfDevice.set(scan.deviceId, scan)
  const statistics = statisticsOf(heads)
  return devices.map((device) => ({
    measured: {
      id: device.id,
      terminals: device.terminals,
      junctions: device.junctions.map(({ id, position, label }) => ({
        id,
        position,
        label,
        scan: measuredScan(eqeOfJunction.get(id)),
      })),
      reflectance: measuredScan(reflectanceOfDevice.get(device.id)),
    },
    scanCount: statistics.get(device.id)?.count ?? 0,
    lastScanAt: statistics.get(device.id)?.last ?? null,
  }))
}

export function measuredScan(scan: MeasuredScanRow): MeasuredScan
export function measuredScan(scan: MeasuredScanRow | undefined): MeasuredScan | null
export function measuredScan(scan: MeasuredScanRow | undefined): MeasuredScan | null {
  if (!scan) return null
  const { id, version, state, conditions, wavelengthNm, values } = scan
  return { id, version, state, conditions, curve: makeCurve(wavelengthNm, values) }
}

function statisticsOf(heads: readonly { deviceId: string; uploadedAt: Date }[]) {
  const statistics = new Map<string, { count: number; last: Date }>()
  for (const { deviceId, uploadedAt } of heads) {
    const known = statistics.get(deviceId)
    if (!known) statistics.set(deviceId, { count: 1, last: uploadedAt })
    else statistics.set(deviceId, { count: known.count + 1, last: uploadedAt > known.last ? uploadedAt : known.last })
  }
  return statistics
}
