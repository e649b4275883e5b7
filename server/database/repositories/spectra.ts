import { isDuplicateKey } from '../databaseErrors.js'
import type { Work } from '../transaction.js'
import { Spectrum } from '../entities/Spectrum.js'

const PERSON_AND_FILE = { uploadedBy: true, sourceFile: true } as const

export async function spectraOfProject(work: Work, projectId: string): Promise<Spectrum[]> {
  return work.find(Spectrum, { where: { projectId }, relations: PERSON_AND_FILE, order: { name: 'ASC' } })
}

export async function spectrumOfProject(work: Work, projectId: string, spectrumId: string): Promise<Spectrum | null> {
  return work.findOne(Spectrum, { where: { id: spectrumId, projectId }, relations: PERSON_AND_FILE })
}

/** Name and total of a spectrum, without its curve. */
export async function spectrumHead(
  work: Work,
  projectId: string,
  spectrumId: string,
): Promise<Pick<Spectrum, 'id' | 'name' | 'totalIrradianceWM2'> | null> {
  return work.findOne(Spectrum, {
    select: { id: true, name: true, totalIrradianceWM2: true },
    where: { id: spectrumId, projectId },
  })
}

export async function curveOfSpectrum(
  work: Work,
  spectrumId: string,
): Promise<Pick<Spectrum, 'wavelengthNm' | 'values'>> {
  return work.findOneOrFail(Spectrum, {
    select: { id: true, wavelengthNm: true, values: true },
    where: { id: spectrumId },
  })
}

export async function isSpectrumMadeOf(work: Work, sourceFileId: string): Promise<boolean> {
  return work.existsBy(Spectrum, { sourceFileId })
}

/** False where the project has a spectrum of this name already; then nothing is added. */
export async function addSpectrumOnce(
  work: Work,
  spectrum: Omit<Spectrum, 'project' | 'sourceFile' | 'uploadedBy'>,
): Promise<boolean> {
  try {
    await work.insert(Spectrum, spectrum)
    return true
  } catch (error) {
    if (isDuplicateKey(error)) return false
    throw error
  }
}

export async function removeSpectrum(work: Work, spectrumId: string): Promise<void> {
  await work.delete(Spectrum, { id: spectrumId })
}
