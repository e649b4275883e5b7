import { PHOTON_ENERGY_NM_EV } from './constants.js'
import type { Curve } from './curve.js'

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

/**
 * Gap of the junction's own long-wavelength edge. The edge is the last fall of the EQE through half of its maximum,
 * so neither a lower junction's rise at the edge of the one above nor a small step of leaked light beyond the edge is
 * taken for it. P is known between neighbouring points; its maximum is refined by a parabola through the three highest
 * neighbours at interval centres, in photon energy.
 *
 * @param eqe fraction over nm. @returns the gap, or null and the reason. Resolution: a fraction of the local step.
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

  // P on the intervals, by photon energy; walk out from the half-maximum crossing to the steepest interval nearby.
  const energyEv = (i: number) => PHOTON_ENERGY_NM_EV / x[i]!
  const slope = (i: number) => (y[i]! - y[i + 1]!) / (energyEv(i) - energyEv(i + 1))
  const centre = (i: number) => (energyEv(i) + energyEv(i + 1)) / 2
  const lastInterval = x.length - 2
  const [first, last] = edgeIntervals(y, fall, maximum)
  let peak = fall
  for (let i = first; i <= last; i++) if (slope(i) > slope(peak)) peak = i
  if (!(slope(peak) > 0)) return { gap: null, reason: 'The response does not fall towards long wavelengths.' }

  const inflectionEv =
    peak > 0 && peak < lastInterval
      ? parabolaPeak(
          [centre(peak + 1), centre(peak), centre(peak - 1)],
          [slope(peak + 1), slope(peak), slope(peak - 1)],
        )
      : centre(peak)
  const window = halfWidth(peak, first, Math.min(last + 2, lastInterval), slope, centre)
  return { gap: { inflectionEv, meanEv: window ? meanOver(window, energyEv, y, x.length) : null, windowEv: window } }
}

/** Wavelength of the gap's inflection, nm. */
export function gapWavelengthNm(gap: PhotovoltaicGap): number {
  return PHOTON_ENERGY_NM_EV / gap.inflectionEv
}

/** Intervals of the falling edge: from where the EQE last stands at 95 % of the plateau before it to where it is gone. */
function edgeIntervals(y: Float64Array, fall: number, maximum: number): [number, number] {
  let first = fall
  while (first > 0 && y[first]! < 0.95 * maximum && y[first - 1]! >= y[first]!) first--
  let last = fall
  while (last < y.length - 2 && y[last + 1]! > 0.02 * maximum && y[last + 2]! <= y[last + 1]!) last++
  return [first, last]
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
function halfWidth(
  peak: number,
  first: number,
  last: number,
  slope: (i: number) => number,
  centre: (i: number) => number,
): [number, number] | null {
  const half = slope(peak) / 2
  const crossing = (inner: number, outer: number) => {
    const t = (slope(inner) - half) / (slope(inner) - slope(outer))
    return centre(inner) + t * (centre(outer) - centre(inner))
  }
  let low = peak
  while (low < last && slope(low + 1) > half) low++
  let high = peak
  while (high > first - 1 && high > 0 && slope(high - 1) > half) high--
  if (low >= last || high <= 0) return null
  return [crossing(low, low + 1), crossing(high, high - 1)]
}

/**
 * `∫ E P dE / ∫ P dE` with the EQE linear in energy between its points, so that P is constant on each interval and the
 * integrals over the window are exact sums.
 */
function meanOver(
  [low, high]: [number, number],
  energyEv: (i: number) => number,
  y: Float64Array,
  points: number,
): number | null {
  let weight = 0
  let sum = 0
  for (let i = 0; i + 1 < points; i++) {
    const to = Math.min(energyEv(i), high)
    const from = Math.max(energyEv(i + 1), low)
    if (!(to > from)) continue
    const p = (y[i]! - y[i + 1]!) / (energyEv(i) - energyEv(i + 1))
    weight += p * (to - from)
    sum += (p * (to * to - from * from)) / 2
  }
  return weight > 0 ? sum / weight : null
}
