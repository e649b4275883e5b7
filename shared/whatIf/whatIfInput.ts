import type { OpticalDescription } from '../contract/whatIf.js'
import { OPTICAL_CONSTANTS } from '../data/optical-constants/index.js'
import type { Curve } from '../physics/curve.js'
import type { DeviceModel, OpticalModelName, WhatIfInput } from '../physics/whatIf/index.js'

/**
 * What the engine is asked, for a described device and its measured curves: the one place where page and server build it,
 * so that both compute the same bits.
 */
export function whatIfInput(
  { junctions, layers }: OpticalDescription,
  eqe: readonly Curve[],
  spectrum: Curve,
  model: OpticalModelName,
): WhatIfInput {
  const device: DeviceModel = {
    junctions: junctions.map(({ thicknessNm, pathFactor, absorber, externalRadiativeEfficiency }) => ({
      thicknessNm,
      pathFactor,
      absorber,
      diode: { externalRadiativeEfficiency },
    })),
    ...(layers.length > 0 && { layers }),
  }
  return { device, eqe, spectrum, materials: OPTICAL_CONSTANTS, model, outsideMaterials: 'keep-measured' }
}
