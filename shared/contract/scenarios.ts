import { z } from 'zod'
import { DeviceParams } from './devices.js'
import { Finite, Id, Name, Nothing, PersonReference, Positive, Reason, Timestamp, Version } from './primitives.js'
import { ProjectParams } from './projects.js'
import { defineRoute } from './route.js'
import { SpectrumId, SpectrumUsed } from './spectra.js'
import { OpticalModel } from './whatIf.js'

export const Change = z
  .record(z.string().min(1).max(100), Finite)
  .refine((change) => Object.keys(change).length <= 100, 'A change has at most 100 values.')
  .meta({ description: 'Changed values by key, for example 1.thicknessNm, 2.pathFactor, layer.ARC.thicknessNm' })

const Figures = z.object({
  currentsMaCm2: z.array(z.number()),
  limitingJunctions: z.array(z.int()).meta({ description: 'Positions; empty where junctions are independent' }),
  jLimMaCm2: z.number().nullable(),
  mismatchPercent: z.number().nullable(),
  gainOpenMaCm2: z.number().nullable(),
  power: z
    .object({
      openCircuitV: z.number(),
      fillFactor: z.number(),
      powerMwCm2: z.number(),
      efficiency: z.number().meta({ description: 'Fraction of the irradiance' }),
    })
    .nullable()
    .meta({ description: 'An estimate for the stack in series; what it takes for granted is in the assumptions' }),
})

export const ScenarioResult = z
  .object({
    measured: Figures,
    changed: Figures.extend({
      continuedMaCm2: z.array(z.number()).meta({ description: 'Share of each current beyond what was measured' }),
      keptMeasuredNm: z.array(z.array(z.tuple([z.number(), z.number()]))),
    }),
    assumptions: z.array(z.string()),
  })
  .meta({ id: 'ScenarioResult' })
export type ScenarioResult = z.infer<typeof ScenarioResult>

export const ScenarioInputs = z
  .object({
    engineVersion: z.string(),
    spectrumSha256: z.string(),
    descriptionSha256: z.string(),
    scans: z.array(z.object({ position: z.int(), scanId: Id, sha256: z.string() })),
  })
  .meta({ id: 'ScenarioInputs', description: 'What the result was computed from; hashes are of the Float64 values' })
export type ScenarioInputs = z.infer<typeof ScenarioInputs>

export const Scenario = z
  .object({
    id: Id,
    deviceId: Id,
    name: z.string(),
    reason: z.string(),
    model: OpticalModel,
    change: Change,
    spectrum: SpectrumUsed,
    result: ScenarioResult,
    inputs: ScenarioInputs,
    stale: z.object({ changed: z.array(z.string()).meta({ description: 'What changed since, as sentences' }) }),
    madeBy: PersonReference,
    madeAt: Timestamp,
    version: Version,
  })
  .meta({ id: 'Scenario' })
export type Scenario = z.infer<typeof Scenario>

export const NewScenario = z.strictObject({
  name: Name,
  reason: Reason,
  model: OpticalModel.default('beer-lambert'),
  change: Change,
  spectrum: SpectrumId.default('AM1.5G'),
  scaleToWM2: Positive.max(1e6).optional(),
  claimed: z
    .string()
    .regex(/^([0-9a-f]{16})+$/)
    .optional()
    .meta({ description: 'Bits of the changed currents that the sender computed, 16 hexadecimal digits each' }),
})
export type NewScenario = z.infer<typeof NewScenario>

/** The bits of some numbers, big-endian: equal only where every number is equal to the last bit. */
export function float64Bits(values: readonly number[]): string {
  const view = new DataView(new ArrayBuffer(8))
  return values
    .map((value) => {
      view.setFloat64(0, value)
      return view.getBigUint64(0).toString(16).padStart(16, '0')
    })
    .join('')
}

const ScenarioParams = ProjectParams.extend({ scenarioId: Id })
const group = 'Scenarios'
const ofDevice = '/api/projects/:projectId/devices/:deviceId/scenarios'
const one = '/api/projects/:projectId/scenarios/:scenarioId'

export const listScenarios = defineRoute({
  id: 'listScenarios',
  method: 'get',
  path: ofDevice,
  group,
  summary: 'The scenarios of a device, oldest first, with what has changed since',
  access: { right: 'read' },
  params: DeviceParams,
  reply: z.object({ items: z.array(Scenario) }),
})

export const exportScenarios = defineRoute({
  id: 'exportScenarios',
  method: 'get',
  path: `${ofDevice}/file`,
  group,
  summary: 'The measured device and its scenarios side by side, as XLSX or CSV',
  access: { right: 'read' },
  params: DeviceParams,
  query: z.object({ format: z.enum(['xlsx', 'csv']).default('xlsx') }),
  transfer: 'bytes',
  reply: Nothing,
})

export const createScenario = defineRoute({
  id: 'createScenario',
  method: 'post',
  path: ofDevice,
  group,
  summary: 'Save a scenario; the server computes it again and compares with what was claimed',
  access: { right: 'run-analyses' },
  params: DeviceParams,
  body: NewScenario,
  reply: Scenario,
  status: 201,
})

export const readScenario = defineRoute({
  id: 'readScenario',
  method: 'get',
  path: one,
  group,
  summary: 'One scenario',
  access: { right: 'read' },
  params: ScenarioParams,
  reply: Scenario,
})

export const updateScenario = defineRoute({
  id: 'updateScenario',
  method: 'patch',
  path: one,
  group,
  summary: 'Change name and reason of a scenario; its numbers stay',
  access: { right: 'run-analyses' },
  params: ScenarioParams,
  body: z.strictObject({ version: Version, name: Name, reason: Reason }),
  reply: Scenario,
})

export const deleteScenario = defineRoute({
  id: 'deleteScenario',
  method: 'delete',
  path: one,
  group,
  summary: 'Delete a scenario; it can be restored for thirty days',
  access: { right: 'run-analyses' },
  params: ScenarioParams,
  reply: Nothing,
})

export const restoreScenario = defineRoute({
  id: 'restoreScenario',
  method: 'post',
  path: `${one}/restoration`,
  group,
  summary: 'Bring a deleted scenario back',
  access: { right: 'run-analyses' },
  params: ScenarioParams,
  reply: Scenario,
})
