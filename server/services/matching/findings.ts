import { SEVERITIES, type Finding, type Severity } from '../../../shared/contract/findings.js'
import { runChecks, type ScanConditions, type ScanInContext } from '../../../shared/physics/checks/index.js'
import type { Conditions } from '../../../shared/contract/scans.js'
import type { Spectrum } from '../../../shared/physics/spectrum.js'
import { BoundedMemory } from '../boundedMemory.js'
import { spectrumKey, type ChosenSpectrum } from './chosenSpectrum.js'
import type { MeasuredDevice, MeasuredScan } from './measuredDevice.js'

/** What the checks find on the scans that stand for a device's junctions, in the order of the junctions. */
export function findingsOf(device: MeasuredDevice, chosen: ChosenSpectrum): Finding[] {
  return device.junctions.flatMap(({ scan, position }) => (scan ? findingsOfScan(scan, position, device, chosen) : []))
}

/**
 * The checks cost milliseconds a scan, and a table of devices asks for hundreds. What they look at is told apart by ids
 * and versions: a scan's curve never changes, its conditions carry a version. So what this process found stays right.
 */
const found = new BoundedMemory<Finding[]>(5000)

/** What the checks find on one scan of the junction at `position`, beside the scans that stand for the others. */
export function findingsOfScan(
  scan: MeasuredScan,
  position: number,
  device: MeasuredDevice,
  chosen: ChosenSpectrum,
): Finding[] {
  const others = device.junctions.map((junction) => junction.scan?.id ?? '')
  const key = [
    scan.id,
    scan.version,
    position,
    device.terminals,
    ...others,
    device.reflectance?.id ?? '',
    spectrumKey(chosen),
  ].join(' ')
  const known = found.get(key)
  if (known) return known
  const { findings } = runChecks(contextOf(scan, position, device, chosen.spectrum))
  return found.keep(
    key,
    findings.map((finding) => ({
      ...finding,
      bandsNm: finding.bandsNm.map(([from, to]): [number, number] => [from, to]),
      numbers: { ...finding.numbers },
      scanId: scan.id,
      junctionPosition: position,
    })),
  )
}

export function worstOf(findings: readonly { severity: Severity }[]): Severity | null {
  const worst = Math.max(...findings.map((finding) => SEVERITIES.indexOf(finding.severity)))
  return SEVERITIES[worst] ?? null
}

function contextOf(scan: MeasuredScan, position: number, device: MeasuredDevice, spectrum: Spectrum): ScanInContext {
  return {
    scan: scan.curve,
    junctionIndex: position - 1,
    junctions: device.junctions.map((junction) => ({ scan: junction.scan?.curve ?? null })),
    connection: device.terminals === '4-terminal' ? 'independent' : 'series',
    conditions: recordedConditions(scan.conditions),
    reflectance: device.reflectance?.curve ?? null,
    spectrum,
  }
}

/**
 * A bias source without centre, width and irradiance cannot be counted with, so a list that holds one says nothing of
 * the total; an empty list may as well mean that nobody wrote it down.
 */
function recordedConditions(conditions: Conditions): ScanConditions {
  const sources = conditions.biasLight.flatMap(({ name, centreNm, fwhmNm, irradianceWM2 }) =>
    centreNm !== null && fwhmNm !== null && irradianceWM2 !== null ? [{ name, centreNm, fwhmNm, irradianceWM2 }] : [],
  )
  const isComplete = sources.length > 0 && sources.length === conditions.biasLight.length
  return {
    biasLight: isComplete ? sources : null,
    biasVoltageV: conditions.biasVoltageV,
    temperatureC: conditions.temperatureC,
    chopperHz: conditions.chopperHz,
    referenceCalibrationDate: conditions.referenceCalibrationDate,
    measuredOn: conditions.measuredOn,
  }
}
