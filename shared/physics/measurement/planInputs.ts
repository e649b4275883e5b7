import { PHOTON_ENERGY_NM_EV } from '../constants.js'
import { makeCurve, type Curve } from '../curve.js'
import { radiativeSaturationCurrent, saturationCurrentFromRadiative } from '../diode/reciprocity.js'
import { assertPositive, DomainError } from '../errors.js'

/** EQE below this share is taken for noise when a saturation current is read from a scan. */
export const PLAN_NOISE_FLOOR = 0.01
/** External radiative efficiency that a junction is given where nobody states one: an assumption, to be shown as one. */
export const ASSUMED_RADIATIVE_EFFICIENCY = 0.01

const ESTIMATED_PLATEAU = 0.85
const ESTIMATED_EDGE_EV = 0.01
const FIRST_NM = 300
const STEP_NM = 5
const BEYOND_EDGE_NM = 60

/**
 * EQE of every junction of a series stack from gaps alone, for a plan before anything was measured: 0.85 between a
 * junction's own gap and that of the one above, with a logistic edge of 10 meV at each (invented figures; a measured
 * scan takes their place as soon as there is one).
 * @param gapsEv from the sunward side, falling. @throws DomainError when a gap is not above zero or they do not fall.
 * Cost O(n) a junction.
 */
export function estimatedEqes(gapsEv: readonly number[]): Curve[] {
  gapsEv.forEach((gap, i) => {
    assertPositive(gap, `gapsEv[${i}]`)
    if (i > 0 && !(gap < gapsEv[i - 1]!))
      throw new DomainError(
        `gapsEv[${i}]`,
        `The gap of junction ${i + 1} is ${gap} eV and that of the junction above it ${gapsEv[i - 1]} eV; gaps fall from the sunward side.`,
      )
  })
  return gapsEv.map((gap, i) => {
    const count = Math.ceil((PHOTON_ENERGY_NM_EV / gap + BEYOND_EDGE_NM - FIRST_NM) / STEP_NM) + 1
    if (count < 3)
      throw new DomainError(`gapsEv[${i}]`, `A gap of ${gap} eV lies beyond ${FIRST_NM} nm; no scan begins there.`)
    const nm = Array.from({ length: count }, (_, k) => FIRST_NM + k * STEP_NM)
    const above = i === 0 ? Infinity : gapsEv[i - 1]!
    return makeCurve(
      nm,
      nm.map(
        (x) => ESTIMATED_PLATEAU * step(PHOTON_ENERGY_NM_EV / x - gap) * (1 - step(PHOTON_ENERGY_NM_EV / x - above)),
      ),
    )
  })
}

/**
 * The diode of a junction by reciprocity: `J_01 = J_0,rad/ERE`, n = 1, no shunt.
 * @throws DomainError when the curve has no response above the noise floor, or an efficiency outside (0, 1].
 */
export function diodeByReciprocity(
  eqe: Curve,
  temperatureK: number,
  externalRadiativeEfficiency = ASSUMED_RADIATIVE_EFFICIENCY,
): { readonly radiativeCurrentMaCm2: number; readonly saturationCurrentMaCm2: number } {
  const radiativeCurrentMaCm2 = radiativeSaturationCurrent(eqe, temperatureK, { noiseFloor: PLAN_NOISE_FLOOR })
  return {
    radiativeCurrentMaCm2,
    saturationCurrentMaCm2: saturationCurrentFromRadiative(radiativeCurrentMaCm2, externalRadiativeEfficiency),
  }
}

const step = (energyEv: number): number => 1 / (1 + Math.exp(-energyEv / ESTIMATED_EDGE_EV))
