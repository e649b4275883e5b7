import { z } from 'zod'
import { CurrentToVoltage } from './bench.js'
import { CurveData, Finite, Id, Positive, Version } from './primitives.js'
import { ProjectParams } from './projects.js'
import { defineRoute } from './route.js'
import { Conditions, Scan, ScanParams, WavelengthUnit } from './scans.js'

const Column = z.int().min(0).meta({ description: 'Place of the column in the table, from 0' })

/** Which columns hold a lock-in's reading: X and Y, magnitude and phase, or the magnitude alone. */
export const SignalColumns = z
  .union([
    z.strictObject({ inPhase: Column, quadrature: Column }),
    z.strictObject({ magnitude: Column, phase: Column.meta({ description: 'In degrees' }) }),
    z.strictObject({ magnitude: Column }),
  ])
  .meta({ id: 'SignalColumns', description: 'Voltages in V' })
export type SignalColumns = z.infer<typeof SignalColumns>

/** One pass over the wavelengths and the file it stands in; both passes may stand in one file. */
export const RawPassInput = z
  .strictObject({
    sourceFileId: Id,
    sheet: z.string().max(200).nullable().default(null),
    tableIndex: z.int().min(0).default(0),
    wavelength: z.strictObject({ column: Column, unit: WavelengthUnit.default('nm') }),
    signal: SignalColumns,
    dark: SignalColumns.nullable().default(null).meta({ description: 'Columns read with the shutter closed' }),
    monitor: Column.nullable().default(null),
    gain: CurrentToVoltage,
  })
  .meta({ id: 'RawPassInput' })
export type RawPassInput = z.infer<typeof RawPassInput>

/** Everything that turns raw passes into EQE by substitution. */
export const RawReduction = z
  .strictObject({
    device: RawPassInput,
    reference: RawPassInput,
    detectorId: Id.meta({ description: 'A reference detector of the project' }),
    overfilled: z
      .strictObject({ referenceCm2: Positive.max(1e5), deviceCm2: Positive.max(1e5) })
      .nullable()
      .default(null)
      .meta({ description: 'Illuminated areas in an overfilled beam; null for an underfilled one' }),
    corrections: z
      .array(z.strictObject({ name: z.string().trim().min(1).max(60), factor: Positive.max(1000) }))
      .max(10)
      .default([]),
  })
  .meta({ id: 'RawReduction' })
export type RawReduction = z.infer<typeof RawReduction>

/** EQE with every factor of the product at every wavelength. */
export const ReducedRaw = z
  .object({
    eqe: CurveData,
    iqe: CurveData.nullable().meta({ description: 'EQE/(1 − R) where the device has a reflectance scan' }),
    factors: z.object({
      wavelengthNm: z.array(Positive),
      referenceEqe: z.array(Finite),
      deviceSignalV: z.array(Finite),
      referenceSignalV: z.array(Finite),
      deviceGainVA: z.number(),
      referenceGainVA: z.number(),
      monitorRatio: z.array(Finite),
      areaRatio: z.number(),
      correction: z.number(),
    }),
    remarks: z.array(z.string()),
  })
  .meta({ id: 'ReducedRaw' })
export type ReducedRaw = z.infer<typeof ReducedRaw>

export const RawScan = z
  .object({ scan: Scan, reduction: RawReduction, detectorName: z.string(), reduced: ReducedRaw })
  .meta({ id: 'RawScan' })
export type RawScan = z.infer<typeof RawScan>

const group = 'Raw passes'

export const previewRaw = defineRoute({
  id: 'previewRaw',
  method: 'post',
  path: '/api/projects/:projectId/raw-previews',
  group,
  summary: 'EQE of raw passes with every factor; nothing is saved',
  access: { right: 'read' },
  params: ProjectParams,
  body: z.strictObject({ reduction: RawReduction, deviceId: Id.nullable().default(null) }),
  reply: ReducedRaw,
})

export const createRawScan = defineRoute({
  id: 'createRawScan',
  method: 'post',
  path: '/api/projects/:projectId/raw-scans',
  group,
  summary: 'Make an EQE scan of raw passes; the raw columns are kept with it',
  access: { right: 'edit-scans' },
  params: ProjectParams,
  body: z.strictObject({
    reduction: RawReduction,
    deviceId: Id,
    junctionId: Id,
    label: z.string().trim().max(200).default(''),
    conditions: Conditions,
  }),
  reply: RawScan,
  status: 201,
})

export const readRawScan = defineRoute({
  id: 'readRawScan',
  method: 'get',
  path: '/api/projects/:projectId/scans/:scanId/raw',
  group,
  summary: 'How a scan was reduced: columns, factors, EQE and IQE',
  access: { right: 'read' },
  params: ScanParams,
  reply: RawScan,
})

export const updateRawScan = defineRoute({
  id: 'updateRawScan',
  method: 'put',
  path: '/api/projects/:projectId/scans/:scanId/raw',
  group,
  summary: 'Correct a factor of a raw scan; EQE and findings are computed again',
  access: { right: 'edit-scans' },
  params: ScanParams,
  body: z.strictObject({ version: Version, reduction: RawReduction }),
  reply: RawScan,
})
