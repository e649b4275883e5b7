import { z } from 'zod'
import { Severity } from './findings.js'
import {
  CalendarDate,
  CurveData,
  Finite,
  Id,
  LongText,
  Nothing,
  PageQuery,
  PersonReference,
  Positive,
  NotNegative,
  Reason,
  ShortText,
  Timestamp,
  Version,
  pageOf,
} from './primitives.js'
import { ProjectParams } from './projects.js'
import { defineRoute } from './route.js'

// ---- What the reader understood of a file ---------------------------------------------------------------------------

export const WAVELENGTH_UNITS = ['nm', 'um', 'angstrom', 'eV'] as const
export const WavelengthUnit = z.enum(WAVELENGTH_UNITS)
export type WavelengthUnit = z.infer<typeof WavelengthUnit>

export const VALUE_UNITS = ['fraction', 'percent', 'A/W', 'W/m2/nm', 'W/m2/um', 'uW/cm2/nm'] as const
export const ValueUnit = z.enum(VALUE_UNITS)
export type ValueUnit = z.infer<typeof ValueUnit>

export const QUANTITIES = ['eqe', 'reflectance', 'transmittance', 'irradiance', 'noise'] as const
export const Quantity = z.enum(QUANTITIES)
export type Quantity = z.infer<typeof Quantity>

/** Which column is what. Proposed by the reader, corrected by the person, remembered for files of the same shape. */
export const ReadingMapping = z
  .strictObject({
    sheet: z.string().max(200).nullable(),
    tableIndex: z.int().min(0),
    wavelength: z.strictObject({ column: z.int().min(0), unit: WavelengthUnit }),
    series: z
      .array(
        z.strictObject({
          column: z.int().min(0),
          quantity: Quantity,
          unit: ValueUnit,
          label: z.string().max(200),
        }),
      )
      .min(1, 'Choose at least one column of values.')
      .max(64),
  })
  .meta({ id: 'ReadingMapping' })
export type ReadingMapping = z.infer<typeof ReadingMapping>

export const ReadColumn = z
  .object({
    index: z.int().min(0),
    header: z.string(),
    role: z.string().meta({ description: 'wavelength, eqe, responsivity, reflectance, … or ignored' }),
    unit: z.string().nullable(),
    why: z.string(),
  })
  .meta({ id: 'ReadColumn' })

export const ReadTable = z
  .object({
    sheet: z.string().nullable(),
    tableIndex: z.int().min(0),
    title: z.string(),
    firstLine: z.int(),
    lastLine: z.int(),
    columns: z.array(ReadColumn),
    rows: z.array(z.array(z.string())).meta({ description: 'The first rows as they stand in the file' }),
    rowCount: z.int(),
  })
  .meta({ id: 'ReadTable' })
export type ReadTable = z.infer<typeof ReadTable>

export const ReadSeries = z
  .object({
    label: z.string(),
    quantity: Quantity,
    column: z.int(),
    curve: CurveData,
  })
  .meta({ id: 'ReadSeries', description: 'A curve as the mapping reads it; EQE and reflectance as fractions' })
export type ReadSeries = z.infer<typeof ReadSeries>

export const ReadingProblem = z
  .object({
    reason: z.string(),
    line: z.int().nullable(),
    column: z.string().nullable(),
    value: z.string().nullable(),
    expected: z.string().nullable(),
  })
  .meta({ id: 'ReadingProblem' })
export type ReadingProblem = z.infer<typeof ReadingProblem>

export const SourceFile = z
  .object({
    id: Id,
    name: z.string(),
    sizeBytes: z.int(),
    sha256: z.string().length(64),
    uploadedAt: Timestamp,
    uploadedBy: PersonReference,
    state: z.enum(['uploaded', 'read']).meta({ description: 'read: its mapping was confirmed and scans were made' }),
    scanIds: z.array(Id),
  })
  .meta({ id: 'SourceFile' })
export type SourceFile = z.infer<typeof SourceFile>

/** A file and what the reader makes of it, under the proposed, the remembered or a corrected mapping. */
export const FileReading = z
  .object({
    file: SourceFile,
    recognisedAs: SourceFile.nullable().meta({ description: 'An earlier upload of the same bytes in this project' }),
    tables: z.array(ReadTable),
    mapping: ReadingMapping.nullable(),
    mappingOrigin: z.enum(['proposed', 'remembered', 'corrected']).nullable(),
    series: z.array(ReadSeries),
    notes: z.array(z.string()),
    problem: ReadingProblem.nullable().meta({ description: 'Why the file, or the mapping, cannot be read' }),
  })
  .meta({ id: 'FileReading' })
export type FileReading = z.infer<typeof FileReading>

// ---- Scans -----------------------------------------------------------------------------------------------------------

export const BiasSource = z
  .strictObject({
    name: z.string().trim().min(1, 'Name the source.').max(80),
    centreNm: Positive.max(20_000).nullable().default(null),
    fwhmNm: Positive.max(5_000).nullable().default(null),
    irradianceWM2: NotNegative.max(1e6).nullable().default(null),
  })
  .meta({ id: 'BiasSource' })
export type BiasSource = z.infer<typeof BiasSource>

/** How the scan was taken. Every field may stay empty; what is missing cannot be checked, and that is said. */
export const Conditions = z
  .strictObject({
    biasLight: z.array(BiasSource).max(12).default([]),
    biasVoltageV: Finite.min(-100).max(100).nullable().default(null),
    temperatureC: Finite.min(-273).max(500).nullable().default(null),
    chopperHz: NotNegative.max(1e6).nullable().default(null),
    spotAreaCm2: Positive.max(1e5).nullable().default(null),
    deviceAreaCm2: Positive.max(1e5).nullable().default(null),
    illumination: z.enum(['underfilled', 'overfilled']).nullable().default(null),
    referenceDetector: ShortText.default(''),
    referenceCalibrationDate: CalendarDate.nullable().default(null),
    operator: ShortText.default(''),
    instrument: ShortText.default(''),
    measuredOn: CalendarDate.nullable().default(null),
    filterChangesNm: z
      .array(Positive.max(20_000))
      .max(12)
      .default([])
      .meta({ description: 'Wavelengths at which an order-sorting filter comes in' }),
    jvJscMaCm2: Positive.max(1000)
      .nullable()
      .default(null)
      .meta({ description: 'Jsc of the illuminated J–V of the same device, under AM1.5G' }),
    note: LongText.default(''),
  })
  .meta({ id: 'Conditions' })
export type Conditions = z.infer<typeof Conditions>

export const SCAN_STATES = ['checked', 'accepted', 'excluded'] as const
export const ScanState = z.enum(SCAN_STATES).meta({ id: 'ScanState' })
export type ScanState = z.infer<typeof ScanState>

export const SCAN_QUANTITIES = ['eqe', 'reflectance'] as const
export const ScanQuantity = z.enum(SCAN_QUANTITIES)
export type ScanQuantity = z.infer<typeof ScanQuantity>

export const SCAN_ORIGINS = ['eqe-file', 'raw', 'corrected'] as const
export const ScanOrigin = z.enum(SCAN_ORIGINS).meta({
  id: 'ScanOrigin',
  description: 'Read from a file as it stands, reduced from raw passes, or unmixed from other scans',
})
export type ScanOrigin = z.infer<typeof ScanOrigin>

export const Scan = z
  .object({
    id: Id,
    projectId: Id,
    deviceId: Id,
    junctionId: Id.nullable().meta({ description: 'Null for a reflectance scan' }),
    quantity: ScanQuantity,
    label: z.string(),
    points: z.int(),
    rangeNm: z.tuple([z.number(), z.number()]),
    conditions: Conditions,
    state: ScanState,
    decision: z.object({ by: PersonReference, at: Timestamp, reason: z.string() }).nullable(),
    inUse: z.boolean().meta({ description: 'The scan that stands for its junction in the results' }),
    worstFinding: Severity.nullable(),
    unansweredRejects: z.int().meta({ description: 'Above zero the scan cannot be used in a report' }),
    origin: ScanOrigin,
    parentScanIds: z.array(Id).meta({ description: 'The scans that a corrected one was made of' }),
    biasSeriesId: Id.nullable(),
    sourceFile: z.object({ id: Id, name: z.string(), sha256: z.string() }),
    mapping: ReadingMapping,
    uploadedAt: Timestamp,
    uploadedBy: PersonReference,
    version: Version,
    deletedAt: Timestamp.nullable(),
  })
  .meta({ id: 'Scan' })
export type Scan = z.infer<typeof Scan>

export const ConfirmedSeries = z.strictObject({
  column: z.int().min(0),
  quantity: ScanQuantity,
  deviceId: Id,
  junctionId: Id.nullable().default(null),
  label: z.string().trim().max(200).default(''),
  conditions: Conditions,
})

export const SourceFileParams = ProjectParams.extend({ sourceFileId: Id })
export const ScanParams = ProjectParams.extend({ scanId: Id })
const group = 'Scans'

export const uploadFiles = defineRoute({
  id: 'uploadFiles',
  method: 'post',
  path: '/api/projects/:projectId/source-files',
  group,
  summary: 'Upload files; each is kept byte for byte and read, none becomes a scan yet',
  access: { right: 'edit-scans' },
  params: ProjectParams,
  transfer: 'files',
  reply: z.object({ items: z.array(FileReading) }),
  status: 201,
})

export const listSourceFiles = defineRoute({
  id: 'listSourceFiles',
  method: 'get',
  path: '/api/projects/:projectId/source-files',
  group,
  summary: 'The files of a project, newest first',
  access: { right: 'read' },
  params: ProjectParams,
  query: PageQuery.extend({ state: z.enum(['uploaded', 'read']).optional() }),
  reply: pageOf(SourceFile),
})

export const readSourceFile = defineRoute({
  id: 'readSourceFile',
  method: 'get',
  path: '/api/projects/:projectId/source-files/:sourceFileId',
  group,
  summary: 'What the reader understands of a file',
  access: { right: 'read' },
  params: SourceFileParams,
  reply: FileReading,
})

export const previewMapping = defineRoute({
  id: 'previewMapping',
  method: 'post',
  path: '/api/projects/:projectId/source-files/:sourceFileId/readings',
  group,
  summary: 'Read the file under a corrected mapping; nothing is saved',
  access: { right: 'read' },
  params: SourceFileParams,
  body: z.strictObject({ mapping: ReadingMapping }),
  reply: FileReading,
})

export const confirmReading = defineRoute({
  id: 'confirmReading',
  method: 'post',
  path: '/api/projects/:projectId/source-files/:sourceFileId/scans',
  group,
  summary: 'Confirm a mapping and make scans; all of them or none',
  access: { right: 'edit-scans' },
  params: SourceFileParams,
  body: z.strictObject({
    mapping: ReadingMapping,
    scans: z.array(ConfirmedSeries).min(1, 'Say which column belongs to which junction.').max(64),
  }),
  reply: z.object({ items: z.array(Scan) }),
  status: 201,
})

export const deleteSourceFile = defineRoute({
  id: 'deleteSourceFile',
  method: 'delete',
  path: '/api/projects/:projectId/source-files/:sourceFileId',
  group,
  summary: 'Discard an upload from which no scan was made',
  access: { right: 'edit-scans' },
  params: SourceFileParams,
  reply: Nothing,
})

export const downloadSourceFile = defineRoute({
  id: 'downloadSourceFile',
  method: 'get',
  path: '/api/projects/:projectId/source-files/:sourceFileId/content',
  group,
  summary: 'The uploaded bytes',
  access: { right: 'read' },
  params: SourceFileParams,
  transfer: 'bytes',
  reply: Nothing,
})

export const listScans = defineRoute({
  id: 'listScans',
  method: 'get',
  path: '/api/projects/:projectId/scans',
  group,
  summary: 'The scans of a project or of one device, newest first',
  access: { right: 'read' },
  params: ProjectParams,
  query: PageQuery.extend({ deviceId: Id.optional(), deleted: z.enum(['yes', 'no']).default('no') }),
  reply: pageOf(Scan),
})

export const readScan = defineRoute({
  id: 'readScan',
  method: 'get',
  path: '/api/projects/:projectId/scans/:scanId',
  group,
  summary: 'One scan with its curve',
  access: { right: 'read' },
  params: ScanParams,
  reply: z.object({ scan: Scan, curve: CurveData }),
})

export const updateConditions = defineRoute({
  id: 'updateConditions',
  method: 'put',
  path: '/api/projects/:projectId/scans/:scanId/conditions',
  group,
  summary: 'Correct label and conditions of a scan',
  access: { right: 'edit-scans' },
  params: ScanParams,
  body: z.strictObject({ version: Version, label: z.string().trim().max(200), conditions: Conditions }),
  reply: Scan,
})

export const decideScan = defineRoute({
  id: 'decideScan',
  method: 'put',
  path: '/api/projects/:projectId/scans/:scanId/decision',
  group,
  summary: 'Accept or exclude a scan, with a reason; or take the decision back',
  access: { right: 'edit-scans' },
  params: ScanParams,
  body: z
    .strictObject({ version: Version, state: ScanState, reason: z.string().trim().max(1000).default('') })
    .refine((decision) => decision.state !== 'excluded' || Reason.safeParse(decision.reason).success, {
      path: ['reason'],
      error: 'Say why the scan is excluded.',
    }),
  reply: Scan,
})

export const deleteScan = defineRoute({
  id: 'deleteScan',
  method: 'delete',
  path: '/api/projects/:projectId/scans/:scanId',
  group,
  summary: 'Delete a scan; it can be restored for thirty days',
  access: { right: 'edit-scans' },
  params: ScanParams,
  reply: Nothing,
})

export const restoreScan = defineRoute({
  id: 'restoreScan',
  method: 'post',
  path: '/api/projects/:projectId/scans/:scanId/restoration',
  group,
  summary: 'Bring a deleted scan back',
  access: { right: 'edit-scans' },
  params: ScanParams,
  reply: Scan,
})
