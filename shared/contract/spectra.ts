import { z } from 'zod'
import { CurveData, Id, Name, Nothing, PersonReference, Timestamp } from './primitives.js'
import { ProjectParams } from './projects.js'
import { defineRoute } from './route.js'
import { FileReading, ReadingMapping } from './scans.js'

/** A reference spectrum by its name, or the id of a spectrum that the project uploaded. */
export const SpectrumId = z.union([z.enum(['AM1.5G', 'AM1.5D', 'AM0']), Id])
export type SpectrumId = z.infer<typeof SpectrumId>

export const Spectrum = z
  .object({
    id: SpectrumId,
    kind: z.enum(['reference', 'uploaded']),
    name: z.string(),
    source: z.string().meta({ description: 'The standard, or the uploaded file' }),
    rangeNm: z.tuple([z.number(), z.number()]),
    points: z.int(),
    totalIrradianceWM2: z.number(),
    uploadedBy: PersonReference.nullable(),
    uploadedAt: Timestamp.nullable(),
  })
  .meta({ id: 'Spectrum' })
export type Spectrum = z.infer<typeof Spectrum>

/** Which spectrum a result is for, and whether it was scaled to a total irradiance. */
export const SpectrumChoice = z.object({
  spectrum: SpectrumId.default('AM1.5G'),
  scaleToWM2: z.coerce.number().positive().max(1e6).optional(),
})
export type SpectrumChoice = z.infer<typeof SpectrumChoice>

export const SpectrumUsed = z
  .object({
    id: SpectrumId,
    name: z.string(),
    totalIrradianceWM2: z.number().meta({ description: 'Before scaling' }),
    scaledToWM2: z.number().nullable(),
    scaleFactor: z.number(),
  })
  .meta({ id: 'SpectrumUsed' })
export type SpectrumUsed = z.infer<typeof SpectrumUsed>

const params = ProjectParams.extend({ spectrumId: SpectrumId })
const group = 'Spectra'

export const listSpectra = defineRoute({
  id: 'listSpectra',
  method: 'get',
  path: '/api/projects/:projectId/spectra',
  group,
  summary: 'The reference spectra and those of the project',
  access: { right: 'read' },
  params: ProjectParams,
  reply: z.object({ items: z.array(Spectrum) }),
})

export const readSpectrum = defineRoute({
  id: 'readSpectrum',
  method: 'get',
  path: '/api/projects/:projectId/spectra/:spectrumId',
  group,
  summary: 'One spectrum with its curve, W m⁻² nm⁻¹',
  access: { right: 'read' },
  params,
  reply: z.object({ spectrum: Spectrum, curve: CurveData }),
})

export const createSpectrum = defineRoute({
  id: 'createSpectrum',
  method: 'post',
  path: '/api/projects/:projectId/spectra',
  group,
  summary: 'Make a spectrum of an uploaded file',
  access: { right: 'edit-library' },
  params: ProjectParams,
  body: z.strictObject({ sourceFileId: Id, name: Name, mapping: ReadingMapping }),
  reply: Spectrum,
  status: 201,
})

export const uploadSpectrumFiles = defineRoute({
  id: 'uploadSpectrumFiles',
  method: 'post',
  path: '/api/projects/:projectId/spectrum-files',
  group,
  summary: 'Upload the file of a spectrum; it is kept and read, and becomes a spectrum when confirmed',
  access: { right: 'edit-library' },
  params: ProjectParams,
  transfer: 'files',
  reply: z.object({ items: z.array(FileReading) }),
  status: 201,
})

export const deleteSpectrum = defineRoute({
  id: 'deleteSpectrum',
  method: 'delete',
  path: '/api/projects/:projectId/spectra/:spectrumId',
  group,
  summary: 'Delete a spectrum of the project',
  access: { right: 'edit-library' },
  params,
  reply: Nothing,
})
