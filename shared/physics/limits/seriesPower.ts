import { assertPositive, DomainError } from '../errors.js'

/** A junction as an ideal source and one diode: `J = J_ph − J_0 (e^{V/(nV_t)} − 1)`. */
export interface IdealJunction {
  /** J_ph, mA cm⁻², zero or above. */
  readonly currentMaCm2: number
  /** ln J_0, J_0 in mA cm⁻². */
  readonly logDarkCurrent: number
  /** n kT/q, V. */
  readonly slopeV: number
}

/** The working point of junctions in series. Where no junction current flows everything is zero. */
export interface SeriesPower {
  /** Short-circuit current: the least J_ph, mA cm⁻². */
  readonly currentMaCm2: number
  readonly openCircuitV: number
  readonly fillFactor: number
  readonly powerMwCm2: number
  readonly voltageAtMaximumV: number
  readonly currentAtMaximumMaCm2: number
}

const NOTHING: SeriesPower = {
  currentMaCm2: 0,
  openCircuitV: 0,
  fillFactor: 0,
  powerMwCm2: 0,
  voltageAtMaximumV: 0,
  currentAtMaximumMaCm2: 0,
}

/** V of one junction at current J, `nV_t ln((J_ph − J)/J_0 + 1)`, also where J_0 is too small for a number. */
function junctionVoltage(remaining: number, logDark: number, slopeV: number): number {
  const log = Math.log(remaining) - logDark
  return slopeV * (log > 36 ? log : Math.log1p(Math.exp(log)))
}

/**
 * Short-circuit current, open-circuit voltage, fill factor and largest power of ideal junctions in series, with an
 * optional series resistance and without shunts: `V(J) = Σ n_iV_t ln((J_ph,i − J)/J_0,i + 1) − J R_s`. `d(JV)/dJ = 0` is
 * solved for `y = ln(1 − J/J_sc)` by Newton steps kept in a bracket: there the equation is nearly linear, also for the
 * sharp knee of matched junctions. Closed under one junction (Lambert's W), here for any number of them.
 * @param seriesResistanceOhmCm2 R_s, Ω cm², zero or above. @param logDarkCurrent of the junctions, not below −700.
 * @throws DomainError naming the junction. Cost: under ten steps of one logarithm a junction.
 */
export function seriesPower(junctions: readonly IdealJunction[], seriesResistanceOhmCm2 = 0): SeriesPower {
  if (junctions.length === 0) throw new DomainError('junctions', 'junctions is empty; a device has at least one.')
  let short = Infinity
  junctions.forEach((junction, i) => {
    assertPositive(junction.slopeV, `junctions[${i}].slopeV`)
    if (!Number.isFinite(junction.currentMaCm2) || !Number.isFinite(junction.logDarkCurrent))
      throw new DomainError(
        `junctions[${i}]`,
        `junctions[${i}] has J_ph = ${junction.currentMaCm2} and ln J_0 = ${junction.logDarkCurrent}; both must be finite.`,
      )
    short = Math.min(short, junction.currentMaCm2)
  })
  if (!(short > 0)) return NOTHING
  const resistance = seriesResistanceOhmCm2 / 1000
  const current = maximumPowerCurrent(junctions, short, resistance)
  let open = 0
  let voltage = -current * resistance
  for (const { currentMaCm2, logDarkCurrent, slopeV } of junctions) {
    open += junctionVoltage(currentMaCm2, logDarkCurrent, slopeV)
    voltage += junctionVoltage(currentMaCm2 - current, logDarkCurrent, slopeV)
  }
  const power = current * voltage
  return {
    currentMaCm2: short,
    openCircuitV: open,
    fillFactor: open > 0 ? power / (short * open) : 0,
    powerMwCm2: power,
    voltageAtMaximumV: voltage,
    currentAtMaximumMaCm2: current,
  }
}

/** The J at which J·V(J) is largest; V + J dV/dJ falls strictly with J, so the root is the only one. */
function maximumPowerCurrent(junctions: readonly IdealJunction[], short: number, resistance: number): number {
  let low = -60
  let high = 0
  let y = -3
  for (let iteration = 0; iteration < 100; iteration++) {
    const share = Math.exp(y)
    const current = -short * Math.expm1(y)
    let slope = -2 * current * resistance
    // F(y) = V + J V'(J) and its derivative by y, with J = J_sc(1 − e^y), dJ/dy = −J_sc e^y.
    let byCurrent = -2 * resistance
    for (const { currentMaCm2, logDarkCurrent, slopeV } of junctions) {
      const remaining = currentMaCm2 - short + short * share
      const inverse = 1 / (remaining + Math.exp(logDarkCurrent))
      slope += junctionVoltage(remaining, logDarkCurrent, slopeV) - current * slopeV * inverse
      byCurrent -= slopeV * inverse * (2 + current * inverse)
    }
    if (slope > 0) high = y
    else low = y
    const step = slope / (byCurrent * -short * share)
    let next = y - step
    if (!(next > low && next < high)) next = 0.5 * (low + high)
    if (Math.abs(next - y) < 1e-13 * (1 + Math.abs(y))) return -short * Math.expm1(next)
    y = next
  }
  return -short * Math.expm1(y)
}
