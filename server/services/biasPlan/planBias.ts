import type { BiasEvaluation, BiasPlan, BiasPlanRequest } from '../../../shared/contract/biasPlan.js'
import { ApiError } from '../../../shared/contract/errors.js'
import { makeCurve } from '../../../shared/physics/curve.js'
import { DomainError } from '../../../shared/physics/errors.js'
import type { BiasSource } from '../../../shared/physics/measurement/biasLight.js'
import {
  evaluateBias,
  planBias as plan,
  type BiasEvaluation as EngineEvaluation,
} from '../../../shared/physics/measurement/biasPlan.js'
import type { BenchItem } from '../../database/entities/BenchItem.js'
import { benchItems } from '../../database/repositories/bench.js'
import { deviceWithJunctions } from '../../database/repositories/devices.js'
import { scanOfProject } from '../../database/repositories/scans.js'
import type { Database, Work } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { recordedConditions } from '../checks/checkedScan.js'
import { foundDevice } from '../devices/findDevice.js'
import type { MeasuredScan } from '../matching/measuredDevice.js'
import { measureDevices } from '../matching/measureDevices.js'
import { requireMember } from '../rights.js'
import { planInputs, type PlanInputs } from './planInputs.js'

const CAUTIONS = [
  'Bias light: wear eye protection for the wavelengths in use, and mind reflections.',
  'Bias voltage: stay within the reverse-bias limit of the cell; a junction that limits can be driven into reverse.',
  'The rules of your laboratory come before this sheet.',
]

/** Intensities and bias voltage that make a junction limit by the widest margin, beside what the lab used. */
export async function planBias(
  { work }: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
  request: BiasPlanRequest,
): Promise<BiasPlan> {
  await requireMember(work, actor, projectId, 'read')
  const described = foundDevice(await deviceWithJunctions(work, projectId, deviceId))
  const place = described.junctions.findIndex((junction) => junction.id === request.junctionId)
  if (place < 0) throw invalid(['junctionId'], 'The junction is not one of this device.')
  if (described.terminals === '4-terminal')
    throw new ApiError(
      'STATE_CONFLICT',
      { reason: 'independent-junctions' },
      'The junctions have terminals of their own: each is measured without bias light.',
    )
  const items = await chosenSources(work, projectId, request.lightSourceIds)
  const [device] = await measureDevices(work, [described])
  const sources = items.map(sourceOf)
  const { inputs, isPossible, best } = planned(() => {
    const inputs = planInputs(device!.measured, described.junctions, request)
    const { isPossible, ...best } = plan(inputs.device, sources, place, {
      ...(request.largestTotalWM2 !== null && { largestTotalWM2: request.largestTotalWM2 }),
    })
    return { inputs, isPossible, best }
  })
  return {
    deviceId,
    junctionId: request.junctionId,
    position: place + 1,
    junctions: inputs.junctions,
    isPossible,
    plan: presentEvaluation(
      best,
      items.map((item) => ({
        lightSourceId: item.id,
        name: item.name,
        highestIrradianceWM2: item.content.highestIrradianceWM2,
      })),
    ),
    used: await usedInLab(work, projectId, device!.measured.junctions[place]!.scan, inputs, place),
    cautions: CAUTIONS,
  }
}

async function chosenSources(
  work: Work,
  projectId: string,
  ids: readonly string[] | null,
): Promise<BenchItem<'light-source'>[]> {
  const library = await benchItems(work, projectId, 'light-source')
  const chosen = ids === null ? library : library.filter((item) => ids.includes(item.id))
  if (ids !== null && chosen.length < new Set(ids).size)
    throw invalid(['lightSourceIds'], 'Some of the light sources are not in the library of this project.')
  if (chosen.length === 0)
    throw new ApiError(
      'STATE_CONFLICT',
      { reason: 'no-light-source' },
      'There is no light source to plan with; add at least one to the library of the project.',
    )
  return chosen
}

function sourceOf({ name, content }: BenchItem<'light-source'>): BiasSource {
  const irradianceWM2 = content.highestIrradianceWM2
  if (content.kind === 'led') return { name, centreNm: content.centreNm, fwhmNm: content.fwhmNm, irradianceWM2 }
  return { name, spectrum: makeCurve(content.curve.wavelengthNm, content.curve.values), irradianceWM2 }
}

/** What the conditions of the scan in use say that the lab did; null where they do not say enough. */
async function usedInLab(
  work: Work,
  projectId: string,
  scan: MeasuredScan | null,
  { device }: PlanInputs,
  place: number,
): Promise<BiasPlan['used']> {
  const recorded = scan && recordedConditions(scan.conditions)
  if (!scan || !recorded?.biasLight) return null
  const row = await scanOfProject(work, projectId, scan.id)
  const evaluation = planned(() => evaluateBias(device, recorded.biasLight!, place, recorded.biasVoltageV ?? undefined))
  return {
    scanId: scan.id,
    label: row?.label ?? '',
    evaluation: presentEvaluation(
      evaluation,
      recorded.biasLight.map(({ name }) => ({
        lightSourceId: null,
        name: name ?? 'bias light',
        highestIrradianceWM2: null,
      })),
    ),
  }
}

function presentEvaluation(
  { irradiancesWM2, ...rest }: EngineEvaluation,
  sources: readonly Omit<BiasEvaluation['sources'][number], 'irradianceWM2'>[],
): BiasEvaluation {
  return { ...rest, sources: sources.map((source, i) => ({ ...source, irradianceWM2: irradiancesWM2[i]! })) }
}

/** Runs the engine; what it refuses becomes its sentence. */
function planned<Result>(compute: () => Result): Result {
  try {
    return compute()
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    throw invalid([], error.message)
  }
}

function invalid(path: string[], message: string): ApiError<'INPUT_INVALID'> {
  return new ApiError('INPUT_INVALID', { errors: [{ path, message }] }, message)
}
