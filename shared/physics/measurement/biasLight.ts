import { shortCircuitCurrentDensity } from '../currents.js'
import { assertCurve, makeCurve, type Curve } from '../curve.js'
import { assertNotNegative, assertPositive, DomainError } from '../errors.js'
import { makeSpectrum } from '../spectrum.js'

/** One bias lamp at the sample plane: a band by centre and width, or an own spectrum. */
export type BiasSource = BandSource | SpectrumSource

/** A Gaussian band over wavelength, as an LED or a filtered lamp gives (common practice). */
export interface BandSource {
  readonly name?: string
  readonly centreNm: number
  /** Full width at half maximum. */
  readonly fwhmNm: number
  /** Total irradiance at the sample plane, W m⁻². */
  readonly irradianceWM2: number
}

export interface SpectrumSource {
  readonly name?: string
  /** Spectral irradiance, W m⁻² nm⁻¹ (or any relative unit when `irradianceWM2` is given). */
  readonly spectrum: Curve
  /** Scales the spectrum to this total irradiance, W m⁻². */
  readonly irradianceWM2?: number
}

const SIGMAS = 4
const POINTS_PER_SIGMA = 8

/**
 * Spectral irradiance of a source at the sample plane, W m⁻² nm⁻¹. A band is drawn to four standard deviations with
 * eight points each and scaled so that its integral is the stated irradiance exactly.
 * @throws DomainError for a width, centre or irradiance outside its domain, or a band that reaches zero wavelength.
 */
export function sourceSpectrum(source: BiasSource): Curve {
  if ('spectrum' in source) {
    assertCurve(source.spectrum, 'source.spectrum')
    if (source.irradianceWM2 === undefined) return source.spectrum
    assertNotNegative(source.irradianceWM2, 'source.irradianceWM2')
    return scaledTo(source.spectrum, source.irradianceWM2)
  }
  assertPositive(source.centreNm, 'source.centreNm')
  assertPositive(source.fwhmNm, 'source.fwhmNm')
  assertNotNegative(source.irradianceWM2, 'source.irradianceWM2')
  const sigma = source.fwhmNm / (2 * Math.sqrt(2 * Math.LN2))
  if (!(source.centreNm > SIGMAS * sigma))
    throw new DomainError(
      'source.fwhmNm',
      `source.fwhmNm is ${source.fwhmNm} at a centre of ${source.centreNm} nm; the band would reach zero wavelength.`,
    )
  const count = 2 * SIGMAS * POINTS_PER_SIGMA + 1
  const offsets = Array.from({ length: count }, (_, i) => (i / POINTS_PER_SIGMA - SIGMAS) * sigma)
  const band = makeCurve(
    offsets.map((d) => source.centreNm + d),
    offsets.map((d) => Math.exp(-0.5 * (d / sigma) ** 2)),
  )
  return scaledTo(band, source.irradianceWM2)
}

/** Total irradiance of a set of sources, W m⁻². */
export function totalIrradiance(sources: readonly BiasSource[]): number {
  return sources.reduce(
    (sum, source) => sum + (source.irradianceWM2 ?? integralOf(sourceSpectrum(source), 'source.spectrum')),
    0,
  )
}

/**
 * Photocurrent density of each junction under the bias light, `J = q ∫ EQE φ dλ`, mA cm⁻²; never below zero, whatever
 * the noise of a scan. Errors as `sourceSpectrum`.
 */
export function biasPhotocurrents(eqes: readonly Curve[], sources: readonly BiasSource[]): number[] {
  const spectra = sources.flatMap((source) => {
    const curve = sourceSpectrum(source)
    return curve.values.some((e) => e !== 0)
      ? [makeSpectrum({ id: 'bias', name: source.name ?? 'bias light', curve })]
      : []
  })
  return eqes.map((eqe) =>
    Math.max(
      0,
      spectra.reduce((sum, spectrum) => sum + shortCircuitCurrentDensity(eqe, spectrum), 0),
    ),
  )
}

function scaledTo(spectrum: Curve, irradianceWM2: number): Curve {
  const factor = irradianceWM2 / integralOf(spectrum, 'source.spectrum')
  return { wavelengthNm: spectrum.wavelengthNm, values: spectrum.values.map((e) => e * factor) }
}

function integralOf(spectrum: Curve, argument: string): number {
  const { wavelengthNm: x, values: y } = spectrum
  let sum = 0
  for (let i = 0; i + 1 < x.length; i++) sum += 0.5 * (x[i + 1]! - x[i]!) * (y[i]! + y[i + 1]!)
  if (!(sum > 0)) throw new DomainError(argument, `${argument} has a total of ${sum}; it must be above zero.`)
  return sum
}
