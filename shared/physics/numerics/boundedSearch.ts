import { assertFinite, DomainError } from '../errors.js'

/** The lowest and highest value that one variable may take, in that variable's own unit. */
export interface Bound {
  readonly low: number
  readonly high: number
}

export interface SearchStep {
  readonly point: readonly number[]
  readonly value: number
}

export interface BoundedMinimum {
  readonly point: readonly number[]
  readonly value: number
  readonly evaluations: number
  /** Each point that was better than all before it, in the order found. */
  readonly path: readonly SearchStep[]
}

export interface BoundedSearchOptions {
  /** A point to look at first; the centre of the bounds otherwise. */
  readonly start?: readonly number[]
  /** Simplex searches, each from one of the best points of the first look. Default 5. */
  readonly starts?: number
  /** Points of the first look. Default 60 per variable. */
  readonly samples?: number
  /** A search ends when its simplex is smaller than this share of the bounds. Default 1e-9. */
  readonly tolerance?: number
}

const PRIMES = [2, 3, 5, 7, 11, 13, 17, 19, 23, 29, 31, 37]

/**
 * Least value of `f` inside a box: a first look at the start, the corners' neighbourhood and a Halton sequence, then
 * Nelder–Mead searches with the box as a wall from the best points, each begun again from its result until that no
 * longer helps. No derivatives, no random numbers: the same input gives the same result to the last bit.
 * Source: J. A. Nelder, R. Mead, Comput. J. 7 (1965) 308; J. H. Halton, Numer. Math. 2 (1960) 84.
 * @param f takes the variables in the order of `bounds`; it may have kinks (a smallest of several currents); +Infinity
 * marks a point that a constraint forbids.
 * @throws DomainError for no or more than twelve variables, bounds out of order, a start outside the bounds, or NaN
 * from `f`.
 * Cost: some hundred evaluations a variable; O(variables²) beside them.
 */
export function minimiseInBounds(
  f: (point: readonly number[]) => number,
  bounds: readonly Bound[],
  options: BoundedSearchOptions = {},
): BoundedMinimum {
  const variables = bounds.length
  if (variables < 1 || variables > PRIMES.length)
    throw new DomainError('bounds', `bounds has ${variables} variables; it must have 1 to ${PRIMES.length}.`)
  bounds.forEach((bound, i) => {
    assertFinite(bound.low, `bounds[${i}].low`)
    assertFinite(bound.high, `bounds[${i}].high`)
    if (!(bound.high > bound.low))
      throw new DomainError(
        `bounds[${i}]`,
        `bounds[${i}] runs from ${bound.low} to ${bound.high}; the upper must be above.`,
      )
  })
  const start = options.start ?? bounds.map((b) => 0.5 * (b.low + b.high))
  if (start.length !== variables)
    throw new DomainError('start', `start has ${start.length} values; bounds has ${variables}.`)
  start.forEach((x, i) => {
    if (!(x >= bounds[i]!.low && x <= bounds[i]!.high))
      throw new DomainError(
        'start',
        `start[${i}] is ${x}; it must lie between ${bounds[i]!.low} and ${bounds[i]!.high}.`,
      )
  })

  const path: SearchStep[] = []
  let evaluations = 0
  // The search runs on the unit cube.
  const evaluate = (unit: readonly number[]): number => {
    const point = unit.map((u, i) => fromUnit(u, bounds[i]!))
    const value = f(point)
    evaluations++
    if (Number.isNaN(value)) throw new DomainError('f', `f(${point.join(', ')}) is not a number.`)
    if (value < (path.at(-1)?.value ?? Infinity)) path.push({ point, value })
    return value
  }

  const first = firstLook(
    start.map((x, i) => (x - bounds[i]!.low) / (bounds[i]!.high - bounds[i]!.low)),
    options.samples,
  )
  const looked = first.map((unit) => ({ unit, value: evaluate(unit) })).sort((a, b) => a.value - b.value)
  const tolerance = options.tolerance ?? 1e-9
  for (const { unit, value } of looked.slice(0, options.starts ?? 5)) {
    let best: { unit: readonly number[]; value: number } = { unit, value }
    for (let round = 0, size = 0.15; round < 8; round++, size *= round % 2 === 0 ? 0.35 : -0.7) {
      const found = nelderMead(evaluate, best.unit, best.value, size, tolerance)
      const gained = best.value - found.value
      if (found.value < best.value) best = found
      if (round >= 3 && !(gained > 1e-12 * Math.abs(best.value))) break
    }
  }
  const best = path.at(-1)
  if (!best) throw new DomainError('f', 'No point inside the bounds meets the constraints.')
  return { point: best.point, value: best.value, evaluations, path }
}

function fromUnit(unit: number, bound: Bound): number {
  if (unit <= 0) return bound.low
  if (unit >= 1) return bound.high
  return bound.low + unit * (bound.high - bound.low)
}

function firstLook(start: readonly number[], samples = 60 * start.length): number[][] {
  const points = [start.slice()]
  if (start.length <= 4)
    for (let corner = 0; corner < 1 << start.length; corner++) points.push(start.map((_, i) => (corner >> i) & 1))
  for (let n = 1; n <= samples; n++) points.push(start.map((_, i) => radicalInverse(n, PRIMES[i]!)))
  return points
}

function radicalInverse(index: number, base: number): number {
  let result = 0
  let weight = 1 / base
  for (let n = index; n > 0; n = Math.floor(n / base), weight /= base) result += (n % base) * weight
  return result
}

/** One simplex search on the unit cube; points outside it are moved to its wall. */
function nelderMead(
  f: (unit: readonly number[]) => number,
  start: readonly number[],
  startValue: number,
  size: number,
  tolerance: number,
): { unit: readonly number[]; value: number } {
  const n = start.length
  const inside = (x: number): number => Math.min(1, Math.max(0, x))
  const simplex = [{ unit: start, value: startValue }]
  for (let i = 0; i < n; i++) {
    const step = start[i]! + size > 1 || start[i]! + size < 0 ? -size : size
    const unit = start.map((x, j) => (j === i ? inside(x + step) : x))
    simplex.push({ unit, value: f(unit) })
  }
  const along = (centre: readonly number[], worst: readonly number[], t: number) => {
    const unit = centre.map((c, j) => inside(c + t * (c - worst[j]!)))
    return { unit, value: f(unit) }
  }
  for (let iteration = 0; iteration < 120 * n; iteration++) {
    simplex.sort((a, b) => a.value - b.value)
    const best = simplex[0]!
    const worst = simplex[n]!
    const spread = Math.max(...simplex.map((s) => Math.max(...s.unit.map((x, j) => Math.abs(x - best.unit[j]!)))))
    if (spread < tolerance) break
    const centre = start.map((_, j) => simplex.slice(0, n).reduce((sum, s) => sum + s.unit[j]!, 0) / n)
    const reflected = along(centre, worst.unit, 1)
    if (reflected.value < best.value) {
      const expanded = along(centre, worst.unit, 2)
      simplex[n] = expanded.value < reflected.value ? expanded : reflected
    } else if (reflected.value < simplex[n - 1]!.value) {
      simplex[n] = reflected
    } else {
      const contracted = along(centre, worst.unit, reflected.value < worst.value ? 0.5 : -0.5)
      if (contracted.value < Math.min(reflected.value, worst.value)) simplex[n] = contracted
      else
        for (let i = 1; i <= n; i++) {
          const unit = simplex[i]!.unit.map((x, j) => best.unit[j]! + 0.5 * (x - best.unit[j]!))
          simplex[i] = { unit, value: f(unit) }
        }
    }
  }
  simplex.sort((a, b) => a.value - b.value)
  return simplex[0]!
}
