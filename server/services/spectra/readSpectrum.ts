import type { CurveData } from '../../../shared/contract/primitives.js'
import type { Spectrum as SpectrumReply } from '../../../shared/contract/spectra.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'
import type { Database } from '../../database/transaction.js'
import { presentCurve } from '../../presenters/curve.js'
import { presentReferenceSpectrum, presentSpectrum } from '../../presenters/spectrum.js'
import type { Actor } from '../actor.js'
import { requireMember } from '../rights.js'
import { isReference } from './chooseSpectrum.js'
import { findSpectrum } from './findSpectrum.js'

export async function readSpectrum(
  { work }: Database,
  actor: Actor,
  projectId: string,
  spectrumId: string,
): Promise<{ spectrum: SpectrumReply; curve: CurveData }> {
  await requireMember(work, actor, projectId, 'read')
  if (isReference(spectrumId))
    return {
      spectrum: presentReferenceSpectrum(spectrumId),
      curve: presentCurve(referenceSpectrum(spectrumId).curve),
    }
  const spectrum = await findSpectrum(work, projectId, spectrumId)
  return { spectrum: presentSpectrum(spectrum), curve: presentCurve(spectrum) }
}
