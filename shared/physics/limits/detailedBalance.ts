import { thermalVoltage } from '../constants.js'
import { DomainError } from '../errors.js'
import { stepCurrentMaCm2, type PhotonCurrent } from './photonCurrent.js'
import { logDarkCurrentMaCm2, type Emission } from './radiativeCurrent.js'
import { seriesPower, type IdealJunction, type SeriesPower } from './seriesPower.js'

export interface LimitConditions {
  /** Cell temperature, K. Default 300. */
  readonly temperatureK?: number
  /** Default oneSided. */
  readonly emission?: Emission
}

/** Series: two terminals, one current. Independent: each junction at its own working point. */
export type Connection = 'series' | 'independent'

export interface DeviceLimit {
  readonly bandGapsEv: readonly number[]
  readonly connection: Connection
  /** J_ph of each junction, mA cm⁻². */
  readonly currentsMaCm2: readonly number[]
  /** Largest power over the spectrum's irradiance, fraction. */
  readonly efficiency: number
  readonly powerMwCm2: number
  /** The stack's working point; for independent junctions undefined. */
  readonly series?: SeriesPower
  /** Each junction alone, with the light that reaches it. */
  readonly junctions: readonly SeriesPower[]
}

/** The ideal junctions of a stack of gaps: each absorbs all above its gap that the ones before it left. */
export function idealJunctions(
  photons: PhotonCurrent,
  bandGapsEv: readonly number[],
  conditions: LimitConditions = {},
): IdealJunction[] {
  const temperatureK = conditions.temperatureK ?? 300
  const slopeV = thermalVoltage(temperatureK)
  let taken = 0
  return bandGapsEv.map((gap, i) => {
    if (i > 0 && !(gap < bandGapsEv[i - 1]!))
      throw new DomainError(
        `bandGapsEv[${i}]`,
        `bandGapsEv[${i}] is ${gap} eV; it must be below the gap above it, ${bandGapsEv[i - 1]} eV.`,
      )
    const upToHere = stepCurrentMaCm2(photons, gap)
    const currentMaCm2 = upToHere - taken
    taken = upToHere
    return { currentMaCm2, logDarkCurrent: logDarkCurrentMaCm2(gap, temperatureK, conditions.emission), slopeV }
  })
}

/**
 * Detailed-balance limit of a stack of junctions: unit EQE above each gap, radiative recombination only, emission into
 * index 1, no coupling between the junctions.
 * Sources: W. Shockley, H. J. Queisser, J. Appl. Phys. 32 (1961) 510; A. De Vos, J. Phys. D 13 (1980) 839.
 * @param bandGapsEv eV, falling from the sunward side, one or more.
 * @throws DomainError naming the argument. Cost: some microseconds.
 */
export function deviceLimit(
  photons: PhotonCurrent,
  bandGapsEv: readonly number[],
  connection: Connection = 'series',
  conditions: LimitConditions = {},
): DeviceLimit {
  const ideal = idealJunctions(photons, bandGapsEv, conditions)
  const junctions = ideal.map((junction) => seriesPower([junction]))
  const series = connection === 'series' ? seriesPower(ideal) : undefined
  const powerMwCm2 = series?.powerMwCm2 ?? junctions.reduce((sum, junction) => sum + junction.powerMwCm2, 0)
  return {
    bandGapsEv,
    connection,
    currentsMaCm2: ideal.map((junction) => junction.currentMaCm2),
    efficiency: (10 * powerMwCm2) / photons.irradianceWM2,
    powerMwCm2,
    ...(series ? { series } : {}),
    junctions,
  }
}

/** Ultimate efficiency of Shockley and Queisser: every photon above the gap delivers the gap. Fraction. */
export function ultimateEfficiency(photons: PhotonCurrent, bandGapEv: number): number {
  return (10 * stepCurrentMaCm2(photons, bandGapEv) * bandGapEv) / photons.irradianceWM2
}

/** What a device reaches of its limit, as fractions. */
export interface ShareOfLimit {
  readonly current: number
  readonly voltage: number
  readonly fillFactor: number
  readonly efficiency: number
}

/**
 * Share of the series limit that a device reaches in J_sc, V_oc and fill factor; their product is the share in
 * efficiency under the same irradiance.
 * @throws DomainError when the limit is not one of a series connection with power.
 */
export function shareOfLimit(
  device: { readonly currentMaCm2: number; readonly openCircuitV: number; readonly fillFactor: number },
  limit: DeviceLimit,
): ShareOfLimit {
  const { series } = limit
  if (!series || !(series.powerMwCm2 > 0))
    throw new DomainError('limit', 'limit must be that of a series connection which delivers power.')
  const current = device.currentMaCm2 / series.currentMaCm2
  const voltage = device.openCircuitV / series.openCircuitV
  const fillFactor = device.fillFactor / series.fillFactor
  return { current, voltage, fillFactor, efficiency: current * voltage * fillFactor }
}
