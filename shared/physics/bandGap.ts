import { PHOTON_ENERGY_NM_EV } from './constants.js'
import type { Curve } from './curve.js'
import { pointNoise } from './measurement/pointNoise.js'

/**
 * Photovoltaic gap of a junction from its EQE, two ways that are always told apart.
 * `inflectionEv`: photon energy at the maximum of dEQE/dE (Krückemeier et al., Adv. Energy Mater. 10, 1902573 (2020)).
 * `meanEv`: mean of the gap distribution P = dEQE/dE between the energies where P is half of its maximum (Rau et al.,
 * Phys. Rev. Appl. 7, 044016 (2017)); null where the distribution does not fall to half inside the scan.
 */
export interface PhotovoltaicGap {
  readonly inflectionEv: number
  readonly meanEv: number | null
  /** Energies at half of the maximum, eV. */
  readonly windowEv: readonly [number, number] | null
}

export type GapResult = { readonly gap: PhotovoltaicGap } | { readonly gap: null; readonly reason: string }

/** A step counts as the junction's own edge when the EQE before it reaches this share of the scan's maximum. */
const EDGE_SHARE = 0.5
/** A scan whose last point still has this share of its maximum has not seen the edge fall. */
const OPEN_EDGE_SHARE = 0.35
/** Neighbouring points are taken together until noise moves P by less than this share of its maximum… */
const SLOPE_NOISE_SHARE = 0.02
/** …or until they span this energy, eV, less than the width of any real edge. */
const WIDEST_SLOPE_EV = 0.04

/**
 * Gap of the junction's own long-wavelength edge. The edge is the last fall of the EQE through half of its maximum,
 * so neither a lower junction's rise at the edge of the one above nor a small step of leaked light beyond the edge is
 * taken for it. P is the slope between neighbouring points; where the scan is noisy, the least-squares slope of as many
 * points as the noise asks for. The maximum of P is refined by a parabola through it and its neighbours, in photon energy.
 *
 * @param eqe fraction over nm. @returns the gap, or null and the reason. Resolution: a fraction of the local step.
 * Cost O(n log n), for the median of the noise.
 */
export function photovoltaicGap(eqe: Curve): GapResult {
  const { wavelengthNm: x, values: y } = eqe
  let maximum = 0
  for (const value of y) maximum = Math.max(maximum, value)
  if (!(maximum > 0)) return { gap: null, reason: 'The scan shows no response.' }
  if (y[y.length - 1]! > OPEN_EDGE_SHARE * maximum)
    return { gap: null, reason: 'The scan ends before the response has fallen at the long-wavelength edge.' }
  let fall = y.length - 2
  while (fall > 0 && !(y[fall]! >= EDGE_SHARE * maximum && y[fall + 1]! < EDGE_SHARE * maximum)) fall--

  const energyEv = x.map((nm) => PHOTON_ENERGY_NM_EV / nm)
  const noise = pointNoise(eqe)
  const [first, last] = edgeIntervals(y, fall, maximum, 3 * noise)
  const edge = slopesOfEdge(energyEv, y, first, last, noise)
  if (!(edge.slopes[edge.peak]! > 0))
    return { gap: null, reason: 'The response does not fall towards long wavelengths.' }
  const window = halfWidth(edge, first, last + 2)
  return {
    gap: {
      inflectionEv: inflection(edge),
      meanEv: window ? meanOver(window, energyEv, y) : null,
      windowEv: window,
    },
  }
}

/** Wavelength of the gap's inflection, nm. */
export function gapWavelengthNm(gap: PhotovoltaicGap): number {
  return PHOTON_ENERGY_NM_EV / gap.inflectionEv
}

/** Intervals of the falling edge: from where the EQE last stands at 95 % of the plateau before it to where it is gone. */
function edgeIntervals(y: Float64Array, fall: number, maximum: number, noise: number): [number, number] {
  let first = fall
  while (first > 0 && y[first]! < 0.95 * maximum && y[first - 1]! >= y[first]! - noise) first--
  let last = fall
  while (last < y.length - 2 && y[last + 1]! > 0.02 * maximum && y[last + 2]! <= y[last + 1]! + noise) last++
  return [first, last]
}

/** P of the whole scan, each value the slope of `steps + 1` points, and where it is steepest on the edge. */
interface EdgeSlopes {
  readonly steps: number
  readonly slopes: Float64Array
  /** Mean energy of each value's points, eV, descending. */
  readonly centresEv: Float64Array
  readonly peak: number
}

function slopesOfEdge(energyEv: Float64Array, y: Float64Array, first: number, last: number, noise: number): EdgeSlopes {
  for (let steps = 1; ; steps += Math.ceil(steps / 4)) {
    const count = y.length - steps
    const slopes = new Float64Array(count)
    const centresEv = new Float64Array(count)
    let peak = Math.min(first, count - 1)
    for (let i = 0; i < count; i++) {
      const { slope, centre } = lineThrough(energyEv, y, i, i + steps)
      slopes[i] = slope
      centresEv[i] = centre
      if (i >= first && i <= last + 1 - steps && slope > slopes[peak]!) peak = i
    }
    const spanEv = energyEv[peak]! - energyEv[peak + steps]!
    const points = steps + 1
    const slopeNoise = (noise / spanEv) * Math.sqrt((12 * steps) / (points * (points + 1)))
    const isQuiet = slopeNoise <= SLOPE_NOISE_SHARE * slopes[peak]!
    if (isQuiet || spanEv >= WIDEST_SLOPE_EV || steps > last - first) return { steps, slopes, centresEv, peak }
  }
}

/** Least-squares line through the points from `from` to `to`: its slope and the mean of the abscissas. */
function lineThrough(x: Float64Array, y: Float64Array, from: number, to: number): { slope: number; centre: number } {
  const points = to - from + 1
  let centre = 0
  let mean = 0
  for (let i = from; i <= to; i++) {
    centre += x[i]! / points
    mean += y[i]! / points
  }
  let products = 0
  let squares = 0
  for (let i = from; i <= to; i++) {
    products += (x[i]! - centre) * (y[i]! - mean)
    squares += (x[i]! - centre) ** 2
  }
  return { slope: products / squares, centre }
}

/** Energy at which P is largest, eV; the parabola's other points share none with the one at the peak but its ends. */
function inflection({ steps, slopes, centresEv, peak }: EdgeSlopes): number {
  const below = peak + steps
  const above = peak - steps
  if (above < 0 || below >= slopes.length) return centresEv[peak]!
  return parabolaPeak(
    [centresEv[below]!, centresEv[peak]!, centresEv[above]!],
    [slopes[below]!, slopes[peak]!, slopes[above]!],
  )
}

/** Abscissa of the top of the parabola through three points with ascending x; the middle x where it is no top. */
function parabolaPeak(x: [number, number, number], y: [number, number, number]): number {
  const d1 = (y[1] - y[0]) / (x[1] - x[0])
  const d2 = (y[2] - y[1]) / (x[2] - x[1])
  const curvature = (d2 - d1) / (x[2] - x[0])
  if (!(curvature < 0)) return x[1]
  const top = (x[0] + x[1]) / 2 - d1 / (2 * curvature)
  return Math.min(Math.max(top, x[0]), x[2])
}

/** Energies, ascending, at which P falls to half of its maximum on either side; null when one lies outside the edge. */
function halfWidth({ slopes, centresEv, peak }: EdgeSlopes, first: number, last: number): [number, number] | null {
  const half = slopes[peak]! / 2
  const end = Math.min(last, slopes.length - 1)
  const crossing = (inner: number, outer: number): number => {
    const t = (slopes[inner]! - half) / (slopes[inner]! - slopes[outer]!)
    return centresEv[inner]! + t * (centresEv[outer]! - centresEv[inner]!)
  }
  let low = peak
  while (low < end && slopes[low + 1]! > half) low++
  let high = peak
  while (high >= first && high > 0 && slopes[high - 1]! > half) high--
  if (low >= end || high <= 0) return null
  return [crossing(low, low + 1), crossing(high, high - 1)]
}

/**
 * `∫ E P dE / ∫ P dE` with the EQE linear in energy between its points, so that P is constant on each interval and the
 * integrals over the window are exact sums.
 */
function meanOver([low, high]: readonly [number, number], energyEv: Float64Array, y: Float64Array): number | null {
  let weight = 0
  let sum = 0
  for (let i = 0; i + 1 < y.length; i++) {
    const to = Math.min(energyEv[i]!, high)
    const from = Math.max(energyEv[i + 1]!, low)
    if (!(to > from)) continue
    const p = (y[i]! - y[i + 1]!) / (energyEv[i]! - energyEv[i + 1]!)
    weight += p * (to - from)
    sum += (p * (to * to - from * from)) / 2
  }
  return weight > 0 ? sum / weight : null
}
