import { ApiError } from '../../../shared/contract/errors.js'
import { hasScans } from '../../database/repositories/scans.js'
import { isCalibrationOrReference, lockSourceFile, removeSourceFile } from '../../database/repositories/sourceFiles.js'
import { isSpectrumMadeOf } from '../../database/repositories/spectra.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { findSourceFile } from './findSourceFile.js'

/** Discards an upload for good. A file on which something rests, were it a deleted scan, stays. */
export async function deleteSourceFile(
  database: Database,
  actor: Actor,
  projectId: string,
  sourceFileId: string,
): Promise<null> {
  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-scans')
    await lockSourceFile(work, projectId, sourceFileId)
    const file = await findSourceFile(work, projectId, sourceFileId)
    const isUsed =
      (await hasScans(work, sourceFileId)) ||
      (await isSpectrumMadeOf(work, sourceFileId)) ||
      (await isCalibrationOrReference(work, sourceFileId))
    if (isUsed)
      throw new ApiError(
        'STATE_CONFLICT',
        { reason: 'file-in-use' },
        `Scans, spectra or calibrations were made of ${file.name}; the file stays with them.`,
      )
    await removeSourceFile(work, sourceFileId)
    await recordAudit(work, {
      actor,
      projectId,
      action: 'source-file.discarded',
      sentence: `${actor.name} discarded the upload ${file.name}.`,
      subject: { kind: 'source-file', id: sourceFileId, name: file.name },
    })
    return null
  })
}
