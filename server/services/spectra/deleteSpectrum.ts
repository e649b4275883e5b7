import { ApiError } from '../../../shared/contract/errors.js'
import { refreshSourceFileState } from '../../database/repositories/sourceFiles.js'
import { removeSpectrum } from '../../database/repositories/spectra.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { isReference } from './chooseSpectrum.js'
import { findSpectrum } from './findSpectrum.js'

/** Deletes a spectrum of the project. Its file stays, so that the spectrum can be made again. */
export async function deleteSpectrum(
  database: Database,
  actor: Actor,
  projectId: string,
  spectrumId: string,
): Promise<null> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-library')
    if (isReference(spectrumId))
      throw new ApiError(
        'STATE_CONFLICT',
        { reason: 'reference-spectrum' },
        `${spectrumId} is a reference spectrum that every project has; it cannot be deleted.`,
      )
    const spectrum = await findSpectrum(work, projectId, spectrumId)
    await removeSpectrum(work, spectrumId)
    await refreshSourceFileState(work, spectrum.sourceFileId)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'spectrum.deleted',
      sentence: `${actor.name} deleted the spectrum ${spectrum.name}; its file ${spectrum.sourceFile.name} is kept.`,
      subject: { kind: 'spectrum', id: spectrumId, name: spectrum.name },
    })
    return null
  })
}
