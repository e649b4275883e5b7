import { indexAtOrBelow, type Curve } from './curve.js'

/**
 * `∫ a b dλ` of two piecewise linear curves, exact on the union of their grids: on an interval of width h with end
 * values a0, a1 and b0, b1 it is `h/6 · (2 a0 b0 + a0 b1 + a1 b0 + 2 a1 b1)`. Each curve counts as zero outside its own
 * range, so the result does not depend on a grid that somebody chose.
 *
 * @param fromNm @param toNm limits in nm; the whole overlap unless given.
 * @returns unit of a · unit of b · nm; 0 where nothing overlaps. Inputs are taken as checked (`makeCurve`).
 * Cost O(n + m), nothing allocated.
 */
export function integrateProduct(a: Curve, b: Curve, fromNm = -Infinity, toNm = Infinity): number {
  return walkProduct(a, b, fromNm, toNm, null)
}

/**
 * The running integral of `integrateProduct` at every point of the union grid, from the same pass.
 * @returns wavelengths of the union grid in nm and the integral up to each; two points of zero without an overlap.
 */
export function cumulativeProduct(a: Curve, b: Curve, fromNm = -Infinity, toNm = Infinity): Curve {
  const running: RunningIntegral = { wavelengthNm: [], values: [] }
  walkProduct(a, b, fromNm, toNm, running)
  if (running.values.length === 0)
    return { wavelengthNm: Float64Array.of(a.wavelengthNm[0]!, a.wavelengthNm.at(-1)!), values: new Float64Array(2) }
  return { wavelengthNm: Float64Array.from(running.wavelengthNm), values: Float64Array.from(running.values) }
}

interface RunningIntegral {
  readonly wavelengthNm: number[]
  readonly values: number[]
}

/** The one pass over the union grid. `running` is filled with every point of it, unless null; empty without overlap. */
function walkProduct(a: Curve, b: Curve, fromNm: number, toNm: number, running: RunningIntegral | null): number {
  const { wavelengthNm: ax, values: ay } = a
  const { wavelengthNm: bx, values: by } = b
  const lastA = ax.length - 2
  const lastB = bx.length - 2
  const low = Math.max(ax[0]!, bx[0]!, fromNm)
  const high = Math.min(ax[lastA + 1]!, bx[lastB + 1]!, toNm)
  if (!(low < high)) return 0
  let i = Math.min(indexAtOrBelow(ax, low), lastA)
  let j = Math.min(indexAtOrBelow(bx, low), lastB)
  let slopeA = slopeOf(ax, ay, i)
  let slopeB = slopeOf(bx, by, j)
  let x0 = low
  let a0 = ay[i]! + slopeA * (low - ax[i]!)
  let b0 = by[j]! + slopeB * (low - bx[j]!)
  let sum = 0
  record(running, low, 0)
  while (x0 < high) {
    const endA = ax[i + 1]!
    const endB = bx[j + 1]!
    const end = endA < endB ? endA : endB
    const x1 = end < high ? end : high
    const a1 = x1 === endA ? ay[i + 1]! : ay[i]! + slopeA * (x1 - ax[i]!)
    const b1 = x1 === endB ? by[j + 1]! : by[j]! + slopeB * (x1 - bx[j]!)
    sum += ((x1 - x0) / 6) * (a0 * (2 * b0 + b1) + a1 * (b0 + 2 * b1))
    record(running, x1, sum)
    if (x1 === endA && i < lastA) slopeA = slopeOf(ax, ay, ++i)
    if (x1 === endB && j < lastB) slopeB = slopeOf(bx, by, ++j)
    x0 = x1
    a0 = a1
    b0 = b1
  }
  return sum
}

function slopeOf(x: Float64Array, y: Float64Array, i: number): number {
  return (y[i + 1]! - y[i]!) / (x[i + 1]! - x[i]!)
}

function record(running: RunningIntegral | null, wavelengthNm: number, integral: number): void {
  if (!running) return
  running.wavelengthNm.push(wavelengthNm)
  running.values.push(integral)
}
