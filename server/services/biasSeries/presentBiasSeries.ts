import type { BiasSeries as BiasSeriesReply } from '../../../shared/contract/biasSeries.js'
import { makeCurve } from '../../../shared/physics/curve.js'
import { DomainError } from '../../../shared/physics/errors.js'
import { analyseBiasSeries } from '../../../shared/physics/measurement/biasSeries.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'
import { scansOfSeries, type BiasSeriesRow } from '../../database/repositories/biasSeries.js'
import { thresholdSettings } from '../../database/repositories/thresholds.js'
import type { Work } from '../../database/transaction.js'
import { CHECK_SPECTRUM, totalBiasIrradiance } from '../checks/checkedScan.js'

type SeriesScan = Awaited<ReturnType<typeof scansOfSeries>>[number]
type Analysis = Pick<BiasSeriesReply, 'steps' | 'plateau' | 'proposedScanId' | 'problem'>

/** The series with Jsc at every level, the plateau and the scan to use. */
export async function presentBiasSeries(
  work: Work,
  projectId: string,
  series: readonly BiasSeriesRow[],
): Promise<BiasSeriesReply[]> {
  const scans = await scansOfSeries(
    work,
    series.map((one) => one.id),
  )
  const largestChange = (await thresholdSettings(work, projectId))['not-on-plateau']?.largestChange
  return series.map(({ id, deviceId, junctionId, name, varied, version }) => {
    const own = scans.filter((scan) => scan.biasSeriesId === id)
    return {
      id,
      deviceId,
      junctionId,
      name,
      varied,
      version,
      scanIds: own.map((scan) => scan.id),
      ...analyse(own, varied, largestChange),
    }
  })
}

function analyse(scans: readonly SeriesScan[], varied: BiasSeriesRow['varied'], largestChange?: number): Analysis {
  const levels = scans.map(({ conditions }) =>
    varied === 'voltage' ? conditions.biasVoltageV : totalBiasIrradiance(conditions),
  )
  const without = scans.filter((_, i) => levels[i] === null)
  if (without.length > 0) {
    const what = varied === 'voltage' ? 'bias voltage' : 'irradiance of every bias source'
    return noAnalysis(`Write down the ${what} of ${without.map((scan) => scan.label).join(', ')}.`)
  }
  try {
    const { steps, plateau, proposedIndex } = analyseBiasSeries(
      scans.map((scan, i) => ({ scan: makeCurve(scan.wavelengthNm, scan.values), level: levels[i]! })),
      referenceSpectrum(CHECK_SPECTRUM),
      largestChange,
    )
    return {
      steps: steps.map(({ index, level, currentMaCm2, changeFromBelow, isOnPlateau }) => ({
        scanId: scans[index]!.id,
        label: scans[index]!.label,
        level,
        jscMaCm2: currentMaCm2,
        changeFromBelow,
        isOnPlateau,
      })),
      plateau: plateau && {
        fromLevel: plateau.fromLevel,
        toLevel: plateau.toLevel,
        jscMaCm2: plateau.currentMaCm2,
      },
      proposedScanId: proposedIndex === null ? null : scans[proposedIndex]!.id,
      problem: null,
    }
  } catch (error) {
    if (error instanceof DomainError) return noAnalysis(error.message)
    throw error
  }
}

const noAnalysis = (problem: string): Analysis => ({ steps: [], plateau: null, proposedScanId: null, problem })
