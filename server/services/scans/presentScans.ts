import type { Scan as ScanReply } from '../../../shared/contract/scans.js'
import type { Scan } from '../../database/entities/Scan.js'
import { devicesById } from '../../database/repositories/devices.js'
import type { Work } from '../../database/transaction.js'
import { presentScan, type ScanStanding } from '../../presenters/scan.js'
import { findingsOfScan, worstOf } from '../matching/findings.js'
import type { MeasuredDevice } from '../matching/measuredDevice.js'
import { measureDevices, measuredScan } from '../matching/measureDevices.js'
import { standardSpectrum } from '../spectra/chooseSpectrum.js'

/** The scans with what their rows do not know: whether they are in use, and the worst finding, under AM1.5G. */
export async function presentScans(work: Work, scans: readonly Scan[]): Promise<ScanReply[]> {
  const devices = await devicesById(work, [...new Set(scans.map((scan) => scan.deviceId))])
  const measured = new Map(
    (await measureDevices(work, devices)).map(({ measured: device }) => [device.id, device] as const),
  )
  return scans.map((scan) => presentScan(scan, standingOf(scan, measured.get(scan.deviceId))))
}

export async function presentOneScan(work: Work, scan: Scan): Promise<ScanReply> {
  const [reply] = await presentScans(work, [scan])
  return reply!
}

function standingOf(scan: Scan, device: MeasuredDevice | undefined): ScanStanding {
  const junction = device?.junctions.find((one) => one.id === scan.junctionId)
  if (!device || !junction) return { inUse: device?.reflectance?.id === scan.id, worstFinding: null }
  return {
    inUse: junction.scan?.id === scan.id,
    worstFinding: worstOf(findingsOfScan(measuredScan(scan), junction.position, device, standardSpectrum())),
  }
}
