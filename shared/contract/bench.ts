import { z } from 'zod'
import {
  CalendarDate,
  CurveData,
  Finite,
  Id,
  LongText,
  Name,
  NotNegative,
  Nothing,
  PersonReference,
  Positive,
  ShortText,
  Timestamp,
  Version,
} from './primitives.js'
import { ProjectParams } from './projects.js'
import { defineRoute } from './route.js'
import { BiasSource, ReadingMapping } from './scans.js'

/** How a current became the voltage that a lock-in read: an amplifier's gain, or a shunt resistor. */
export const CurrentToVoltage = z
  .union([z.strictObject({ transimpedanceVA: Positive }), z.strictObject({ shuntOhm: Positive })])
  .meta({ id: 'CurrentToVoltage', description: 'Gain in V/A, or a shunt resistor in Ω' })
export type CurrentToVoltage = z.infer<typeof CurrentToVoltage>

// ---- Measurement set-ups ---------------------------------------------------------------------------------------------

/** What stays the same through a night of scans; a scan's conditions are filled in from it. */
export const SetUpContent = z
  .strictObject({
    biasLight: z.array(BiasSource).max(12).default([]),
    biasVoltageV: Finite.min(-100).max(100).nullable().default(null),
    temperatureC: Finite.min(-273).max(500).nullable().default(null),
    chopperHz: NotNegative.max(1e6).nullable().default(null),
    deviceGain: CurrentToVoltage.nullable().default(null),
    referenceGain: CurrentToVoltage.nullable().default(null),
    detectorId: Id.nullable().default(null),
    referenceDetector: ShortText.default(''),
    referenceCalibrationDate: CalendarDate.nullable().default(null),
    spotAreaCm2: Positive.max(1e5).nullable().default(null),
    deviceAreaCm2: Positive.max(1e5).nullable().default(null),
    illumination: z.enum(['underfilled', 'overfilled']).nullable().default(null),
    filterChangesNm: z.array(Positive.max(20_000)).max(12).default([]),
    instrument: ShortText.default(''),
    note: LongText.default(''),
  })
  .meta({ id: 'SetUpContent' })
export type SetUpContent = z.infer<typeof SetUpContent>

// ---- Light sources ---------------------------------------------------------------------------------------------------

const highestIrradiance = {
  highestIrradianceWM2: Positive.max(1e6).meta({ description: 'At the sample plane' }),
  note: LongText.default(''),
}
export const LightSourceInput = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('led'),
    centreNm: Positive.min(100, 'The centre is a wavelength in nm, 100 or more.').max(20_000),
    fwhmNm: Positive.max(2000),
    ...highestIrradiance,
  }),
  z.strictObject({
    kind: z.literal('spectrum'),
    spectrumId: Id.meta({ description: 'A spectrum that the project uploaded: a lamp with its filter' }),
    ...highestIrradiance,
  }),
])
export type LightSourceInput = z.infer<typeof LightSourceInput>

export const LightSourceContent = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('led'),
    centreNm: z.number(),
    fwhmNm: z.number(),
    highestIrradianceWM2: z.number(),
    note: z.string(),
  }),
  z.object({
    kind: z.literal('spectrum'),
    spectrumId: Id,
    spectrumName: z.string(),
    curve: CurveData.meta({ description: 'W/m²/nm as uploaded; kept even when the spectrum is deleted' }),
    highestIrradianceWM2: z.number(),
    note: z.string(),
  }),
])
export type LightSourceContent = z.infer<typeof LightSourceContent>

// ---- Reference detectors ---------------------------------------------------------------------------------------------

export const DetectorInput = z.strictObject({
  sourceFileId: Id,
  mapping: ReadingMapping.meta({ description: 'One column of EQE; a responsivity in A/W is turned into EQE' }),
  calibratedOn: CalendarDate.nullable().default(null),
  serialNumber: ShortText.default(''),
  note: LongText.default(''),
})
export type DetectorInput = z.infer<typeof DetectorInput>

export const DetectorContent = z.object({
  sourceFileId: Id,
  sourceFileName: z.string(),
  mapping: ReadingMapping,
  curve: CurveData.meta({ description: 'Calibration as EQE, fraction' }),
  rangeNm: z.tuple([z.number(), z.number()]),
  calibratedOn: CalendarDate.nullable(),
  serialNumber: z.string(),
  note: z.string(),
})
export type DetectorContent = z.infer<typeof DetectorContent>

// ---- Routes: the same five for each kind -----------------------------------------------------------------------------

const kept = {
  id: Id,
  projectId: Id,
  name: z.string(),
  version: Version,
  createdAt: Timestamp,
  updatedAt: Timestamp,
  updatedBy: PersonReference,
}
export const SetUp = z.object({ ...kept, content: SetUpContent }).meta({ id: 'SetUp' })
export const LightSource = z.object({ ...kept, content: LightSourceContent }).meta({ id: 'LightSource' })
export const Detector = z.object({ ...kept, content: DetectorContent }).meta({ id: 'Detector' })
export type SetUp = z.infer<typeof SetUp>
export type LightSource = z.infer<typeof LightSource>
export type Detector = z.infer<typeof Detector>

const group = 'Measuring bench'
const ItemParams = ProjectParams.extend({ itemId: Id })

export const listSetUps = defineRoute({
  id: 'listSetUps',
  method: 'get',
  path: '/api/projects/:projectId/set-ups',
  group,
  summary: 'The measurement set-ups of a project, by name',
  access: { right: 'read' },
  params: ProjectParams,
  reply: z.object({ items: z.array(SetUp) }),
})
export const createSetUp = defineRoute({
  id: 'createSetUp',
  method: 'post',
  path: '/api/projects/:projectId/set-ups',
  group,
  summary: 'Keep a measurement set-up',
  access: { right: 'edit-library' },
  params: ProjectParams,
  body: z.strictObject({ name: Name, content: SetUpContent }),
  reply: SetUp,
  status: 201,
})
export const updateSetUp = defineRoute({
  id: 'updateSetUp',
  method: 'put',
  path: '/api/projects/:projectId/set-ups/:itemId',
  group,
  summary: 'Change a measurement set-up; scans keep the conditions that were filled in from it',
  access: { right: 'edit-library' },
  params: ItemParams,
  body: z.strictObject({ version: Version, name: Name, content: SetUpContent }),
  reply: SetUp,
})
export const deleteSetUp = defineRoute({
  id: 'deleteSetUp',
  method: 'delete',
  path: '/api/projects/:projectId/set-ups/:itemId',
  group,
  summary: 'Delete a measurement set-up',
  access: { right: 'edit-library' },
  params: ItemParams,
  reply: Nothing,
})

export const listLightSources = defineRoute({
  id: 'listLightSources',
  method: 'get',
  path: '/api/projects/:projectId/light-sources',
  group,
  summary: 'The light sources of a project, by name',
  access: { right: 'read' },
  params: ProjectParams,
  reply: z.object({ items: z.array(LightSource) }),
})
export const createLightSource = defineRoute({
  id: 'createLightSource',
  method: 'post',
  path: '/api/projects/:projectId/light-sources',
  group,
  summary: 'Add a light source: an LED by centre and width, or a lamp by its uploaded spectrum',
  access: { right: 'edit-library' },
  params: ProjectParams,
  body: z.strictObject({ name: Name, content: LightSourceInput }),
  reply: LightSource,
  status: 201,
})
export const updateLightSource = defineRoute({
  id: 'updateLightSource',
  method: 'put',
  path: '/api/projects/:projectId/light-sources/:itemId',
  group,
  summary: 'Change a light source',
  access: { right: 'edit-library' },
  params: ItemParams,
  body: z.strictObject({ version: Version, name: Name, content: LightSourceInput }),
  reply: LightSource,
})
export const deleteLightSource = defineRoute({
  id: 'deleteLightSource',
  method: 'delete',
  path: '/api/projects/:projectId/light-sources/:itemId',
  group,
  summary: 'Delete a light source',
  access: { right: 'edit-library' },
  params: ItemParams,
  reply: Nothing,
})

export const listDetectors = defineRoute({
  id: 'listDetectors',
  method: 'get',
  path: '/api/projects/:projectId/detectors',
  group,
  summary: 'The reference detectors of a project with their calibrations, by name',
  access: { right: 'read' },
  params: ProjectParams,
  reply: z.object({ items: z.array(Detector) }),
})
export const createDetector = defineRoute({
  id: 'createDetector',
  method: 'post',
  path: '/api/projects/:projectId/detectors',
  group,
  summary: 'Add a reference detector from its uploaded calibration file',
  access: { right: 'edit-library' },
  params: ProjectParams,
  body: z.strictObject({ name: Name, content: DetectorInput }),
  reply: Detector,
  status: 201,
})
export const updateDetector = defineRoute({
  id: 'updateDetector',
  method: 'put',
  path: '/api/projects/:projectId/detectors/:itemId',
  group,
  summary: 'Change a reference detector, or give it a new calibration; scans keep the one they were reduced with',
  access: { right: 'edit-library' },
  params: ItemParams,
  body: z.strictObject({ version: Version, name: Name, content: DetectorInput }),
  reply: Detector,
})
export const deleteDetector = defineRoute({
  id: 'deleteDetector',
  method: 'delete',
  path: '/api/projects/:projectId/detectors/:itemId',
  group,
  summary: 'Delete a reference detector; scans that were reduced with it keep its calibration',
  access: { right: 'edit-library' },
  params: ItemParams,
  reply: Nothing,
})
