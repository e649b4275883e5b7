import { ApiError } from '../../../shared/contract/errors.js'
import type { Spectrum } from '../../database/entities/Spectrum.js'
import { spectrumOfProject } from '../../database/repositories/spectra.js'
import type { Work } from '../../database/transaction.js'

/** A spectrum that the project uploaded. */
export async function findSpectrum(work: Work, projectId: string, spectrumId: string): Promise<Spectrum> {
  const spectrum = await spectrumOfProject(work, projectId, spectrumId)
  if (!spectrum) throw new ApiError('NOT_FOUND', { what: 'spectrum' }, 'There is no such spectrum in this project.')
  return spectrum
}
