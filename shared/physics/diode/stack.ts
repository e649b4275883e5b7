import { assertFinite, assertNotNegative, assertPositive, assertWithin, DomainError } from '../errors.js'
import { findRoot } from '../numerics/root.js'
import { darkConductance, emissionCurrent, voltageAtDarkCurrent, type JunctionDiode } from './junction.js'

/** An illuminated junction of a stack. */
export interface StackJunction {
  readonly diode: JunctionDiode
  readonly photocurrentMaCm2: number
}

/** Junctions in series, numbered from the sunward side, with what they share. */
export interface SeriesStack {
  readonly junctions: readonly StackJunction[]
  /** R_s, the series and load resistance of the whole stack, kΩ cm². Default 0. */
  readonly seriesResistanceKohmCm2?: number
  /**
   * η_i: the share of junction i's emission current J_01,i (e^{qV_i/nkT} − 1) that becomes photocurrent of junction
   * i + 1. One number a pair, from the top. Default no coupling.
   */
  readonly couplingToNext?: readonly number[]
  readonly temperatureK: number
}

/** Where a stack stands at one terminal voltage. */
export interface StackState {
  readonly terminalVoltageV: number
  readonly currentMaCm2: number
  readonly junctionVoltagesV: number[]
  /** Photocurrent that each junction receives from the one above, mA cm⁻². */
  readonly coupledCurrentsMaCm2: number[]
}

/** Throws a DomainError that names the first field of a stack outside its domain. */
export function assertStack(stack: SeriesStack): void {
  if (stack.junctions.length === 0)
    throw new DomainError('stack.junctions', 'stack.junctions is empty; a stack needs at least one junction.')
  stack.junctions.forEach((j, i) => assertFinite(j.photocurrentMaCm2, `stack.junctions[${i}].photocurrentMaCm2`))
  assertNotNegative(stack.seriesResistanceKohmCm2 ?? 0, 'stack.seriesResistanceKohmCm2')
  assertPositive(stack.temperatureK, 'stack.temperatureK')
  const coupling = stack.couplingToNext ?? []
  if (coupling.length > Math.max(0, stack.junctions.length - 1))
    throw new DomainError(
      'stack.couplingToNext',
      `stack.couplingToNext has ${coupling.length} numbers; ${stack.junctions.length} junctions have ` +
        `${stack.junctions.length - 1} pairs.`,
    )
  coupling.forEach((eta, i) => assertWithin(eta, 0, 1, `stack.couplingToNext[${i}]`))
}

/**
 * Terminal voltage at a current density, V(J) = Σ V_i(J) − J R_s. The junctions are solved from the top, so that each
 * knows the light of the one above.
 * @throws DomainError for a stack outside its domain. Cost: about 6 evaluations of each diode.
 */
export function stackVoltage(stack: SeriesStack, currentMaCm2: number): number {
  assertStack(stack)
  assertFinite(currentMaCm2, 'currentMaCm2')
  return voltagesAt(stack, 0, currentMaCm2).terminalVoltageV
}

/**
 * The state of the full non-linear circuit at a terminal voltage: one current through all junctions, Σ V_i − J R_s = V.
 * V(J) falls strictly, so the current is unique; it is sought as its distance from the smallest photocurrent, which
 * keeps the digits of a limiting junction with a high shunt resistance.
 * @throws DomainError for a stack outside its domain, or a voltage that breakdown does not let the stack reach.
 * Cost: 20 to 100 times `stackVoltage`.
 */
export function solveStack(stack: SeriesStack, terminalVoltageV: number): StackState {
  assertStack(stack)
  assertFinite(terminalVoltageV, 'terminalVoltageV')
  const reference = Math.min(...stack.junctions.map((j) => j.photocurrentMaCm2))
  const excess = (x: number): number => voltagesAt(stack, reference, x).terminalVoltageV - terminalVoltageV
  const [low, high] = bracket(excess, Math.max(1e-3, Math.abs(reference)), terminalVoltageV)
  const x = low === high ? low : findRoot(excess, low, high, { tolerance: 1e-300 })
  return { ...voltagesAt(stack, reference, x), terminalVoltageV }
}

/** Current density at a terminal voltage, J(V), mA cm⁻². Errors and cost as `solveStack`. */
export function stackCurrent(stack: SeriesStack, terminalVoltageV: number): number {
  return solveStack(stack, terminalVoltageV).currentMaCm2
}

/** Differential resistance of each junction in a state, r_i = dV_i/dJ_d,i, kΩ cm². */
export function differentialResistances(stack: SeriesStack, state: StackState): number[] {
  return stack.junctions.map((j, i) => 1 / darkConductance(j.diode, state.junctionVoltagesV[i]!, stack.temperatureK))
}

/** The state at the current `reference + x`; x keeps its own digits. */
function voltagesAt(stack: SeriesStack, reference: number, x: number): StackState {
  const junctionVoltagesV: number[] = []
  const coupledCurrentsMaCm2: number[] = []
  let coupled = 0
  let total = -(reference + x) * (stack.seriesResistanceKohmCm2 ?? 0)
  stack.junctions.forEach(({ diode, photocurrentMaCm2 }, i) => {
    const dark = photocurrentMaCm2 - reference + coupled - x
    const voltage = voltageAtDarkCurrent(diode, dark, stack.temperatureK)
    junctionVoltagesV.push(voltage)
    coupledCurrentsMaCm2.push(coupled)
    total += voltage
    const eta = stack.couplingToNext?.[i] ?? 0
    coupled = eta > 0 ? eta * emissionCurrent(diode, voltage, stack.temperatureK).currentMaCm2 : 0
  })
  return { terminalVoltageV: total, currentMaCm2: reference + x, junctionVoltagesV, coupledCurrentsMaCm2 }
}

function bracket(excess: (x: number) => number, scale: number, voltage: number): [number, number] {
  const atZero = excess(0)
  if (atZero === 0) return [0, 0]
  const direction = atZero > 0 ? 1 : -1
  let inner = 0
  for (let step = 1e-6 * scale; step < 1e15 * scale; step *= 8) {
    const outer = direction * step
    if (excess(outer) > 0 !== atZero > 0) return direction > 0 ? [inner, outer] : [outer, inner]
    inner = outer
  }
  throw new DomainError(
    'terminalVoltageV',
    `terminalVoltageV is ${voltage} V; breakdown does not let the stack reach it at any current.`,
  )
}
