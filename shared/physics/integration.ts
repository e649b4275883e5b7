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

/**
 * The one pass over the union grid: interval by interval of the curve with fewer points, and inside it over the whole
 * intervals of the other, which need no interpolation of their own. `running` is filled with every point of the union,
 * unless null; empty without overlap. The sixth of the formula is taken at the end.
 */
function walkProduct(a: Curve, b: Curve, fromNm: number, toNm: number, running: RunningIntegral | null): number {
  const [coarse, fine] = a.values.length <= b.values.length ? [a, b] : [b, a]
  const { wavelengthNm: cx, values: cy } = coarse
  const { wavelengthNm: fx, values: fy } = fine
  const lastC = cx.length - 2
  const lastF = fx.length - 2
  const low = Math.max(cx[0]!, fx[0]!, fromNm)
  const high = Math.min(cx[lastC + 1]!, fx[lastF + 1]!, toNm)
  if (!(low < high)) return 0
  let i = Math.min(indexAtOrBelow(cx, low), lastC)
  let j = Math.min(indexAtOrBelow(fx, low), lastF)
  let x0 = low
  let c0 = cy[i]! + slopeOf(cx, cy, i) * (low - cx[i]!)
  let f0 = fy[j]! + slopeOf(fx, fy, j) * (low - fx[j]!)
  let sixfold = 0
  record(running, low, 0)
  for (; x0 < high; i++) {
    const startC = cx[i]!
    const startValueC = cy[i]!
    const endC = cx[i + 1]!
    const end = endC < high ? endC : high
    const slopeC = slopeOf(cx, cy, i)
    for (let x1 = fx[j + 1]!; x1 < end; x1 = fx[++j + 1]!) {
      const c1 = startValueC + slopeC * (x1 - startC)
      const f1 = fy[j + 1]!
      sixfold += (x1 - x0) * (c0 * (2 * f0 + f1) + c1 * (f0 + 2 * f1))
      record(running, x1, sixfold / 6)
      x0 = x1
      c0 = c1
      f0 = f1
    }
    const c1 = end === endC ? cy[i + 1]! : startValueC + slopeC * (end - startC)
    const f1 = end === fx[j + 1]! ? fy[j + 1]! : fy[j]! + slopeOf(fx, fy, j) * (end - fx[j]!)
    sixfold += (end - x0) * (c0 * (2 * f0 + f1) + c1 * (f0 + 2 * f1))
    record(running, end, sixfold / 6)
    if (end === fx[j + 1]! && j < lastF) j++
    x0 = end
    c0 = c1
    f0 = f1
  }
  return sixfold / 6
}

function slopeOf(x: Float64Array, y: Float64Array, i: number): number {
  return (y[i + 1]! - y[i]!) / (x[i + 1]! - x[i]!)
}

function record(running: RunningIntegral | null, wavelengthNm: number, integral: number): void {
  if (!running) return
  running.wavelengthNm.push(wavelengthNm)
  running.values.push(integral)
}
