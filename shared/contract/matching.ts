import { z } from 'zod'
import { Device, DeviceParams } from './devices.js'
import { Finding, Severity } from './findings.js'
import { CurveData, Id, PageQuery, Timestamp, pageOf } from './primitives.js'
import { ProjectParams } from './projects.js'
import { defineRoute } from './route.js'
import { ScanState } from './scans.js'
import { SpectrumChoice, SpectrumUsed } from './spectra.js'

/** One junction's current and what it rests on; null where no scan stands for the junction. */
export const JunctionCurrent = z
  .object({
    junctionId: Id,
    position: z.int(),
    label: z.string(),
    scanId: Id.nullable(),
    scanState: ScanState.nullable(),
    jscMaCm2: z.number().nullable(),
    excessMaCm2: z.number().nullable().meta({ description: 'Above the limiting junction; null without matching' }),
    excessPercent: z.number().nullable(),
    rangeNm: z.tuple([z.number(), z.number()]).nullable(),
    points: z.int().nullable(),
    coverage: z
      .number()
      .nullable()
      .meta({ description: 'Share of the photon flux from 280 nm to the junction’s own edge that the scan covers' }),
    edgeResponse: z.object({ shortEqe: z.number(), longEqe: z.number() }).nullable(),
    gap: z
      .object({
        inflectionEv: z.number().meta({ description: 'Photon energy at the maximum of dEQE/dE' }),
        meanEv: z.number().nullable().meta({ description: 'Mean of the gap distribution between its half maxima' }),
      })
      .nullable(),
  })
  .meta({ id: 'JunctionCurrent' })
export type JunctionCurrent = z.infer<typeof JunctionCurrent>

export const JunctionPair = z
  .object({
    higher: z.int().meta({ description: 'Position of the junction with the larger current' }),
    lower: z.int(),
    differenceMaCm2: z.number(),
    mismatchPercent: z.number(),
  })
  .meta({ id: 'JunctionPair' })

export const Matching = z
  .object({
    deviceId: Id,
    spectrum: SpectrumUsed,
    wiring: z.enum(['series', 'independent']),
    complete: z.boolean().meta({ description: 'Every junction has a scan in use' }),
    missing: z.array(z.string()).meta({ description: 'What is needed before the stack can be judged, as sentences' }),
    junctions: z.array(JunctionCurrent),
    limitingJunction: z.int().nullable().meta({ description: 'Position; null when tied, incomplete or independent' }),
    limitingJunctions: z.array(z.int()).meta({ description: 'More than one on an exact tie' }),
    jLimMaCm2: z.number().nullable(),
    jMatchedMaCm2: z.number().nullable(),
    gainOpenMaCm2: z.number().nullable(),
    mismatchPercent: z.number().nullable(),
    pairs: z.array(JunctionPair),
    findings: z.array(Finding),
    worstFinding: Severity.nullable(),
  })
  .meta({ id: 'Matching' })
export type Matching = z.infer<typeof Matching>

export const DeviceSummary = z
  .object({ device: Device, matching: Matching, scanCount: z.int(), lastScanAt: Timestamp.nullable() })
  .meta({ id: 'DeviceSummary' })
export type DeviceSummary = z.infer<typeof DeviceSummary>

export const DeviceCurves = z
  .object({
    junctions: z.array(z.object({ junctionId: Id, position: z.int(), scanId: Id, curve: CurveData })),
    reflectance: z.object({ scanId: Id, curve: CurveData }).nullable(),
  })
  .meta({ id: 'DeviceCurves' })
export type DeviceCurves = z.infer<typeof DeviceCurves>

const group = 'Matching'

export const listDevices = defineRoute({
  id: 'listDevices',
  method: 'get',
  path: '/api/projects/:projectId/devices',
  group,
  summary: 'The devices of a project with their currents',
  access: { right: 'read' },
  params: ProjectParams,
  query: PageQuery.extend(SpectrumChoice.shape),
  reply: pageOf(DeviceSummary),
})

export const readMatching = defineRoute({
  id: 'readMatching',
  method: 'get',
  path: '/api/projects/:projectId/devices/:deviceId/matching',
  group,
  summary: 'Subcell currents, limiting junction, mismatch and findings of a device under a spectrum',
  access: { right: 'read' },
  params: DeviceParams,
  query: SpectrumChoice,
  reply: Matching,
})

export const readDeviceCurves = defineRoute({
  id: 'readDeviceCurves',
  method: 'get',
  path: '/api/projects/:projectId/devices/:deviceId/curves',
  group,
  summary: 'The curves of the scans in use',
  access: { right: 'read' },
  params: DeviceParams,
  reply: DeviceCurves,
})
