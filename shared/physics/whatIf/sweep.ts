import { assertFinite, DomainError } from '../errors.js'
import { minimiseOnInterval } from '../numerics/minimise.js'
import { findRoot } from '../numerics/root.js'
import type { CompiledDevice } from './compiledDevice.js'
import type { Change } from './device.js'
import { measuredState, parseParameter, setIn, valueIn, type DeviceState, type Parameter } from './parameters.js'
import { quantityOf } from './quantities.js'
import { leastOf, mismatchOf } from './seriesFigures.js'

export interface SweepRequest {
  /** A key such as `1.thicknessNm`. */
  readonly parameter: string
  readonly from: number
  readonly to: number
  /** Points, 3 or more. Default 101. */
  readonly points?: number
  /** What else is changed. */
  readonly change?: Change
}

/** Where two junctions have the same current. Junctions count from 1. */
export interface MatchingPoint {
  readonly junctions: readonly [number, number]
  readonly value: number
  readonly currentMaCm2: number
}

/** The range over which J_lim stays within 1 % of its best. */
export interface ProcessWindow {
  readonly low: number
  readonly high: number
  /** True where the window ends only because the sweep does. */
  readonly isOpenBelow: boolean
  readonly isOpenAbove: boolean
}

export interface Sweep {
  readonly parameter: string
  readonly values: Float64Array
  /** J of each junction along the sweep, mA cm⁻². */
  readonly currentsMaCm2: readonly Float64Array[]
  readonly limitingCurrentMaCm2: Float64Array
  /** Fraction. */
  readonly mismatch: Float64Array
  /** Fraction; zero where no power is known. */
  readonly efficiency: Float64Array
  readonly measuredValue: number
  readonly matchingPoints: readonly MatchingPoint[]
  /** Where J_lim is largest. */
  readonly optimum: { readonly value: number; readonly limitingCurrentMaCm2: number }
  readonly window: ProcessWindow
}

const WINDOW_SHARE = 0.99

/** Currents as a function of one parameter, the rest as in `change`. */
export function currentsAlong(
  compiled: CompiledDevice,
  key: string,
  change: Change,
): { at: (value: number) => Float64Array; state: DeviceState; parameter: Parameter } {
  const parameter = parseParameter(compiled.device, key)
  const state = compiled.state(change)
  const currents = new Float64Array(compiled.device.junctions.length)
  const at = (value: number): Float64Array => {
    setIn(compiled.device, state, parameter, value, key)
    return compiled.currents(state, currents)
  }
  return { at, state, parameter }
}

/**
 * One parameter from one value to another: currents, J_lim, mismatch and efficiency at equidistant points, the matching
 * points as roots of J_i − J_j, the optimum of J_lim by search, and the process window whose ends are roots as well.
 * @throws DomainError naming the parameter or a bound. Cost: `points` + about 100 evaluations.
 */
export function sweep(compiled: CompiledDevice, request: SweepRequest): Sweep {
  const { parameter: key, from, to } = request
  assertFinite(from, 'from')
  assertFinite(to, 'to')
  const points = request.points ?? 101
  if (!(to > from)) throw new DomainError('to', `to is ${to}; it must be above from = ${from}.`)
  if (!(Number.isInteger(points) && points >= 3))
    throw new DomainError('points', `points is ${points}; a sweep needs a whole number of at least 3.`)
  const { at, state, parameter } = currentsAlong(compiled, key, request.change ?? {})
  const values = axis(from, to, points)
  const junctions = compiled.device.junctions.length
  const currents = Array.from({ length: junctions }, () => new Float64Array(points))
  const result = {
    limitingCurrentMaCm2: new Float64Array(points),
    mismatch: new Float64Array(points),
    efficiency: new Float64Array(points),
  }
  values.forEach((value, i) => {
    const here = at(value)
    here.forEach((current, p) => (currents[p]![i] = current))
    result.limitingCurrentMaCm2[i] = leastOf(here)
    result.mismatch[i] = mismatchOf(here)
    result.efficiency[i] = quantityOf(compiled, 'efficiency', here, state)
  })
  const limiting = (value: number): number => leastOf(at(value))
  const matchingPoints = findMatchingPoints(at, values, currents)
  const optimum = findOptimum(limiting, values, result.limitingCurrentMaCm2, matchingPoints)
  return {
    parameter: key,
    values,
    currentsMaCm2: currents,
    ...result,
    measuredValue: valueIn(compiled.device, measuredState(compiled.device), parameter),
    matchingPoints,
    optimum,
    window: findWindow(limiting, values, result.limitingCurrentMaCm2, optimum),
  }
}

/** Equidistant values, both ends exact. */
export function axis(from: number, to: number, points: number): Float64Array {
  return Float64Array.from({ length: points }, (_, i) =>
    i === points - 1 ? to : from + ((to - from) * i) / (points - 1),
  )
}

/** Equal currents of two junctions between two values of a parameter. The difference must change its sign there. */
export function matchBetween(
  at: (value: number) => Float64Array,
  junctions: readonly [number, number],
  low: number,
  high: number,
): MatchingPoint {
  const [a, b] = junctions
  const difference = (value: number): number => {
    const currents = at(value)
    return currents[a - 1]! - currents[b - 1]!
  }
  const value = findRoot(difference, low, high)
  return { junctions, value, currentMaCm2: at(value)[a - 1]! }
}

function findMatchingPoints(
  at: (value: number) => Float64Array,
  values: Float64Array,
  currents: readonly Float64Array[],
): MatchingPoint[] {
  const found: MatchingPoint[] = []
  for (let a = 0; a < currents.length; a++)
    for (let b = a + 1; b < currents.length; b++)
      for (let i = 0; i < values.length; i++) {
        const here = currents[a]![i]! - currents[b]![i]!
        const junctions = [a + 1, b + 1] as const
        if (here === 0) found.push({ junctions, value: values[i]!, currentMaCm2: currents[a]![i]! })
        else if (i > 0 && here * (currents[a]![i - 1]! - currents[b]![i - 1]!) < 0)
          found.push(matchBetween(at, junctions, values[i - 1]!, values[i]!))
      }
  return found
}

/** The best of the samples, of the matching points (a kink of J_lim lies there) and of a search around both. */
function findOptimum(
  limiting: (value: number) => number,
  values: Float64Array,
  sampled: Float64Array,
  matchingPoints: readonly MatchingPoint[],
): Sweep['optimum'] {
  let best = 0
  sampled.forEach((current, i) => {
    if (current > sampled[best]!) best = i
  })
  const low = values[Math.max(0, best - 1)]!
  const high = values[Math.min(values.length - 1, best + 1)]!
  const searched = minimiseOnInterval((value) => -limiting(value), low, high, { samples: 4 })
  const candidates = [
    { value: values[best]!, limitingCurrentMaCm2: sampled[best]! },
    { value: searched.x, limitingCurrentMaCm2: -searched.value },
    ...matchingPoints.map(({ value }) => ({ value, limitingCurrentMaCm2: limiting(value) })),
  ]
  return candidates.reduce((a, b) => (b.limitingCurrentMaCm2 > a.limitingCurrentMaCm2 ? b : a))
}

function findWindow(
  limiting: (value: number) => number,
  values: Float64Array,
  sampled: Float64Array,
  optimum: Sweep['optimum'],
): ProcessWindow {
  const least = WINDOW_SHARE * optimum.limitingCurrentMaCm2
  const edge = (inside: number, outside: number): number =>
    findRoot((value) => limiting(value) - least, Math.min(inside, outside), Math.max(inside, outside))
  let low = values[0]!
  let high = values[values.length - 1]!
  let isOpenBelow = true
  let isOpenAbove = true
  let inside = optimum.value
  for (let i = values.length - 1; i >= 0; i--) {
    if (values[i]! >= optimum.value) continue
    if (sampled[i]! < least) {
      low = edge(inside, values[i]!)
      isOpenBelow = false
      break
    }
    inside = values[i]!
  }
  inside = optimum.value
  for (let i = 0; i < values.length; i++) {
    if (values[i]! <= optimum.value) continue
    if (sampled[i]! < least) {
      high = edge(inside, values[i]!)
      isOpenAbove = false
      break
    }
    inside = values[i]!
  }
  return { low, high, isOpenBelow, isOpenAbove }
}
