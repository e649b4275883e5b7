import { assertCurve } from '../curve.js'
import type { Curve } from '../curve.js'
import { DomainError } from '../errors.js'

/** What repeated scans of the same junction say. */
export interface RepeatNoise {
  /** Mean of the repeats, EQE. */
  readonly mean: Curve
  /** Standard uncertainty of the mean at each point (k = 1, EQE): noise only, the drift between repeats taken out. */
  readonly pointUncertainty: Float64Array
  /** Degrees of freedom of each point's estimate: repeats − 1. */
  readonly pointDegreesOfFreedom: number
  /** Noise of a single scan over all points, rms, EQE. */
  readonly singleScanRms: number
  /** Standard deviation of the repeats' common factor, percent: drift of lamp and gain from scan to scan. */
  readonly driftPercent: number
  /** Standard uncertainty that this drift leaves on the mean, percent: driftPercent/√repeats. */
  readonly driftOfMeanPercent: number
}

/**
 * Type A evaluation (JCGM 100:2008, 4.2) of n ≥ 2 repeat scans on one grid. Each scan is first fitted to the mean by a
 * common factor `a_r = Σ E_r M/Σ M²`, whose scatter is the drift; what is left, `E_r/a_r − M`, is the noise of each
 * point, `s_k² = Σ_r(…)²/(n − 1)`, and `s_k/√n` that of the mean. With few repeats one point's s is rough (n = 2: one
 * degree of freedom), yet the current sums over all points and so knows its noise well.
 *
 * @param repeats n ≥ 2 curves, EQE, on the same wavelengths.
 * @throws DomainError for fewer than two, for different wavelengths (naming the scan and the wavelength), or a scan
 * whose values do not resemble the mean (factor not above zero). Cost O(n · points).
 */
export function repeatNoise(repeats: readonly Curve[]): RepeatNoise {
  if (repeats.length < 2)
    throw new DomainError(
      'repeats',
      `There is ${repeats.length === 1 ? 'one scan' : 'no scan'}; noise needs two or more repeats.`,
    )
  repeats.forEach((repeat, r) => assertCurve(repeat, `repeats[${r}]`))
  const { wavelengthNm } = repeats[0]!
  repeats.forEach((repeat, r) => assertSameGrid(repeat, r, wavelengthNm))
  const count = repeats.length
  const mean = wavelengthNm.map((_, k) => repeats.reduce((sum, repeat) => sum + repeat.values[k]!, 0) / count)
  const meanSquares = mean.reduce((sum, m) => sum + m * m, 0)
  const factors = repeats.map((repeat, r) => {
    const factor = repeat.values.reduce((sum, value, k) => sum + value * mean[k]!, 0) / meanSquares
    if (!(factor > 0))
      throw new DomainError(`repeats[${r}]`, `Repeat ${r + 1} does not resemble the others; is it the same junction?`)
    return factor
  })
  const variances = mean.map(
    (m, k) => repeats.reduce((sum, repeat, r) => sum + (repeat.values[k]! / factors[r]! - m) ** 2, 0) / (count - 1),
  )
  const drift = Math.sqrt(factors.reduce((sum, factor) => sum + (factor - 1) ** 2, 0) / (count - 1))
  return {
    mean: { wavelengthNm: wavelengthNm.slice(), values: mean },
    pointUncertainty: variances.map((variance) => Math.sqrt(variance / count)),
    pointDegreesOfFreedom: count - 1,
    singleScanRms: Math.sqrt(variances.reduce((sum, variance) => sum + variance, 0) / variances.length),
    driftPercent: 100 * drift,
    driftOfMeanPercent: (100 * drift) / Math.sqrt(count),
  }
}

function assertSameGrid(repeat: Curve, index: number, wavelengthNm: Float64Array): void {
  if (repeat.wavelengthNm.length !== wavelengthNm.length)
    throw new DomainError(
      `repeats[${index}]`,
      `Repeat ${index + 1} has ${repeat.wavelengthNm.length} points and the first ${wavelengthNm.length}; repeats need the same wavelengths.`,
    )
  const other = repeat.wavelengthNm.findIndex((nm, k) => Math.abs(nm - wavelengthNm[k]!) > 1e-6)
  if (other >= 0)
    throw new DomainError(
      `repeats[${index}]`,
      `Repeat ${index + 1} has ${repeat.wavelengthNm[other]} nm where the first has ${wavelengthNm[other]} nm; repeats need the same wavelengths.`,
    )
}
