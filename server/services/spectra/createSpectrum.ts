import { v7 as uuid } from 'uuid'
import { ApiError } from '../../../shared/contract/errors.js'
import type { BodyOf } from '../../../shared/contract/route.js'
import type { Spectrum as SpectrumReply, createSpectrum as route } from '../../../shared/contract/spectra.js'
import { DomainError } from '../../../shared/physics/errors.js'
import { makeSpectrum, totalIrradianceWM2, type Spectrum } from '../../../shared/physics/spectrum.js'
import { bytesOfSourceFile, refreshSourceFileState } from '../../database/repositories/sourceFiles.js'
import { addSpectrumOnce } from '../../database/repositories/spectra.js'
import { rememberMapping } from '../../database/repositories/readingMemories.js'
import type { Database } from '../../database/transaction.js'
import { presentSpectrum } from '../../presenters/spectrum.js'
import type { ReadScan } from '../../reading/readingResult.js'
import type { Actor } from '../actor.js'
import { recordAudit } from '../audit.js'
import { requireMember } from '../rights.js'
import { findSourceFile } from '../scans/findSourceFile.js'
import { readAsConfirmed } from '../scans/understand.js'
import { isReference } from './chooseSpectrum.js'
import { findSpectrum } from './findSpectrum.js'

/** Makes a spectrum of the one column of irradiance that the mapping reads. */
export async function createSpectrum(
  database: Database,
  actor: Actor,
  projectId: string,
  { sourceFileId, name, mapping }: BodyOf<typeof route>,
): Promise<SpectrumReply> {
  await requireMember(database.work, actor, projectId, 'edit-library')
  if (isReference(name)) throw nameTaken(name)
  const file = await findSourceFile(database.work, projectId, sourceFileId)
  const reading = await readAsConfirmed(await bytesOfSourceFile(database.work, file.id), file.name, mapping)
  const read = onlyIrradiance(reading.scans)
  const id = uuid()
  const spectrum = spectrumOf(id, name, read)

  return database.transaction(async (work) => {
    await requireMember(work, actor, projectId, 'edit-library')
    const isNew = await addSpectrumOnce(work, {
      id,
      projectId,
      name,
      sourceFileId,
      mapping,
      points: read.values.length,
      wavelengthNm: read.wavelengthNm,
      values: read.values,
      totalIrradianceWM2: totalIrradianceWM2(spectrum),
      uploadedAt: new Date(),
      uploadedById: actor.personId,
    })
    if (!isNew) throw nameTaken(name)
    await refreshSourceFileState(work, sourceFileId)
    await rememberMapping(work, projectId, reading.shape, mapping, new Date())
    await recordAudit(work, {
      actor,
      projectId,
      action: 'spectrum.created',
      sentence: `${actor.name} made the spectrum ${name} of ${file.name}.`,
      subject: { kind: 'spectrum', id, name },
    })
    return presentSpectrum(await findSpectrum(work, projectId, id))
  })
}

function onlyIrradiance(scans: readonly ReadScan[]): ReadScan {
  const [only, second] = scans.filter((scan) => scan.quantity === 'irradiance')
  if (only && !second) return only
  const message = second
    ? 'The mapping reads several columns of irradiance; a spectrum is made of one.'
    : 'The mapping reads no column of irradiance; say which column holds it and in which unit.'
  throw new ApiError('INPUT_INVALID', { errors: [{ path: ['mapping', 'series'], message }] }, message)
}

function spectrumOf(id: string, name: string, curve: ReadScan): Spectrum {
  try {
    return makeSpectrum({ id, name, curve })
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    throw new ApiError('INPUT_INVALID', { errors: [{ path: ['mapping'], message: error.message }] }, error.message)
  }
}

function nameTaken(name: string): ApiError {
  return new ApiError(
    'ALREADY_EXISTS',
    { what: 'spectrum', field: 'name', value: name },
    `The project has a spectrum called ${name} already; choose another name.`,
  )
}
