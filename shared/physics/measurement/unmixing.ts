import { assertCurve, valueAt, type Curve } from '../curve.js'
import { assertWithin, DomainError } from '../errors.js'
import { nonNegativeLeastSquares } from '../numerics/nonNegativeLeastSquares.js'
import { solveLinear } from '../numerics/linearSolve.js'
import { foreignShare } from './exclusiveBand.js'
import { pointNoise } from './pointNoise.js'

/** How much of one other junction a scan holds. */
export interface MixingWeight {
  /** Place of the other junction, 0 = sunward. */
  readonly index: number
  /** w_j, zero or above. */
  readonly weight: number
  readonly uncertainty: number
  /** Where that junction alone responds; null when there is no such band and the weight was taken as zero. */
  readonly bandNm: readonly [number, number] | null
}

export interface Unmixed {
  /** EQE_k as it would be without the others, a corrected copy on the scan's own wavelengths. */
  readonly corrected: Curve
  readonly weights: MixingWeight[]
  /** Standard uncertainty that the correction adds at each point, from the weights and the noise of the other scans. */
  readonly addedUncertainty: Float64Array
  /** 1 − Σ w_j, less the resistive share: what the own response was divided by. */
  readonly ownShare: number
}

export interface UnmixingOptions {
  /**
   * `R_s/(Σ r + R_s)` of each scan: the share of every signal that falls on the series and load resistance, 1 − Σ w of the
   * small-signal model. It scales the whole scan, so that no scan can tell it; it matters when the junction under test
   * is shunted to some tens of Ω cm². Default 0.
   */
  readonly resistiveShares?: readonly number[]
}

const ROUNDS = 25

/**
 * Takes the other junctions' response out of every scan of a device:
 * `EQE_k = (EQE_app,k − Σ_{j≠k} w_j EQE_j)/(1 − Σ_{j≠k} w_j)`. The weights come from non-negative least squares on the
 * bands where one other junction alone responds. The EQE_j are the corrected ones, so that scans which leak into each
 * other are solved together, by repetition until no weight moves.
 * Sources: G. Siefer, C. Baur, A. W. Bett, 35th IEEE PVSC (2010) (both parts of the correction); C. L. Lawson,
 * R. J. Hanson, Solving Least Squares Problems (1974).
 * @param scans apparent EQE of every junction from the sunward side, at least two.
 * @throws DomainError for fewer than two scans, a scan without response, or weights of one scan that reach 1.
 * Cost: some rounds over n points and a small least-squares fit each.
 */
export function unmixScans(scans: readonly Curve[], options: UnmixingOptions = {}): Unmixed[] {
  if (scans.length < 2)
    throw new DomainError(
      'scans',
      `There are ${scans.length} scans; unmixing needs a scan of every junction, two or more.`,
    )
  const lost = options.resistiveShares ?? scans.map(() => 0)
  scans.forEach((scan, i) => {
    assertWithin(lost[i] ?? NaN, 0, 0.5, `resistiveShares[${i}]`)
    assertCurve(scan, `scans[${i}]`)
    if (!scan.values.some((y) => y > 0)) throw new DomainError(`scans[${i}]`, `scans[${i}] has no response above zero.`)
  })
  const bands = scans.map((scan, k) => bandsOf(scans, scan, k))
  let current: readonly Curve[] = scans
  let weights: number[][] = scans.map(() => scans.map(() => 0))
  for (let round = 0; round < ROUNDS; round++) {
    const next = scans.map((scan, k) => fitWeights(scan, k, current, bands[k]!, lost[k]!))
    const moved = Math.max(...next.flatMap((row, k) => row.map((w, j) => Math.abs(w - weights[k]![j]!))))
    weights = next
    current = solveMixture(scans, weights, lost)
    if (moved < 1e-12) break
  }
  return scans.map((scan, k) => describe(scan, k, scans, current, weights[k]!, bands[k]!, lost[k]!))
}

/**
 * Unmixes one scan with given weights: the formula above, for weights that a person has changed.
 * @param weights w_j of each other scan, each zero or above, in the order of `others`.
 * @throws DomainError when a weight is negative or they sum to 1 or more.
 */
export function unmixWith(scan: Curve, others: readonly Curve[], weights: readonly number[]): Curve {
  assertCurve(scan, 'scan')
  if (weights.length !== others.length)
    throw new DomainError('weights', `There are ${weights.length} weights for ${others.length} other scans.`)
  weights.forEach((w, j) => {
    if (!(w >= 0)) throw new DomainError('weights', `weights[${j}] is ${w}; it must be zero or above.`)
  })
  const share = ownShareOf(weights)
  const values = scan.wavelengthNm.map((nm, i) => {
    const foreign = others.reduce((sum, other, j) => sum + weights[j]! * valueAt(other, nm), 0)
    return (scan.values[i]! - foreign) / share
  })
  return { wavelengthNm: scan.wavelengthNm, values }
}

type Band = {
  readonly index: number
  readonly bandNm: readonly [number, number]
  readonly wavelengthNm: readonly number[]
}

function bandsOf(scans: readonly Curve[], scan: Curve, k: number): Band[] {
  return scans.flatMap((other, j) => {
    if (j === k) return []
    const rest = scans.filter((_, l) => l !== j && l !== k)
    const found = foreignShare(scan, other, rest)
    return found ? [{ index: j, bandNm: found.bandNm, wavelengthNm: found.wavelengthNm }] : []
  })
}

/** Weights of the corrected curves in scan k: its own corrected curve counts too, with 1 − Σ w on the same bands. */
function fitWeights(scan: Curve, k: number, current: readonly Curve[], bands: readonly Band[], lost: number): number[] {
  const weights = current.map(() => 0)
  if (bands.length === 0) return weights
  const rows: number[][] = []
  const right: number[] = []
  for (const { wavelengthNm } of bands)
    for (const nm of wavelengthNm) {
      rows.push(bands.map((b) => valueAt(current[b.index]!, nm)))
      right.push(valueAt(scan, nm))
    }
  const { x } = nonNegativeLeastSquares(rows, right)
  bands.forEach((b, i) => (weights[b.index] = x[i]!))
  ownShareOf(weights, lost, k)
  return weights
}

/** The true curves from the apparent ones: at each wavelength of a scan the small system app = W true is solved. */
function solveMixture(
  scans: readonly Curve[],
  weights: readonly (readonly number[])[],
  lost: readonly number[],
): Curve[] {
  const matrix = weights.map((row, k) => row.map((w, j) => (j === k ? ownShareOf(row, lost[k]!, k) : w)))
  return scans.map((scan, k) => ({
    wavelengthNm: scan.wavelengthNm,
    values: scan.wavelengthNm.map((nm, i) => {
      const apparent = scans.map((other, j) => (j === k ? scan.values[i]! : valueAt(other, nm)))
      return solveLinear(matrix, apparent)[k]!
    }),
  }))
}

function describe(
  scan: Curve,
  k: number,
  scans: readonly Curve[],
  current: readonly Curve[],
  weights: readonly number[],
  bands: readonly Band[],
  lost: number,
): Unmixed {
  const ownShare = ownShareOf(weights, lost, k)
  const noise = scans.map(pointNoise)
  const list = scans.flatMap((_, j): MixingWeight[] => {
    if (j === k) return []
    const band = bands.find((b) => b.index === j)
    if (!band) return [{ index: j, weight: 0, uncertainty: 0, bandNm: null }]
    const squared = band.wavelengthNm.reduce((sum, nm) => sum + valueAt(current[j]!, nm) ** 2, 0)
    const uncertainty = Math.hypot(noise[k]!, weights[j]! * noise[j]!) / Math.sqrt(Math.max(squared, 1e-12))
    return [{ index: j, weight: weights[j]!, uncertainty, bandNm: band.bandNm }]
  })
  const corrected = current[k]!
  const addedUncertainty = scan.wavelengthNm.map((nm, i) =>
    Math.hypot(
      ...list.flatMap((w) => [
        ((corrected.values[i]! - valueAt(current[w.index]!, nm)) * w.uncertainty) / ownShare,
        (w.weight * noise[w.index]!) / ownShare,
      ]),
    ),
  )
  return { corrected, weights: list, addedUncertainty, ownShare }
}

function ownShareOf(weights: readonly number[], lost = 0, k?: number): number {
  const sum = weights.reduce((total, w) => total + w, lost)
  if (!(sum < 1))
    throw new DomainError(
      k === undefined ? 'weights' : `scans[${k}]`,
      `The other junctions’ weights sum to ${sum.toFixed(3)}; they must stay below 1 for an own response to be left.`,
    )
  return 1 - sum
}
