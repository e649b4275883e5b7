import type { Spectrum as SpectrumReply } from '../../shared/contract/spectra.js'
import { REFERENCE_SPECTRA, type ReferenceSpectrumId } from '../../shared/data/spectra/index.js'
import { rangeNm } from '../../shared/physics/curve.js'
import { referenceSpectrum, totalIrradianceWM2 } from '../../shared/physics/spectrum.js'
import type { Spectrum } from '../database/entities/Spectrum.js'

export function presentReferenceSpectrum(id: ReferenceSpectrumId): SpectrumReply {
  const { name, standard, note } = REFERENCE_SPECTRA[id]
  const spectrum = referenceSpectrum(id)
  return {
    id,
    kind: 'reference',
    name,
    source: `${standard}, ${note}`,
    rangeNm: rangeNm(spectrum.curve),
    points: spectrum.curve.values.length,
    totalIrradianceWM2: totalIrradianceWM2(spectrum),
    uploadedBy: null,
    uploadedAt: null,
  }
}

/** Needs the relations `sourceFile` and `uploadedBy`. */
export function presentSpectrum(spectrum: Spectrum): SpectrumReply {
  return {
    id: spectrum.id,
    kind: 'uploaded',
    name: spectrum.name,
    source: spectrum.sourceFile.name,
    rangeNm: rangeNm(spectrum),
    points: spectrum.points,
    totalIrradianceWM2: spectrum.totalIrradianceWM2,
    uploadedBy: { id: spectrum.uploadedBy.id, name: spectrum.uploadedBy.name },
    uploadedAt: spectrum.uploadedAt.toISOString(),
  }
}
