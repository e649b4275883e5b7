import { thermalVoltage } from '../constants.js'
import { DomainError } from '../errors.js'
import { minimiseInBounds, type Bound } from '../numerics/boundedSearch.js'
import { deviceLimit, type Connection, type DeviceLimit, type LimitConditions } from './detailedBalance.js'
import { stepCurrentMaCm2, type PhotonCurrent } from './photonCurrent.js'
import { logDarkCurrentMaCm2 } from './radiativeCurrent.js'
import { seriesPower, type IdealJunction } from './seriesPower.js'

/** Efficiency over two gaps. */
export interface LimitMap {
  readonly topEv: Float64Array
  readonly bottomEv: Float64Array
  /** Fraction, row by row: index = row of bottomEv × topEv.length + column of topEv. Zero where top ≤ next gap. */
  readonly efficiency: Float64Array
  /** Index of the largest value. */
  readonly best: number
}

interface GapTable {
  readonly current: Float64Array
  readonly logDark: Float64Array
}

function tabulate(photons: PhotonCurrent, gapsEv: Float64Array, conditions: LimitConditions): GapTable {
  const temperatureK = conditions.temperatureK ?? 300
  return {
    current: gapsEv.map((gap) => stepCurrentMaCm2(photons, gap)),
    logDark: gapsEv.map((gap) => logDarkCurrentMaCm2(gap, temperatureK, conditions.emission)),
  }
}

/**
 * Detailed-balance efficiency for every pair of a top and a bottom gap; with `below` given, a slice for three junctions
 * (top, middle on the second axis, a fixed bottom gap). What depends on one gap alone is computed once for each.
 * @param topEv @param bottomEv eV, above zero, at least one value each; any order.
 * @throws DomainError naming the argument. Cost: about a microsecond a pair.
 */
export function limitMap(
  photons: PhotonCurrent,
  topEv: Float64Array,
  bottomEv: Float64Array,
  connection: Connection = 'series',
  conditions: LimitConditions & { readonly below?: number } = {},
): LimitMap {
  if (topEv.length === 0 || bottomEv.length === 0)
    throw new DomainError('topEv', 'A limit map needs at least one gap on each axis.')
  const slopeV = thermalVoltage(conditions.temperatureK ?? 300)
  const top = tabulate(photons, topEv, conditions)
  const bottom = tabulate(photons, bottomEv, conditions)
  const below = conditions.below
  const third = below === undefined ? undefined : tabulate(photons, Float64Array.of(below), conditions)
  const efficiency = new Float64Array(topEv.length * bottomEv.length)
  let best = 0
  const ideal = (currentMaCm2: number, logDarkCurrent: number): IdealJunction => ({
    currentMaCm2,
    logDarkCurrent,
    slopeV,
  })
  const alone = top.current.map((j, c) => seriesPower([ideal(j, top.logDark[c]!)]).powerMwCm2)
  for (let r = 0; r < bottomEv.length; r++) {
    if (below !== undefined && !(bottomEv[r]! > below)) continue
    const rest = third ? [ideal(third.current[0]! - bottom.current[r]!, third.logDark[0]!)] : []
    const restAlone = connection === 'independent' ? rest.reduce((sum, j) => sum + seriesPower([j]).powerMwCm2, 0) : 0
    for (let c = 0; c < topEv.length; c++) {
      if (!(topEv[c]! > bottomEv[r]!)) continue
      const second = ideal(bottom.current[r]! - top.current[c]!, bottom.logDark[r]!)
      const power =
        connection === 'series'
          ? seriesPower([ideal(top.current[c]!, top.logDark[c]!), second, ...rest]).powerMwCm2
          : alone[c]! + seriesPower([second]).powerMwCm2 + restAlone
      const index = r * topEv.length + c
      efficiency[index] = (10 * power) / photons.irradianceWM2
      if (efficiency[index]! > efficiency[best]!) best = index
    }
  }
  return { topEv, bottomEv, efficiency, best }
}

/**
 * The gaps of the best device with as many junctions as `bounds` has entries, each gap within its bounds (eV, from the
 * sunward side). The absorption bands of the air make several local maxima; the search starts from many places.
 * @throws DomainError when no falling sequence of gaps fits the bounds. Cost: some thousand evaluations a junction.
 */
export function bestGaps(
  photons: PhotonCurrent,
  bounds: readonly Bound[],
  connection: Connection = 'series',
  conditions: LimitConditions = {},
): DeviceLimit {
  const isFalling = (gaps: readonly number[]): boolean => gaps.every((gap, i) => i === 0 || gap < gaps[i - 1]!)
  const found = minimiseInBounds(
    (gaps) => (isFalling(gaps) ? -deviceLimit(photons, gaps, connection, conditions).efficiency : Infinity),
    bounds,
    { samples: 400 * bounds.length * bounds.length, starts: 8, tolerance: 1e-7 },
  )
  return deviceLimit(photons, found.point, connection, conditions)
}
