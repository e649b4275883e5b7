import type { SpectrumUsed } from '../../../shared/contract/spectra.js'
import type { Spectrum } from '../../../shared/physics/spectrum.js'

/** A spectrum ready for integrals, scaled if that was asked for, and what has to be said about it. */
export interface ChosenSpectrum {
  used: SpectrumUsed
  spectrum: Spectrum
}

/** Tells a spectrum and its scaling from every other; the curve behind an id never changes. */
export function spectrumKey({ used }: ChosenSpectrum): string {
  return `${used.id} ${used.scaledToWM2 ?? ''}`
}
