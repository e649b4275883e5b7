import { assertFinite, DomainError } from '../errors.js'
import type { CompiledDevice } from './compiledDevice.js'
import type { Change } from './device.js'
import type { ResolvedAxis } from './mapAxis.js'
import { mapSource, stateAt } from './mapSource.js'
import { measuredState, parseParameter, valueIn } from './parameters.js'
import { quantityOf } from './quantities.js'
import { axis as equidistant, currentsAlong, matchBetween } from './sweep.js'

export interface MapAxisRequest {
  readonly parameter: string
  readonly from: number
  readonly to: number
  /** Points, 2 or more. */
  readonly points: number
}

export interface MapRequest {
  readonly x: MapAxisRequest
  readonly y: MapAxisRequest
  /** What else is changed. */
  readonly change?: Change
  /** Whether the efficiency is estimated at every point; about a microsecond each. Default false. */
  readonly withEfficiency?: boolean
}

export interface MapAxis {
  readonly parameter: string
  readonly values: Float64Array
  readonly measuredValue: number
}

export interface MapOptimum {
  readonly x: number
  readonly y: number
  readonly index: number
  readonly value: number
}

/** Quantities over two parameters; index = row of y × columns of x + column. */
export interface WhatIfMap {
  readonly x: MapAxis
  readonly y: MapAxis
  readonly currentsMaCm2: readonly Float64Array[]
  readonly limitingCurrentMaCm2: Float64Array
  /** Fraction. */
  readonly mismatch: Float64Array
  /** Fraction; null when not asked for. */
  readonly efficiency: Float64Array | null
  /** The point of the map with the largest J_lim. */
  readonly optimum: MapOptimum
}

/** How far a map has come: the arrays hold values at rows and columns that are multiples of `stride`. */
export interface MapProgress {
  readonly stride: number
  readonly computed: number
  readonly total: number
  readonly map: WhatIfMap
}

const STRIDES = [16, 8, 4, 2, 1]
/** Points between two looks at the outside world. */
const POINTS_PER_STEP = 2048

/**
 * A map from coarse to fine: a generator that yields about every 2000 points and after each pass, so that a caller may
 * draw, let others work, or stop by returning it. Its return value is the finished map. Points once computed are kept.
 * @throws DomainError naming an axis or parameter.
 * Cost with Beer–Lambert: a dot product a point when the axes belong to two junctions, else one evaluation a point.
 */
export function* mapProgress(compiled: CompiledDevice, request: MapRequest): Generator<MapProgress, WhatIfMap> {
  const change = request.change ?? {}
  const x = resolveAxis(compiled, request.x, 'x')
  const y = resolveAxis(compiled, request.y, 'y')
  if (x.key === y.key) throw new DomainError('y.parameter', `Both axes are "${x.key}"; a map needs two parameters.`)
  const [width, height] = [x.values.length, y.values.length]
  const total = width * height
  const map = emptyMap(compiled, x, y, request.withEfficiency ?? false)
  const source = mapSource(compiled, change, x, y)
  const columns = new Int32Array(width)
  let computed = 0
  let sinceYield = 0
  const progress = (stride: number): MapProgress => ({
    stride,
    computed,
    total,
    map: { ...map, optimum: best(map, stride) },
  })
  for (let pass = 0; pass < STRIDES.length; pass++) {
    const stride = STRIDES[pass]!
    const before = pass > 0 ? STRIDES[pass - 1]! : 0
    for (let row = 0; row < height; row += stride) {
      let count = 0
      for (let column = 0; column < width; column += stride)
        if (!(before > 0 && row % before === 0 && column % before === 0)) columns[count++] = column
      source.fillRow(row, columns, count, map.currentsMaCm2)
      for (let c = 0; c < count; c++) finishPoint(compiled, change, map, x, y, row, columns[c]!)
      computed += count
      sinceYield += count
      if (sinceYield >= POINTS_PER_STEP && computed < total) {
        sinceYield = 0
        yield progress(before || stride)
      }
    }
    if (stride > 1) yield progress(stride)
  }
  return { ...map, optimum: best(map, 1) }
}

/** The whole map at once; see `mapProgress`. */
export function computeMap(compiled: CompiledDevice, request: MapRequest): WhatIfMap {
  const passes = mapProgress(compiled, request)
  for (;;) {
    const step = passes.next()
    if (step.done) return step.value
  }
}

/**
 * The line on which two junctions have the same current: in every row of the map, each root of J_i − J_j between
 * neighbouring columns whose difference changes its sign; then the same along the columns, so that steep and flat parts
 * are both met. Points in the order of y, then x.
 * @param junctions counted from 1. Cost: about eight evaluations a point.
 */
export function matchedLine(
  compiled: CompiledDevice,
  request: MapRequest,
  map: WhatIfMap,
  junctions: readonly [number, number] = [1, 2],
): { x: number; y: number }[] {
  const [a, b] = junctions
  const [ja, jb] = [map.currentsMaCm2[a - 1], map.currentsMaCm2[b - 1]]
  if (!ja || !jb)
    throw new DomainError(
      'junctions',
      `Junctions ${a} and ${b} are asked for; the map has ${map.currentsMaCm2.length}.`,
    )
  const width = map.x.values.length
  const height = map.y.values.length
  const points: { x: number; y: number }[] = []
  const difference = (row: number, column: number): number => ja[row * width + column]! - jb[row * width + column]!
  for (let row = 0; row < height; row++)
    for (let column = 0; column + 1 < width; column++) {
      if (!(difference(row, column) * difference(row, column + 1) < 0)) continue
      const y = map.y.values[row]!
      const { at } = currentsAlong(compiled, map.x.parameter, { ...request.change, [map.y.parameter]: y })
      points.push({ x: matchBetween(at, junctions, map.x.values[column]!, map.x.values[column + 1]!).value, y })
    }
  for (let column = 0; column < width; column++)
    for (let row = 0; row < height; row++) {
      const x = map.x.values[column]!
      if (difference(row, column) === 0) points.push({ x, y: map.y.values[row]! })
      if (row + 1 === height || !(difference(row, column) * difference(row + 1, column) < 0)) continue
      const { at } = currentsAlong(compiled, map.y.parameter, { ...request.change, [map.x.parameter]: x })
      points.push({ x, y: matchBetween(at, junctions, map.y.values[row]!, map.y.values[row + 1]!).value })
    }
  return points.sort((p, q) => p.y - q.y || p.x - q.x)
}

function resolveAxis(compiled: CompiledDevice, request: MapAxisRequest, name: string): ResolvedAxis {
  assertFinite(request.from, `${name}.from`)
  assertFinite(request.to, `${name}.to`)
  if (!(request.to > request.from))
    throw new DomainError(`${name}.to`, `${name}.to is ${request.to}; it must be above ${name}.from = ${request.from}.`)
  if (!(Number.isInteger(request.points) && request.points >= 2 && request.points <= 2000))
    throw new DomainError(
      `${name}.points`,
      `${name}.points is ${request.points}; an axis needs a whole number of 2 to 2000.`,
    )
  return {
    key: request.parameter,
    parameter: parseParameter(compiled.device, request.parameter),
    values: equidistant(request.from, request.to, request.points),
  }
}

function emptyMap(compiled: CompiledDevice, x: ResolvedAxis, y: ResolvedAxis, withEfficiency: boolean): WhatIfMap {
  const total = x.values.length * y.values.length
  const measured = measuredState(compiled.device)
  const axisOf = ({ key, parameter, values }: ResolvedAxis): MapAxis => ({
    parameter: key,
    values,
    measuredValue: valueIn(compiled.device, measured, parameter),
  })
  return {
    x: axisOf(x),
    y: axisOf(y),
    currentsMaCm2: compiled.device.junctions.map(() => new Float64Array(total)),
    limitingCurrentMaCm2: new Float64Array(total),
    mismatch: new Float64Array(total),
    efficiency: withEfficiency ? new Float64Array(total) : null,
    optimum: { x: x.values[0]!, y: y.values[0]!, index: 0, value: 0 },
  }
}

function finishPoint(
  compiled: CompiledDevice,
  change: Change,
  map: WhatIfMap,
  x: ResolvedAxis,
  y: ResolvedAxis,
  row: number,
  column: number,
): void {
  const index = row * x.values.length + column
  const { currentsMaCm2 } = map
  let least = currentsMaCm2[0]![index]!
  let most = least
  for (let p = 1; p < currentsMaCm2.length; p++) {
    const current = currentsMaCm2[p]![index]!
    if (current < least) least = current
    if (current > most) most = current
  }
  map.limitingCurrentMaCm2[index] = least
  map.mismatch[index] = most === least ? 0 : least > 0 ? (most - least) / least : Infinity
  if (map.efficiency) {
    const state = stateAt(compiled, change, [
      { axis: x, value: x.values[column]! },
      { axis: y, value: y.values[row]! },
    ])
    const currents = currentsMaCm2.map((current) => current[index]!)
    map.efficiency[index] = quantityOf(compiled, 'efficiency', currents, state)
  }
}

function best(map: WhatIfMap, stride: number): MapOptimum {
  const width = map.x.values.length
  let index = 0
  for (let row = 0; row < map.y.values.length; row += stride)
    for (let column = 0; column < width; column += stride) {
      const here = row * width + column
      if (map.limitingCurrentMaCm2[here]! > map.limitingCurrentMaCm2[index]!) index = here
    }
  return {
    x: map.x.values[index % width]!,
    y: map.y.values[Math.floor(index / width)]!,
    index,
    value: map.limitingCurrentMaCm2[index]!,
  }
}
