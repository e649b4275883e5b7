import type { Spectrum as SpectrumReply } from '../../../shared/contract/spectra.js'
import { REFERENCE_SPECTRUM_IDS } from '../../../shared/data/spectra/index.js'
import { spectraOfProject } from '../../database/repositories/spectra.js'
import type { Database } from '../../database/transaction.js'
import { presentReferenceSpectrum, presentSpectrum } from '../../presenters/spectrum.js'
import type { Actor } from '../actor.js'
import { requireMember } from '../rights.js'

/** The reference spectra, then those of the project by name. */
export async function listSpectra(
  { work }: Database,
  actor: Actor,
  projectId: string,
): Promise<{ items: SpectrumReply[] }> {
  await requireMember(work, actor, projectId, 'read')
  const uploaded = await spectraOfProject(work, projectId)
  return { items: [...REFERENCE_SPECTRUM_IDS.map(presentReferenceSpectrum), ...uploaded.map(presentSpectrum)] }
}
