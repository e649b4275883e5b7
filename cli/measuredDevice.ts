import type { Curve } from '../shared/physics/curve.js'
import type { DescribedDevice, ScanConditions } from './deviceFile.js'
import { readScan } from './readScan.js'

/** A device with its curves. */
export interface MeasuredDevice {
  name: string
  wiring: 'series' | 'independent'
  junctions: { name: string; curve: Curve; conditions: ScanConditions }[]
  reflectance: Curve | null
}

/** Reads every scan that a device file names. */
export async function measuredDevice(device: DescribedDevice): Promise<MeasuredDevice> {
  const junctions = []
  for (const { name, scan, conditions } of device.junctions)
    junctions.push({ name, curve: await readScan(device.folder, scan, 'eqe', name), conditions })
  return {
    name: device.name,
    wiring: device.wiring,
    junctions,
    reflectance: device.reflectance && (await readScan(device.folder, device.reflectance, 'reflectance', '')),
  }
}
