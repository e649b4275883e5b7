import type { JunctionCurrent } from '../../../shared/contract/matching.js'
import { photovoltaicGap } from '../../../shared/physics/bandGap.js'
import { coverage, edgeResponse, shortCircuitCurrentDensity } from '../../../shared/physics/currents.js'
import { rangeNm } from '../../../shared/physics/curve.js'
import { BoundedMemory } from '../boundedMemory.js'
import { spectrumKey, type ChosenSpectrum } from './chosenSpectrum.js'
import type { MeasuredScan } from './measuredDevice.js'

type ScanCurrent = Pick<JunctionCurrent, 'jscMaCm2' | 'rangeNm' | 'points' | 'coverage' | 'edgeResponse' | 'gap'>

export const NOTHING_MEASURED: ScanCurrent = {
  jscMaCm2: null,
  rangeNm: null,
  points: null,
  coverage: null,
  edgeResponse: null,
  gap: null,
}

/** A version of a scan has one curve, and so has a spectrum's id: what this process integrated stays right. */
const integrated = new BoundedMemory<ScanCurrent>(5000)

/** What one scan alone says under a spectrum. */
export function currentOfScan(scan: MeasuredScan, chosen: ChosenSpectrum): ScanCurrent {
  const key = `${scan.id} ${scan.version} ${spectrumKey(chosen)}`
  return integrated.get(key) ?? integrated.keep(key, integrate(scan, chosen))
}

function integrate({ curve }: MeasuredScan, { spectrum }: ChosenSpectrum): ScanCurrent {
  const { gap } = photovoltaicGap(curve)
  const { shortEqe, longEqe } = edgeResponse(curve)
  return {
    jscMaCm2: shortCircuitCurrentDensity(curve, spectrum),
    rangeNm: rangeNm(curve),
    points: curve.values.length,
    coverage: coverage(curve, spectrum),
    edgeResponse: { shortEqe, longEqe },
    gap: gap && { inflectionEv: gap.inflectionEv, meanEv: gap.meanEv },
  }
}
