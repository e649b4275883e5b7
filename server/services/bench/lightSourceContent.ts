import type { LightSourceContent, LightSourceInput } from '../../../shared/contract/bench.js'
import { ApiError } from '../../../shared/contract/errors.js'
import { DomainError } from '../../../shared/physics/errors.js'
import { sourceSpectrum } from '../../../shared/physics/measurement/biasLight.js'
import type { Work } from '../../database/transaction.js'
import { presentCurve } from '../../presenters/curve.js'
import { findSpectrum } from '../spectra/findSpectrum.js'

/** A light source as it is kept: an uploaded spectrum is copied, so that a plan stays what it was. */
export async function lightSourceContent(
  work: Work,
  projectId: string,
  input: LightSourceInput,
): Promise<LightSourceContent> {
  if (input.kind === 'led') {
    requireSoundBand(input.centreNm, input.fwhmNm)
    return input
  }
  const spectrum = await findSpectrum(work, projectId, input.spectrumId)
  return { ...input, spectrumName: spectrum.name, curve: presentCurve(spectrum) }
}

function requireSoundBand(centreNm: number, fwhmNm: number): void {
  try {
    sourceSpectrum({ centreNm, fwhmNm, irradianceWM2: 1 })
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    const message = `A width of ${fwhmNm} nm around ${centreNm} nm would reach zero wavelength; give a smaller width.`
    throw new ApiError('INPUT_INVALID', { errors: [{ path: ['content', 'fwhmNm'], message }] }, message)
  }
}
