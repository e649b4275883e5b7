import { thermalVoltage } from '../constants.js'
import { assertFinite, assertNotNegative, assertPositive, DomainError } from '../errors.js'
import { findMonotoneRoot } from '../numerics/root.js'

/**
 * The dark behaviour of one junction. Resistances are in kΩ cm² = V cm² mA⁻¹, currents in mA cm⁻².
 * `J_d(V) = J_01 (e^{qV/nkT} − 1) + J_02 (e^{qV/2kT} − 1) + V/R_sh`, and for V < 0 with a breakdown
 * `+ (V/R_sh) a ((1 − V/V_br)^−m − 1)`.
 */
export interface JunctionDiode {
  /** J_01. */
  readonly saturationCurrentMaCm2: number
  /** n of the first term. Default 1. */
  readonly ideality?: number
  /** J_02 of the term with n = 2. Default 0. */
  readonly secondSaturationCurrentMaCm2?: number
  /** R_sh. Default none; above 1e9 kΩ cm², and infinite, it counts as 1e9 (1e-9 mA cm⁻² at 1 V). */
  readonly shuntResistanceKohmCm2?: number
  readonly breakdown?: ReverseBreakdown
}

/** Bishop's avalanche term, Solar Cells 25 (1988) 73, less its value at V = 0 so that it joins smoothly there. */
export interface ReverseBreakdown {
  /** V_br, below zero, V. */
  readonly voltageV: number
  /** a: the share of the shunt current that takes part. */
  readonly share: number
  /** m. */
  readonly exponent: number
}

const LARGEST_SHUNT_KOHM_CM2 = 1e9

interface Terms {
  readonly first: number
  readonly firstVoltage: number
  readonly second: number
  readonly secondVoltage: number
  readonly shunt: number
  readonly breakdown: ReverseBreakdown | undefined
}

/**
 * Dark current density of a junction at a voltage, J_d(V), mA cm⁻².
 * @throws DomainError for a parameter outside its domain or a voltage at or below the breakdown voltage.
 */
export function darkCurrent(diode: JunctionDiode, voltageV: number, temperatureK: number): number {
  assertFinite(voltageV, 'voltageV')
  return evaluate(termsOf(diode, temperatureK), voltageV)[0]
}

/** Slope dJ_d/dV, mA cm⁻² V⁻¹; its inverse is the differential resistance in kΩ cm². Errors as `darkCurrent`. */
export function darkConductance(diode: JunctionDiode, voltageV: number, temperatureK: number): number {
  assertFinite(voltageV, 'voltageV')
  return evaluate(termsOf(diode, temperatureK), voltageV)[1]
}

/** The first diode term alone, J_01 (e^{qV/nkT} − 1), mA cm⁻², and its slope: what luminescent coupling draws on. */
export function emissionCurrent(
  diode: JunctionDiode,
  voltageV: number,
  temperatureK: number,
): { currentMaCm2: number; slopeMaCm2V: number } {
  const { first, firstVoltage } = termsOf(diode, temperatureK)
  const currentMaCm2 = first * Math.expm1(voltageV / firstVoltage)
  return { currentMaCm2, slopeMaCm2V: (currentMaCm2 + first) / firstVoltage }
}

/**
 * The voltage at which the dark current has a given value: the inverse of `darkCurrent`, by a monotone root that never
 * leaves its bracket. The bracket is known: no term alone can carry more than the whole.
 * @param currentMaCm2 any finite value; below zero the junction is reverse biased.
 */
export function voltageAtDarkCurrent(diode: JunctionDiode, currentMaCm2: number, temperatureK: number): number {
  assertFinite(currentMaCm2, 'currentMaCm2')
  if (currentMaCm2 === 0) return 0
  const terms = termsOf(diode, temperatureK)
  const { first, firstVoltage, second, secondVoltage, shunt, breakdown } = terms
  const excess = (voltage: number): readonly [number, number] => {
    const [current, slope] = evaluate(terms, voltage)
    return [current - currentMaCm2, slope]
  }
  if (currentMaCm2 > 0) {
    const bounds = [currentMaCm2 * shunt]
    if (first > 0) bounds.push(firstVoltage * Math.log1p(currentMaCm2 / first))
    if (second > 0) bounds.push(secondVoltage * Math.log1p(currentMaCm2 / second))
    const high = Math.min(...bounds) * (1 + 1e-12)
    return findMonotoneRoot(excess, 0, high, high)
  }
  let low = currentMaCm2 * shunt * (1 + 1e-12)
  if (breakdown) low = Math.max(low, breakdown.voltageV * (1 - 1e-12))
  return findMonotoneRoot(excess, low, 0)
}

/** Current density through the terminals of an illuminated junction, J = J_ph − J_d(V), mA cm⁻². */
export function junctionCurrent(
  diode: JunctionDiode,
  photocurrentMaCm2: number,
  voltageV: number,
  temperatureK: number,
): number {
  assertFinite(photocurrentMaCm2, 'photocurrentMaCm2')
  return photocurrentMaCm2 - darkCurrent(diode, voltageV, temperatureK)
}

/** Voltage of an illuminated junction through which a current density flows, V_i(J), V. */
export function junctionVoltage(
  diode: JunctionDiode,
  photocurrentMaCm2: number,
  currentMaCm2: number,
  temperatureK: number,
): number {
  assertFinite(photocurrentMaCm2, 'photocurrentMaCm2')
  return voltageAtDarkCurrent(diode, photocurrentMaCm2 - currentMaCm2, temperatureK)
}

/** Open-circuit voltage of an illuminated junction, V. */
export function junctionOpenCircuitVoltage(
  diode: JunctionDiode,
  photocurrentMaCm2: number,
  temperatureK: number,
): number {
  return junctionVoltage(diode, photocurrentMaCm2, 0, temperatureK)
}

/** Throws a DomainError that names the first parameter outside its domain. */
export function assertDiode(diode: JunctionDiode, argument: string): void {
  assertNotNegative(diode.saturationCurrentMaCm2, `${argument}.saturationCurrentMaCm2`)
  assertNotNegative(diode.secondSaturationCurrentMaCm2 ?? 0, `${argument}.secondSaturationCurrentMaCm2`)
  if (!(diode.saturationCurrentMaCm2 > 0 || (diode.secondSaturationCurrentMaCm2 ?? 0) > 0))
    throw new DomainError(
      `${argument}.saturationCurrentMaCm2`,
      `${argument} has no saturation current; at least one of the two diode terms must be above zero.`,
    )
  assertPositive(diode.ideality ?? 1, `${argument}.ideality`)
  const shunt = diode.shuntResistanceKohmCm2 ?? Infinity
  if (!(shunt > 0))
    throw new DomainError(
      `${argument}.shuntResistanceKohmCm2`,
      `${argument}.shuntResistanceKohmCm2 is ${shunt}; it must be above zero, or left out for no shunt.`,
    )
  if (diode.breakdown) {
    if (!(diode.breakdown.voltageV < 0) || !Number.isFinite(diode.breakdown.voltageV))
      throw new DomainError(
        `${argument}.breakdown.voltageV`,
        `${argument}.breakdown.voltageV is ${diode.breakdown.voltageV}; it must be below zero.`,
      )
    assertNotNegative(diode.breakdown.share, `${argument}.breakdown.share`)
    assertPositive(diode.breakdown.exponent, `${argument}.breakdown.exponent`)
  }
}

function termsOf(diode: JunctionDiode, temperatureK: number): Terms {
  assertPositive(temperatureK, 'temperatureK')
  assertDiode(diode, 'diode')
  const unit = thermalVoltage(temperatureK)
  return {
    first: diode.saturationCurrentMaCm2,
    firstVoltage: (diode.ideality ?? 1) * unit,
    second: diode.secondSaturationCurrentMaCm2 ?? 0,
    secondVoltage: 2 * unit,
    shunt: Math.min(diode.shuntResistanceKohmCm2 ?? Infinity, LARGEST_SHUNT_KOHM_CM2),
    breakdown: diode.breakdown,
  }
}

/** J_d and dJ_d/dV. */
function evaluate(terms: Terms, voltage: number): readonly [number, number] {
  const { first, firstVoltage, second, secondVoltage, shunt, breakdown } = terms
  const firstCurrent = first * Math.expm1(voltage / firstVoltage)
  let current = firstCurrent + voltage / shunt
  let slope = (firstCurrent + first) / firstVoltage + 1 / shunt
  if (second > 0) {
    const secondCurrent = second * Math.expm1(voltage / secondVoltage)
    current += secondCurrent
    slope += (secondCurrent + second) / secondVoltage
  }
  if (breakdown && voltage < 0) {
    const rest = 1 - voltage / breakdown.voltageV
    if (!(rest > 0))
      throw new DomainError(
        'voltageV',
        `voltageV is ${voltage}; it must lie above the breakdown voltage of ${breakdown.voltageV} V.`,
      )
    const growth = rest ** -breakdown.exponent
    current += (voltage / shunt) * breakdown.share * (growth - 1)
    slope +=
      (breakdown.share / shunt) * (growth - 1 + (voltage * breakdown.exponent * growth) / (rest * breakdown.voltageV))
  }
  return [current, slope]
}
