import { STANDARD_TEMPERATURE_K } from '../shared/physics/constants.js'
import { DomainError } from '../shared/physics/errors.js'
import { planBias } from '../shared/physics/measurement/biasPlan.js'
import { ASSUMED_RADIATIVE_EFFICIENCY, diodeByReciprocity } from '../shared/physics/measurement/planInputs.js'
import { columns } from './columns.js'
import { commandArguments, type Command } from './command.js'
import { CommandError } from './commandError.js'
import { readDeviceFile, type LightSource } from './deviceFile.js'
import { measuredDevice, type MeasuredDevice } from './measuredDevice.js'

export interface PrintedPlan {
  device: string
  /** Junction under test, 1 is the sunward one. */
  junction: number
  /** Whether the sources make the junction limit at all. */
  isPossible: boolean
  sources: { name: string; irradianceWM2: number; maxIrradianceWM2: number }[]
  totalIrradianceWM2: number
  biasVoltageV: number
  marginMaCm2: number
  relativeMargin: number | null
  junctions: { name: string; photocurrentMaCm2: number; selectivity: number }[]
}

const USAGE = 'tierlight bias-plan device.json --junction N [--total W/m²] [--json]'

export const biasPlan: Command = {
  name: 'bias-plan',
  usage: USAGE,
  summary: 'Bias-light intensities and bias voltage that make one junction limit.',
  description: [
    'device.json as for analyse, with "sources": [{"name", "centreNm", "fwhmNm", "maxIrradianceWM2"}]; the highest',
    'irradiance is that at the sample plane. --junction counts from 1 at the sunward side; --total caps the sum of all',
    `irradiances. Diodes by reciprocity with an external radiative efficiency of ${ASSUMED_RADIATIVE_EFFICIENCY}, n = 1,`,
    'no shunt, 25 °C, no luminescent coupling. The rules of your laboratory come first: eye protection, and the',
    'reverse-bias limit of the cell.',
  ].join('\n'),
  async run(args, output) {
    const { values, file } = commandArguments(USAGE, args, {
      junction: { type: 'string' },
      total: { type: 'string' },
      json: { type: 'boolean', default: false },
    })
    const described = await readDeviceFile(file)
    const junction = numberOf('junction', values.junction)
    const total = values.total === undefined ? undefined : numberOf('total', values.total)
    if (described.sources.length === 0)
      throw new CommandError(`${file} has no "sources"; list the light sources of the bench to plan with.`)
    const plan = planFor(await measuredDevice(described), described.sources, junction, total)
    output.out(values.json ? `${JSON.stringify(plan, null, 2)}\n` : planText(plan))
  },
}

/** Pure: the plan for a device that was read. */
export function planFor(
  device: MeasuredDevice,
  sources: readonly LightSource[],
  junction: number,
  largestTotalWM2?: number,
): PrintedPlan {
  if (device.wiring === 'independent')
    throw new CommandError('The junctions have terminals of their own: each is measured without bias light.')
  if (!Number.isInteger(junction) || junction < 1 || junction > device.junctions.length)
    throw new CommandError(
      `There is no junction ${junction}; the device has ${device.junctions.length}, from 1 at the sunward side.`,
    )
  try {
    const eqes = device.junctions.map(({ curve }) => curve)
    const plan = planBias(
      {
        eqes,
        diodes: eqes.map((eqe) => {
          const { saturationCurrentMaCm2 } = diodeByReciprocity(eqe, STANDARD_TEMPERATURE_K)
          return { saturationCurrentMaCm2 }
        }),
        temperatureK: STANDARD_TEMPERATURE_K,
      },
      sources.map(({ name, centreNm, fwhmNm, maxIrradianceWM2 }) => ({
        name,
        centreNm,
        fwhmNm,
        irradianceWM2: maxIrradianceWM2,
      })),
      junction - 1,
      largestTotalWM2 === undefined ? {} : { largestTotalWM2 },
    )
    return {
      device: device.name,
      junction,
      isPossible: plan.isPossible,
      sources: sources.map(({ name, maxIrradianceWM2 }, i) => ({
        name,
        irradianceWM2: plan.irradiancesWM2[i]!,
        maxIrradianceWM2,
      })),
      totalIrradianceWM2: plan.totalIrradianceWM2,
      biasVoltageV: plan.biasVoltageV,
      marginMaCm2: plan.marginMaCm2,
      relativeMargin: plan.relativeMargin,
      junctions: device.junctions.map(({ name }, i) => ({
        name,
        photocurrentMaCm2: plan.photocurrentsMaCm2[i]!,
        selectivity: plan.selectivities[i]!,
      })),
    }
  } catch (error) {
    if (error instanceof DomainError) throw new CommandError(error.message)
    throw error
  }
}

function planText(plan: PrintedPlan): string {
  const name = plan.junctions[plan.junction - 1]!.name
  return `${[
    `${plan.device || 'Device'}, junction ${plan.junction} (${name}) under test`,
    '',
    columns([
      ['source', '', 'set to (W/m²)', 'highest (W/m²)'],
      ...plan.sources.map((one) => [one.name, '', one.irradianceWM2.toFixed(1), one.maxIrradianceWM2.toFixed(1)]),
    ]),
    '',
    `Bias voltage ${plan.biasVoltageV.toFixed(3)} V; total ${plan.totalIrradianceWM2.toFixed(1)} W/m²`,
    plan.isPossible
      ? `Margin ${plan.marginMaCm2.toFixed(3)} mA/cm²: junction ${plan.junction} limits.`
      : `These sources cannot make junction ${plan.junction} limit.`,
    '',
    columns([
      ['junction', '', 'photocurrent (mA/cm²)', 'selectivity'],
      ...plan.junctions.map((one, i) => [
        String(i + 1),
        one.name,
        one.photocurrentMaCm2.toFixed(3),
        one.selectivity.toFixed(4),
      ]),
    ]),
    '',
    'Diodes by reciprocity (estimated). Eye protection, the reverse-bias limit of the cell, and the rules of your',
    'laboratory come first.',
  ].join('\n')}\n`
}

function numberOf(option: string, text: string | undefined): number {
  const value = Number(text)
  if (text !== undefined && text.trim() !== '' && Number.isFinite(value)) return value
  throw new CommandError(`--${option} needs a number. Usage: ${USAGE}`, 2)
}
