import type { BiasPlan, BiasPlanRequest } from '../../../shared/contract/biasPlan.js'
import { ApiError } from '../../../shared/contract/errors.js'
import { photovoltaicGap } from '../../../shared/physics/bandGap.js'
import { ZERO_CELSIUS_K } from '../../../shared/physics/constants.js'
import type { Curve } from '../../../shared/physics/curve.js'
import type { BiasPlanDevice } from '../../../shared/physics/measurement/biasPlan.js'
import {
  ASSUMED_RADIATIVE_EFFICIENCY,
  diodeByReciprocity,
  estimatedEqes,
} from '../../../shared/physics/measurement/planInputs.js'
import type { JunctionRow } from '../../database/repositories/devices.js'
import { presentCurve } from '../../presenters/curve.js'
import type { MeasuredDevice } from '../matching/measuredDevice.js'

export interface PlanInputs {
  device: BiasPlanDevice
  junctions: BiasPlan['junctions']
}

type Described = Pick<JunctionRow, 'id' | 'nominalGapEv'>

/** Curves and diodes of a plan: measured where there is a scan, else from the nominal gaps; reciprocity, else given. */
export function planInputs(
  measured: MeasuredDevice,
  described: readonly Described[],
  request: BiasPlanRequest,
): PlanInputs {
  const temperatureK = request.temperatureC + ZERO_CELSIUS_K
  const curves = curvesOf(measured, described)
  const junctions = measured.junctions.map(({ id, position, label, scan }, i): BiasPlan['junctions'][number] => ({
    junctionId: id,
    position,
    label,
    curveFrom: scan ? 'measured' : 'estimated',
    curve: presentCurve(curves[i]!),
    diode: diodeOf(curves[i]!, temperatureK, request.diodes[i]),
  }))
  return {
    junctions,
    device: {
      eqes: curves,
      diodes: junctions.map(({ diode }) => ({
        saturationCurrentMaCm2: diode.saturationCurrentMaCm2,
        ideality: diode.ideality,
        ...(diode.shuntResistanceKohmCm2 !== null && { shuntResistanceKohmCm2: diode.shuntResistanceKohmCm2 }),
      })),
      seriesResistanceKohmCm2: request.seriesResistanceKohmCm2,
      temperatureK,
      ...(request.couplingToNext.some((share) => share > 0) && {
        couplingToNext: junctions.slice(1).map((_, i) => request.couplingToNext[i] ?? 0),
      }),
    },
  }
}

function curvesOf(measured: MeasuredDevice, described: readonly Described[]): Curve[] {
  const scans = measured.junctions.map(({ scan }) => scan?.curve ?? null)
  if (scans.every((scan) => scan !== null)) return scans
  const gaps = measured.junctions.map(({ id, position, label }, i) => {
    const gap =
      described.find((one) => one.id === id)?.nominalGapEv ??
      (scans[i] ? (photovoltaicGap(scans[i]).gap?.inflectionEv ?? null) : null)
    if (gap === null)
      throw new ApiError(
        'STATE_CONFLICT',
        { reason: 'no-gap' },
        `Nothing is measured yet, so the plan needs a nominal gap of junction ${position} (${label}); give it in the device’s stack, or upload its scan.`,
      )
    return gap
  })
  const estimated = estimatedEqes(gaps)
  return scans.map((scan, i) => scan ?? estimated[i]!)
}

function diodeOf(
  curve: Curve,
  temperatureK: number,
  choice: BiasPlanRequest['diodes'][number] | undefined,
): BiasPlan['junctions'][number]['diode'] {
  const efficiency = choice?.externalRadiativeEfficiency ?? ASSUMED_RADIATIVE_EFFICIENCY
  const { radiativeCurrentMaCm2, saturationCurrentMaCm2 } = diodeByReciprocity(curve, temperatureK, efficiency)
  const given = choice?.saturationCurrentMaCm2 ?? null
  return {
    saturationCurrentMaCm2: given ?? saturationCurrentMaCm2,
    ideality: choice?.ideality ?? 1,
    shuntResistanceKohmCm2: choice?.shuntResistanceKohmCm2 ?? null,
    from: given === null ? 'reciprocity' : 'given',
    radiativeCurrentMaCm2,
    externalRadiativeEfficiency: given === null ? efficiency : null,
  }
}
