import type { Finding } from '../../../shared/contract/findings.js'
import type { JunctionCurrent, Matching } from '../../../shared/contract/matching.js'
import { matching, type SeriesMatching } from '../../../shared/physics/matching.js'
import { worstOf } from '../checks/findingsOfScans.js'
import type { ChosenSpectrum } from './chosenSpectrum.js'
import { currentOfScan, NOTHING_MEASURED } from './currentOfScan.js'
import type { MeasuredDevice, MeasuredJunction } from './measuredDevice.js'

/**
 * What a device's currents say under a spectrum. Pure: the same inputs give the same result, here and in a report.
 * @param found what the checks found, by scan; only that on the scans in use is shown.
 */
export function computeMatching(
  device: MeasuredDevice,
  chosen: ChosenSpectrum,
  found: ReadonlyMap<string, readonly Finding[]>,
): Matching {
  const currents = device.junctions.map((junction) => currentOf(junction, chosen))
  const wiring = device.terminals === '4-terminal' ? 'independent' : 'series'
  const missing = device.junctions.flatMap((junction, i) => missingSentence(junction, currents[i]!.jscMaCm2))
  const series = wiring === 'series' && missing.length === 0 ? seriesMatching(currents) : null
  const findings = device.junctions.flatMap(({ scan }) => (scan ? (found.get(scan.id) ?? []) : []))
  return {
    deviceId: device.id,
    spectrum: chosen.used,
    wiring,
    complete: device.junctions.every((junction) => junction.scan !== null),
    missing,
    junctions: currents.map((current, i) => ({
      ...current,
      excessMaCm2: series?.junctions[i]!.excessMaCm2 ?? null,
      excessPercent: series?.junctions[i]!.excessPercent ?? null,
    })),
    limitingJunction: series?.limitingJunction ?? null,
    limitingJunctions: series?.limitingJunctions ?? [],
    jLimMaCm2: series?.jLimMaCm2 ?? null,
    jMatchedMaCm2: series?.jMatchedMaCm2 ?? null,
    gainOpenMaCm2: series?.gainOpenMaCm2 ?? null,
    mismatchPercent: series?.mismatchPercent ?? null,
    pairs: series?.pairs ?? [],
    findings,
    worstFinding: worstOf(findings),
  }
}

function currentOf({ id, position, label, scan }: MeasuredJunction, chosen: ChosenSpectrum): JunctionCurrent {
  return {
    junctionId: id,
    position,
    label,
    scanId: scan?.id ?? null,
    scanState: scan?.state ?? null,
    ...(scan ? currentOfScan(scan, chosen) : NOTHING_MEASURED),
    excessMaCm2: null,
    excessPercent: null,
  }
}

function missingSentence({ position, label, scan }: MeasuredJunction, jscMaCm2: number | null): string[] {
  if (!scan) return [`Junction ${position} (${label}) has no scan yet: upload its EQE under bias light.`]
  if (jscMaCm2 !== null && jscMaCm2 > 0) return []
  return [
    `The scan of junction ${position} (${label}) gives no current under this spectrum: exclude it, or choose another.`,
  ]
}

function seriesMatching(currents: readonly JunctionCurrent[]): SeriesMatching {
  return matching(
    currents.map((current) => current.jscMaCm2!),
    'series',
  )
}
