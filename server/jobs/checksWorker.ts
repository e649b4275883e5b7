import type { CheckReport, ThresholdSettings } from '../../shared/physics/checks/index.js'
import { checkScan, type ScanToCheck } from '../services/checks/checkedScan.js'

export interface ChecksTask {
  scans: readonly ScanToCheck[]
  thresholds: ThresholdSettings
}

/** Runs in a worker thread. */
export default function check({ scans, thresholds }: ChecksTask): CheckReport[] {
  return scans.map((scan) => checkScan(scan, thresholds))
}
