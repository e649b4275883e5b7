import type { CurveData } from '../../../shared/contract/primitives.js'
import type { Spectrum as SpectrumDescription } from '../../../shared/contract/spectra.js'
import { makeCurve } from '../../../shared/physics/curve.js'
import { makeSpectrum, scaleSpectrum, type Spectrum } from '../../../shared/physics/spectrum.js'

/** The engine's spectrum of an API reply, scaled when a total irradiance is asked for. */
export function scaledSpectrum(
  reply: { spectrum: SpectrumDescription; curve: CurveData },
  scaleToWM2: number | undefined,
): Spectrum {
  const { id, name } = reply.spectrum
  const spectrum = makeSpectrum({ id, name, curve: makeCurve(reply.curve.wavelengthNm, reply.curve.values) })
  return scaleToWM2 === undefined ? spectrum : scaleSpectrum(spectrum, scaleToWM2)
}
