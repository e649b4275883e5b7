import type { JunctionCurrent, Matching } from '../../../shared/contract/matching.js'
import type { SpectrumUsed } from '../../../shared/contract/spectra.js'
import { photovoltaicGap } from '../../../shared/physics/bandGap.js'
import { coverage, edgeResponse, shortCircuitCurrentDensity } from '../../../shared/physics/currents.js'
import { rangeNm } from '../../../shared/physics/curve.js'
import { matching, type SeriesMatching } from '../../../shared/physics/matching.js'
import type { Spectrum } from '../../../shared/physics/spectrum.js'
import { findingsOf, worstOf } from './findings.js'
import type { MeasuredDevice, MeasuredJunction } from './measuredDevice.js'

/** A spectrum ready for integrals, scaled if that was asked for, and what has to be said about it. */
export interface ChosenSpectrum {
  used: SpectrumUsed
  spectrum: Spectrum
}

/** What a device's currents say under a spectrum. Pure: the same inputs give the same result, here and in a report. */
export function computeMatching(device: MeasuredDevice, { used, spectrum }: ChosenSpectrum): Matching {
  const currents = device.junctions.map((junction) => currentOf(junction, spectrum))
  const wiring = device.terminals === '4-terminal' ? 'independent' : 'series'
  const missing = device.junctions.flatMap((junction, i) => missingSentence(junction, currents[i]!.jscMaCm2))
  const series = wiring === 'series' && missing.length === 0 ? seriesMatching(currents) : null
  const findings = findingsOf(device, spectrum)
  return {
    deviceId: device.id,
    spectrum: used,
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

function currentOf(junction: MeasuredJunction, spectrum: Spectrum): JunctionCurrent {
  const { id, position, label, scan } = junction
  const nothing = { excessMaCm2: null, excessPercent: null }
  if (!scan)
    return {
      junctionId: id,
      position,
      label,
      scanId: null,
      scanState: null,
      jscMaCm2: null,
      ...nothing,
      rangeNm: null,
      points: null,
      coverage: null,
      edgeResponse: null,
      gap: null,
    }
  const { gap } = photovoltaicGap(scan.curve)
  const { shortEqe, longEqe } = edgeResponse(scan.curve)
  return {
    junctionId: id,
    position,
    label,
    scanId: scan.id,
    scanState: scan.state,
    jscMaCm2: shortCircuitCurrentDensity(scan.curve, spectrum),
    ...nothing,
    rangeNm: rangeNm(scan.curve),
    points: scan.curve.values.length,
    coverage: coverage(scan.curve, spectrum),
    edgeResponse: { shortEqe, longEqe },
    gap: gap && { inflectionEv: gap.inflectionEv, meanEv: gap.meanEv },
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
