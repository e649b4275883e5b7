import type { Conditions, ScanState } from '../../../shared/contract/scans.js'
import type { Terminals } from '../../../shared/contract/devices.js'
import type { Curve } from '../../../shared/physics/curve.js'

/** A scan as the engine needs it. */
export interface MeasuredScan {
  id: string
  /** Counts every change of conditions, decision and, for a raw scan, factors. */
  version: number
  state: ScanState
  conditions: Conditions
  curve: Curve
}

export interface MeasuredJunction {
  id: string
  position: number
  label: string
  /** The scan that stands for the junction. */
  scan: MeasuredScan | null
}

/** A device with the scans that stand for it: all that a matching result rests on besides the spectrum. */
export interface MeasuredDevice {
  id: string
  terminals: Terminals
  junctions: MeasuredJunction[]
  reflectance: MeasuredScan | null
}

/** The EQE scans in use of these devices. */
export function scansMeasured(devices: readonly MeasuredDevice[]): string[] {
  return devices.flatMap((device) => device.junctions.flatMap(({ scan }) => (scan ? [scan.id] : [])))
}
