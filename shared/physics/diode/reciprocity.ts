import { ELEMENTARY_CHARGE_C, PHOTON_ENERGY_NM_EV, SPEED_OF_LIGHT_M_S, thermalVoltage } from '../constants.js'
import { assertCurve, valueAt, type Curve } from '../curve.js'
import { assertNotNegative, assertPositive, assertWithin, DomainError } from '../errors.js'

export interface ReciprocityOptions {
  /**
   * EQE below this share counts as zero. Beyond the edge the black body grows by a decade every 59 meV, so that noise
   * there would outweigh the junction: give the noise floor of the scan. Default 0, every value counts as it is.
   */
  readonly noiseFloor?: number
}

const NODES = [0.1834346424956498, 0.525532409916329, 0.7966664774136267, 0.9602898564975363]
const WEIGHTS = [0.362683783378362, 0.3137066458778873, 0.2223810344533745, 0.1012285362903763]

/**
 * Radiative saturation current density of a junction from its EQE,
 * `J_0,rad = q ∫ EQE(λ) φ_bb(λ, T) dλ`, φ_bb = 2πc λ⁻⁴ /(e^{hc/λkT} − 1): emission into the hemisphere in front.
 * Source: U. Rau, Phys. Rev. B 76 (2007) 085303.
 * @param eqe fraction, linear between points, zero outside its range.
 * @returns mA cm⁻². Integrated by eight-point Gauss rules on pieces no wider than kT/2: the rule adds less than 1e-12.
 * @throws DomainError for a bad curve or temperature. Cost: about 8 exponentials a piece.
 */
export function radiativeSaturationCurrent(eqe: Curve, temperatureK: number, options: ReciprocityOptions = {}): number {
  assertCurve(eqe, 'eqe')
  assertPositive(temperatureK, 'temperatureK')
  const noiseFloor = options.noiseFloor ?? 0
  assertNotNegative(noiseFloor, 'noiseFloor')
  const unit = thermalVoltage(temperatureK)
  const { wavelengthNm: x, values: y } = eqe
  let sum = 0
  for (let i = 0; i + 1 < x.length; i++) {
    if (Math.max(y[i]!, y[i + 1]!) < noiseFloor || (y[i] === 0 && y[i + 1] === 0)) continue
    const widthEv = PHOTON_ENERGY_NM_EV / x[i]! - PHOTON_ENERGY_NM_EV / x[i + 1]!
    const pieces = Math.max(1, Math.ceil((2 * widthEv) / unit))
    const half = (0.5 * (x[i + 1]! - x[i]!)) / pieces
    for (let piece = 0; piece < pieces; piece++) {
      const centre = x[i]! + half * (2 * piece + 1)
      for (let node = 0; node < 4; node++)
        for (const side of [-1, 1]) {
          const nm = centre + side * half * NODES[node]!
          sum += WEIGHTS[node]! * half * valueAt(eqe, nm) * photonFluxOfBlackBody(nm, unit)
        }
    }
  }
  return (ELEMENTARY_CHARGE_C * sum) / 10
}

/**
 * `J_01 = J_0,rad/ERE`, mA cm⁻²: the saturation current of a junction whose external radiative efficiency (the share
 * of recombination that leaves as light) the user states.
 * @throws DomainError when the efficiency is not above 0 and at most 1, or J_0,rad is not above zero.
 */
export function saturationCurrentFromRadiative(
  radiativeCurrentMaCm2: number,
  externalRadiativeEfficiency: number,
): number {
  assertPositive(externalRadiativeEfficiency, 'externalRadiativeEfficiency')
  assertWithin(externalRadiativeEfficiency, 0, 1, 'externalRadiativeEfficiency')
  if (!(radiativeCurrentMaCm2 > 0))
    throw new DomainError(
      'radiativeCurrentMaCm2',
      `radiativeCurrentMaCm2 is ${radiativeCurrentMaCm2}; the scan has no response above its noise floor to count from.`,
    )
  return radiativeCurrentMaCm2 / externalRadiativeEfficiency
}

/** Photon flux of a black body into a hemisphere, m⁻² s⁻¹ nm⁻¹. */
function photonFluxOfBlackBody(wavelengthNm: number, thermalVoltageV: number): number {
  const metres = wavelengthNm * 1e-9
  return (
    (2e-9 * Math.PI * SPEED_OF_LIGHT_M_S) /
    (metres ** 4 * Math.expm1(PHOTON_ENERGY_NM_EV / wavelengthNm / thermalVoltageV))
  )
}
