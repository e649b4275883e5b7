import { ApiError } from '../../../shared/contract/errors.js'
import type { SpectrumChoice } from '../../../shared/contract/spectra.js'
import { REFERENCE_SPECTRUM_IDS, type ReferenceSpectrumId } from '../../../shared/data/spectra/index.js'
import { makeCurve } from '../../../shared/physics/curve.js'
import {
  makeSpectrum,
  referenceSpectrum,
  scaleSpectrum,
  totalIrradianceWM2,
  type Spectrum,
} from '../../../shared/physics/spectrum.js'
import { curveOfSpectrum, spectrumHead } from '../../database/repositories/spectra.js'
import type { Work } from '../../database/transaction.js'
import { BoundedMemory } from '../boundedMemory.js'
import type { ChosenSpectrum } from '../matching/chosenSpectrum.js'

/** The spectrum that a result is asked for, ready for integrals, scaled if that was asked for. */
export async function chooseSpectrum(work: Work, projectId: string, choice: SpectrumChoice): Promise<ChosenSpectrum> {
  const spectrum = isReference(choice.spectrum)
    ? referenceSpectrum(choice.spectrum)
    : await uploadedSpectrum(work, projectId, choice.spectrum)
  return chosen(spectrum, choice)
}

/** The spectrum that a scan is judged under where nobody chose one. */
export function standardSpectrum(): ChosenSpectrum {
  return chosen(referenceSpectrum('AM1.5G'), { spectrum: 'AM1.5G' })
}

function chosen(spectrum: Spectrum, choice: SpectrumChoice): ChosenSpectrum {
  const total = totalIrradianceWM2(spectrum)
  const scaledTo = choice.scaleToWM2 ?? null
  return {
    used: {
      id: choice.spectrum,
      name: spectrum.name,
      totalIrradianceWM2: total,
      scaledToWM2: scaledTo,
      scaleFactor: scaledTo === null ? 1 : scaledTo / total,
    },
    spectrum: scaledTo === null ? spectrum : scaleSpectrum(spectrum, scaledTo),
  }
}

export function isReference(id: string): id is ReferenceSpectrumId {
  return (REFERENCE_SPECTRUM_IDS as readonly string[]).includes(id)
}

/** An uploaded spectrum never changes, so what this process has prepared of one stays right. */
const prepared = new BoundedMemory<Spectrum>(64)

async function uploadedSpectrum(work: Work, projectId: string, spectrumId: string): Promise<Spectrum> {
  const head = await spectrumHead(work, projectId, spectrumId)
  if (!head) throw new ApiError('NOT_FOUND', { what: 'spectrum' }, 'There is no such spectrum in this project.')
  const known = prepared.get(head.id)
  if (known) return known
  const { wavelengthNm, values } = await curveOfSpectrum(work, head.id)
  return prepared.keep(head.id, makeSpectrum({ id: head.id, name: head.name, curve: makeCurve(wavelengthNm, values) }))
}
