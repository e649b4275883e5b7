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
  let sum = 0
  walkProduct(a, b, fromNm, toNm, (_x, area) => {
    sum += area
  })
  return sum
}

/**
 * The running integral of `integrateProduct` at every point of the union grid, from the same pass.
 * @returns wavelengths of the union grid in nm and the integral up to each; two points of zero without an overlap.
 */
export function cumulativeProduct(a: Curve, b: Curve, fromNm = -Infinity, toNm = Infinity): Curve {
  const wavelengthNm: number[] = []
  const values: number[] = []
  let sum = 0
  const start = walkProduct(a, b, fromNm, toNm, (x, area) => {
    sum += area
    wavelengthNm.push(x)
    values.push(sum)
  })
  if (start === null)
    return { wavelengthNm: Float64Array.of(a.wavelengthNm[0]!, a.wavelengthNm.at(-1)!), values: new Float64Array(2) }
  return { wavelengthNm: Float64Array.of(start, ...wavelengthNm), values: Float64Array.of(0, ...values) }
}

/** Calls `visit` with the end and the area of every interval of the union grid; gives its start, null if empty. */
function walkProduct(
  a: Curve,
  b: Curve,
  fromNm: number,
  toNm: number,
  visit: (endNm: number, area: number) => void,
): number | null {
  const ax = a.wavelengthNm
  const bx = b.wavelengthNm
  const low = Math.max(ax[0]!, bx[0]!, fromNm)
  const high = Math.min(ax[ax.length - 1]!, bx[bx.length - 1]!, toNm)
  if (!(low < high)) return null
  let i = Math.min(indexAtOrBelow(ax, low), ax.length - 2)
  let j = Math.min(indexAtOrBelow(bx, low), bx.length - 2)
  let x0 = low
  let a0 = onSegment(a, i, x0)
  let b0 = onSegment(b, j, x0)
  while (x0 < high) {
    const x1 = Math.min(ax[i + 1]!, bx[j + 1]!, high)
    const a1 = onSegment(a, i, x1)
    const b1 = onSegment(b, j, x1)
    visit(x1, ((x1 - x0) / 6) * (2 * a0 * b0 + a0 * b1 + a1 * b0 + 2 * a1 * b1))
    if (x1 === ax[i + 1] && i < ax.length - 2) i++
    if (x1 === bx[j + 1] && j < bx.length - 2) j++
    x0 = x1
    a0 = a1
    b0 = b1
  }
  return low
}

function onSegment(curve: Curve, i: number, x: number): number {
  const x0 = curve.wavelengthNm[i]!
  const x1 = curve.wavelengthNm[i + 1]!
  const y0 = curve.values[i]!
  if (x === x0) return y0
  const y1 = curve.values[i + 1]!
  return x === x1 ? y1 : y0 + ((x - x0) / (x1 - x0)) * (y1 - y0)
}
