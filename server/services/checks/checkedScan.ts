import type { Conditions } from '../../../shared/contract/scans.js'
import {
  runChecks,
  type CheckReport,
  type ScanConditions,
  type ScanInContext,
  type ThresholdSettings,
} from '../../../shared/physics/checks/index.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'

/** The spectrum that every check counts currents under, whatever spectrum a page shows. */
export const CHECK_SPECTRUM = 'AM1.5G'

/** A scan with all that its checks look at, but the spectrum: plain data, so that it can go to a worker. */
export type ScanToCheck = Omit<ScanInContext, 'spectrum'>

export function checkScan(scan: ScanToCheck, thresholds: ThresholdSettings): CheckReport {
  return runChecks({ ...scan, spectrum: referenceSpectrum(CHECK_SPECTRUM) }, thresholds)
}

/**
 * Conditions as the checks take them. A bias source without centre, width and irradiance cannot be counted with, so a
 * list that holds one says nothing of the total; an empty list may as well mean that nobody wrote it down.
 */
export function recordedConditions(conditions: Conditions): ScanConditions {
  const sources = conditions.biasLight.flatMap(({ name, centreNm, fwhmNm, irradianceWM2 }) =>
    centreNm !== null && fwhmNm !== null && irradianceWM2 !== null ? [{ name, centreNm, fwhmNm, irradianceWM2 }] : [],
  )
  const isComplete = sources.length > 0 && sources.length === conditions.biasLight.length
  return {
    biasLight: isComplete ? sources : null,
    biasVoltageV: conditions.biasVoltageV,
    temperatureC: conditions.temperatureC,
    chopperHz: conditions.chopperHz,
    filterChangesNm: conditions.filterChangesNm.length > 0 ? conditions.filterChangesNm : null,
    referenceCalibrationDate: conditions.referenceCalibrationDate,
    measuredOn: conditions.measuredOn,
  }
}

/** Total bias irradiance, W/m²; null unless every source says its own. */
export function totalBiasIrradiance({ biasLight }: Conditions): number | null {
  if (biasLight.length === 0) return null
  return biasLight.reduce<number | null>(
    (sum, { irradianceWM2 }) => (sum === null || irradianceWM2 === null ? null : sum + irradianceWM2),
    0,
  )
}
