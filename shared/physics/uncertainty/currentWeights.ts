import { PHOTON_ENERGY_NM_EV } from '../constants.js'
import { assertCurve } from '../curve.js'
import type { Curve } from '../curve.js'
import { DomainError } from '../errors.js'

/** mA cm⁻² per (W m⁻² nm⁻¹ · nm · nm) of EQE × irradiance × wavelength: q/(h c), and 10 A m⁻² = 1 mA cm⁻². */
const MA_CM2_PER_PRODUCT = 1 / (10 * PHOTON_ENERGY_NM_EV)

/**
 * Weights w_k such that `J = Σ w_k EQE_k` is exactly `q ∫ EQE φ dλ` for an EQE that is linear between its points and
 * zero outside them, and E·λ linear between the points of the spectrum. The current is linear in the EQE, so the
 * weights are also its sensitivities `∂J/∂EQE_k`.
 *
 * On each interval of the union of the two grids the hat functions of the two neighbouring EQE points are integrated
 * against E·λ with `h/6 · (2 f0 g0 + f0 g1 + f1 g0 + 2 f1 g1)`, exact for a product of two linear pieces.
 *
 * @param wavelengthNm nm, strictly increasing, n ≥ 2 points of the EQE.
 * @param irradiance W m⁻² nm⁻¹; taken as zero outside its own range.
 * @param shiftNm moves the EQE grid towards longer wavelengths (default 0): the weights of the curve EQE(λ − shift).
 * @returns n weights, mA cm⁻² per unit of EQE.
 * @throws DomainError when the grid or the spectrum is not a curve. Cost O(n + m).
 */
export function currentWeights(wavelengthNm: Float64Array, irradiance: Curve, shiftNm = 0): Float64Array {
  assertCurve(irradiance, 'irradiance')
  assertGrid(wavelengthNm)
  return uncheckedCurrentWeights(wavelengthNm, irradiance, shiftNm)
}

function assertGrid(wavelengthNm: Float64Array): void {
  if (wavelengthNm.length < 2)
    throw new DomainError('wavelengthNm', `wavelengthNm has ${wavelengthNm.length} points; it needs at least two.`)
  for (let i = 0; i < wavelengthNm.length; i++)
    if (!Number.isFinite(wavelengthNm[i]!) || (i > 0 && !(wavelengthNm[i]! > wavelengthNm[i - 1]!)))
      throw new DomainError('wavelengthNm', `wavelengthNm[${i}] = ${wavelengthNm[i]} is not above the point before it.`)
}

/** `currentWeights` for a grid and a spectrum that were checked before: many offsets of one curve. */
export function uncheckedCurrentWeights(eqeNm: Float64Array, irradiance: Curve, shiftNm: number): Float64Array {
  const { wavelengthNm: sunNm, values: sun } = irradiance
  const weights = new Float64Array(eqeNm.length)
  const lastSun = sunNm.length - 1
  let j = 0
  for (let k = 0; k + 1 < eqeNm.length; k++) {
    const left = eqeNm[k]! + shiftNm
    const right = eqeNm[k + 1]! + shiftNm
    const width = right - left
    while (j < lastSun && sunNm[j + 1]! <= left) j++
    let low = 0
    let high = 0
    for (let i = j; i < lastSun && sunNm[i]! < right; i++) {
      const from = sunNm[i]!
      const to = sunNm[i + 1]!
      const a = Math.max(left, from)
      const b = Math.min(right, to)
      if (!(b > a)) continue
      const slope = (sun[i + 1]! * to - sun[i]! * from) / (to - from)
      const g0 = sun[i]! * from + slope * (a - from)
      const g1 = sun[i]! * from + slope * (b - from)
      const t0 = (a - left) / width
      const t1 = (b - left) / width
      const sixth = (b - a) / 6
      high += sixth * (2 * t0 * g0 + t0 * g1 + t1 * g0 + 2 * t1 * g1)
      low += sixth * (2 * (1 - t0) * g0 + (1 - t0) * g1 + (1 - t1) * g0 + 2 * (1 - t1) * g1)
    }
    weights[k]! += low * MA_CM2_PER_PRODUCT
    weights[k + 1]! += high * MA_CM2_PER_PRODUCT
  }
  return weights
}

/** `Σ w_k y_k`: the current of a curve on the weights' grid, mA cm⁻². Both arrays have the same length. */
export function weightedSum(weights: Float64Array, values: Float64Array): number {
  let sum = 0
  for (let k = 0; k < weights.length; k++) sum += weights[k]! * values[k]!
  return sum
}
