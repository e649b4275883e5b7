import { z } from 'zod'
import { DeviceParams } from './devices.js'
import { CurveData, Finite, Id, Positive } from './primitives.js'
import { defineRoute } from './route.js'

/** What a person may change of a junction's diode; what is left out is taken by reciprocity from its curve. */
export const DiodeChoice = z
  .strictObject({
    saturationCurrentMaCm2: Positive.max(1e3).nullable().default(null),
    ideality: Positive.max(10).default(1),
    shuntResistanceKohmCm2: Positive.max(1e9).nullable().default(null),
    externalRadiativeEfficiency: Positive.max(1).nullable().default(null).meta({ description: '0.01 unless given' }),
  })
  .meta({ id: 'DiodeChoice' })
export type DiodeChoice = z.infer<typeof DiodeChoice>

export const BiasPlanRequest = z.strictObject({
  junctionId: Id.meta({ description: 'The junction under test' }),
  lightSourceIds: z
    .array(Id)
    .max(24)
    .nullable()
    .default(null)
    .meta({ description: 'Null: every source of the library' }),
  largestTotalWM2: Positive.max(1e6).nullable().default(null),
  temperatureC: Finite.min(-200).max(200).default(25),
  seriesResistanceKohmCm2: z.number().min(0).max(10).default(0),
  diodes: z.array(DiodeChoice).max(4).default([]).meta({ description: 'Sunward first' }),
  couplingToNext: z
    .array(z.number().min(0).max(1))
    .max(3)
    .default([])
    .meta({ description: 'Luminescent coupling η from each junction to the next; left out: none' }),
})
export type BiasPlanRequest = z.infer<typeof BiasPlanRequest>

/** What intensities and a bias voltage do. */
export const BiasEvaluation = z
  .object({
    sources: z.array(
      z.object({
        lightSourceId: Id.nullable(),
        name: z.string(),
        irradianceWM2: z.number(),
        highestIrradianceWM2: z.number().nullable(),
      }),
    ),
    totalIrradianceWM2: z.number(),
    biasVoltageV: z.number(),
    photocurrentsMaCm2: z.array(z.number()),
    marginMaCm2: z.number().meta({ description: 'Smallest other photocurrent less that of the junction under test' }),
    relativeMargin: z.number().nullable(),
    selectivities: z.array(z.number()),
    selectivitiesWithCoupling: z.array(z.number()),
    operatingVoltagesV: z.array(z.number()),
  })
  .meta({ id: 'BiasEvaluation' })
export type BiasEvaluation = z.infer<typeof BiasEvaluation>

export const BiasPlan = z
  .object({
    deviceId: Id,
    junctionId: Id,
    position: z.int(),
    junctions: z.array(
      z.object({
        junctionId: Id,
        position: z.int(),
        label: z.string(),
        curveFrom: z.enum(['measured', 'estimated']).meta({ description: 'estimated: from the nominal gaps' }),
        curve: CurveData,
        diode: z.object({
          saturationCurrentMaCm2: z.number(),
          ideality: z.number(),
          shuntResistanceKohmCm2: z.number().nullable(),
          from: z.enum(['reciprocity', 'given']),
          radiativeCurrentMaCm2: z.number(),
          externalRadiativeEfficiency: z.number().nullable(),
        }),
      }),
    ),
    isPossible: z.boolean().meta({ description: 'The sources make the junction under test limit' }),
    plan: BiasEvaluation,
    used: z
      .object({ scanId: Id, label: z.string(), evaluation: BiasEvaluation })
      .nullable()
      .meta({ description: 'What the conditions of the scan in use say that the lab did; null when not recorded' }),
    cautions: z.array(z.string()),
  })
  .meta({ id: 'BiasPlan' })
export type BiasPlan = z.infer<typeof BiasPlan>

export const planBias = defineRoute({
  id: 'planBias',
  method: 'post',
  path: '/api/projects/:projectId/devices/:deviceId/bias-plan',
  group: 'Bias plan',
  summary: 'Intensities and bias voltage that make a junction limit; nothing is saved',
  access: { right: 'read' },
  params: DeviceParams,
  body: BiasPlanRequest,
  reply: BiasPlan,
})
