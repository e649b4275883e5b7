import { ApiError } from '../../../shared/contract/errors.js'
import type { ScenarioResult } from '../../../shared/contract/scenarios.js'
import { DomainError } from '../../../shared/physics/errors.js'
import {
  compileDevice,
  evaluate,
  seriesFigures,
  type Change,
  type OpticalModelName,
  type PowerEstimate,
} from '../../../shared/physics/whatIf/index.js'
import { whatIfInput } from '../../../shared/whatIf/whatIfInput.js'
import type { ChosenSpectrum } from '../matching/chosenSpectrum.js'
import type { ScenarioBasis } from './scenarioBasis.js'

/**
 * The measured and the changed device. Pure: the same inputs give the same bits, in the page and here.
 * @throws ApiError INPUT_INVALID with the engine's sentence; STATE_CONFLICT where a junction has no scan.
 */
export function computeScenario(
  { measured, optics }: ScenarioBasis,
  { spectrum }: ChosenSpectrum,
  model: OpticalModelName,
  change: Change,
): ScenarioResult {
  const eqe = measured.junctions.map(({ position, label, scan }) => {
    if (scan) return scan.curve
    throw new ApiError(
      'STATE_CONFLICT',
      { reason: 'scan-missing' },
      `Junction ${position} (${label}) has no scan yet; a what-if starts from the measured curve of every junction.`,
    )
  })
  const isSeries = measured.terminals !== '4-terminal'
  try {
    const compiled = compileDevice(whatIfInput(optics.description, eqe, spectrum.curve, model))
    const measuredPower = evaluate(compiled, {}).power
    const { junctions, currentsMaCm2, assumptions, power } = evaluate(compiled, change)
    return {
      measured: figures([...compiled.measuredCurrentsMaCm2], isSeries, measuredPower),
      changed: {
        ...figures([...currentsMaCm2], isSeries, power),
        continuedMaCm2: junctions.map((one) => one.continuedPartMaCm2),
        keptMeasuredNm: junctions.map((one) => one.keptMeasuredNm.map(([from, to]): [number, number] => [from, to])),
      },
      assumptions: [...optics.assumptions, ...assumptions],
    }
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    const { message } = error
    throw new ApiError('INPUT_INVALID', { errors: [{ path: ['change', error.argument], message }] }, message)
  }
}

function figures(currentsMaCm2: number[], isSeries: boolean, power: PowerEstimate | null): ScenarioResult['measured'] {
  if (!isSeries) return { currentsMaCm2, ...NOT_IN_SERIES }
  const { limitingJunctions, limitingCurrentMaCm2, mismatch, gainStillOpenMaCm2 } = seriesFigures(currentsMaCm2)
  return {
    currentsMaCm2,
    limitingJunctions: [...limitingJunctions],
    jLimMaCm2: limitingCurrentMaCm2,
    mismatchPercent: Number.isFinite(mismatch) ? 100 * mismatch : null,
    gainOpenMaCm2: gainStillOpenMaCm2,
    power,
  }
}

const NOT_IN_SERIES = {
  limitingJunctions: [],
  jLimMaCm2: null,
  mismatchPercent: null,
  gainOpenMaCm2: null,
  power: null,
}
