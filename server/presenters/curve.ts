import type { CurveData } from '../../shared/contract/primitives.js'
import type { Curve } from '../../shared/physics/curve.js'

export function presentCurve({ wavelengthNm, values }: Curve): CurveData {
  return { wavelengthNm: Array.from(wavelengthNm), values: Array.from(values) }
}
