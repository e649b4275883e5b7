import { OPTICAL_CONSTANTS } from '../shared/data/optical-constants/index.js'
import { photovoltaicGap } from '../shared/physics/bandGap.js'
import { shortCircuitCurrentDensity } from '../shared/physics/currents.js'
import { DomainError } from '../shared/physics/errors.js'
import { matching } from '../shared/physics/matching.js'
import type { Spectrum } from '../shared/physics/spectrum.js'
import {
  compileDevice,
  evaluate,
  type Change,
  type ChangedJunction,
  type DeviceModel,
  type OpticalModelName,
} from '../shared/physics/whatIf/index.js'
import { analyseDevice, type Analysis } from './analyse.js'
import { chosenSpectrum } from './chosenSpectrum.js'
import { columns } from './columns.js'
import { commandArguments, type Command } from './command.js'
import { CommandError } from './commandError.js'
import { readDeviceFile } from './deviceFile.js'
import { measuredDevice, type MeasuredDevice } from './measuredDevice.js'
import { opticalDevice } from './opticalDevice.js'

/** The device with the change: what `analyse` says of a device, and what of it the scans do not carry. */
export interface ChangedAnalysis extends Analysis {
  junctions: (Analysis['junctions'][number] & {
    /** What rests on a collection efficiency continued beyond what was measured, in `jscMaCm2`. */
    continuedMaCm2: number
    /** Where a material is not known and the measured EQE was kept. */
    keptMeasuredNm: [number, number][]
  })[]
}

export interface WhatIfAnswer {
  model: OpticalModelName
  change: Change
  measured: Analysis
  changed: ChangedAnalysis
}

const MODELS: readonly OpticalModelName[] = ['beer-lambert', 'transfer-matrix']
const USAGE =
  'tierlight what-if device.json --set 1.thicknessNm=560 [--set 2.pathFactor=4] [--model beer-lambert|transfer-matrix] ' +
  '[--spectrum AM1.5G|AM1.5D|AM0|FILE] [--json]'

export const whatIf: Command = {
  name: 'what-if',
  usage: USAGE,
  summary: 'Currents of the measured device with thickness, gap, path factor or a layer changed.',
  description: [
    'device.json as for analyse; each junction with "thicknessNm" (nm), perhaps "pathFactor", and "absorber":',
    '{"material": "si-green-2008"} or {"bandGapEv": 1.68, "alpha0PerCm": 150000, "urbachMev": 15}. The transfer matrix',
    'also needs "layers" from the sunward side: {"name", "thicknessNm", "material" or an index, "coherent"} and',
    '{"junction": 1} for an absorber; "incidentIndex", "exit" and "angleDeg" where they are not 1, air and 0.',
    'Keys of --set: N.thicknessNm, N.bandGapEv, N.gapShiftEv, N.pathFactor, layer.NAME.thicknessNm; N from 1, sunward.',
    'The model gives only the ratio to the measured device: with nothing set the currents are the measured ones.',
  ].join('\n'),
  async run(args, output) {
    const { values, file } = commandArguments(USAGE, args, {
      set: { type: 'string', multiple: true, default: [] },
      model: { type: 'string', default: 'beer-lambert' },
      spectrum: { type: 'string', default: 'AM1.5G' },
      json: { type: 'boolean', default: false },
    })
    const model = MODELS.find((one) => one === values.model)
    if (!model) throw new CommandError(`There is no model "${values.model}"; there are: ${MODELS.join(', ')}.`, 2)
    const change = changeOf(values.set)
    const described = await readDeviceFile(file)
    const optics = opticalDevice(described.optics)
    if (model === 'transfer-matrix' && optics.layers === undefined)
      throw new CommandError(`${file} has no "layers"; the transfer matrix needs them from the sunward side.`)
    const device = await measuredDevice(described)
    const answer = changedDevice(device, optics, await chosenSpectrum(values.spectrum), model, change)
    output.out(values.json ? `${JSON.stringify(answer, null, 2)}\n` : answerText(device, answer))
  },
}

/** Pure: the device that was read, measured and changed. @throws CommandError with the engine's sentence. */
export function changedDevice(
  device: MeasuredDevice,
  optics: DeviceModel,
  spectrum: Spectrum,
  model: OpticalModelName,
  change: Change,
): WhatIfAnswer {
  try {
    const compiled = compileDevice({
      device: optics,
      eqe: device.junctions.map(({ curve }) => curve),
      spectrum: spectrum.curve,
      materials: OPTICAL_CONSTANTS,
      model,
      outsideMaterials: 'keep-measured',
    })
    const measured = analyseDevice(device, spectrum)
    const junctions = evaluate(compiled, change).junctions.map((junction, i) => ({
      ...measured.junctions[i]!,
      ...figuresOf(junction, spectrum),
    }))
    return {
      model,
      change,
      measured,
      changed: { ...measured, junctions, ...limitsOf(device, junctions), findings: [] },
    }
  } catch (error) {
    if (error instanceof DomainError) throw new CommandError(error.message)
    throw error
  }
}

function figuresOf({ eqe, beyond, continuedPartMaCm2, keptMeasuredNm }: ChangedJunction, spectrum: Spectrum) {
  const further = beyond ? shortCircuitCurrentDensity(beyond, spectrum) : 0
  return {
    jscMaCm2: shortCircuitCurrentDensity(eqe, spectrum) + further,
    bandGapEv: photovoltaicGap(eqe).gap?.inflectionEv ?? null,
    continuedMaCm2: continuedPartMaCm2,
    keptMeasuredNm: keptMeasuredNm.map(([from, to]): [number, number] => [from, to]),
  }
}

function limitsOf({ wiring }: MeasuredDevice, junctions: readonly { jscMaCm2: number }[]) {
  if (wiring === 'independent' || junctions.length < 2) return { limitingJunction: null, mismatchPercent: null }
  const currents = junctions.map(({ jscMaCm2 }) => jscMaCm2)
  const { limitingJunction, mismatchPercent } = matching(currents, 'series')
  return { limitingJunction, mismatchPercent }
}

function changeOf(settings: readonly string[]): Change {
  const change: Record<string, number> = {}
  for (const setting of settings) {
    const at = setting.lastIndexOf('=')
    const text = setting.slice(at + 1).trim()
    const value = Number(text)
    if (at < 1 || text === '' || !Number.isFinite(value))
      throw new CommandError(
        `--set ${setting} is not understood; write a key and a number: --set 1.thicknessNm=560.`,
        2,
      )
    const key = setting.slice(0, at).trim()
    if (Object.hasOwn(change, key)) throw new CommandError(`--set gives ${key} twice; give it once.`, 2)
    change[key] = value
  }
  return change
}

function answerText({ name, wiring }: MeasuredDevice, { model, change, measured, changed }: WhatIfAnswer): string {
  const settings = Object.entries(change).map(([key, value]) => `${key} = ${value}`)
  const kept = changed.junctions.flatMap(({ keptMeasuredNm }, i) =>
    keptMeasuredNm.map(
      ([from, to]) => `Junction ${i + 1}, ${from}–${to} nm: a material is not known there; the measured EQE was kept.`,
    ),
  )
  return `${[
    `${name || 'Device'} under ${measured.spectrum}, ${model}: ${settings.join(', ') || 'nothing changed'}`,
    '',
    columns([
      ['junction', '', 'measured J (mA/cm²)', 'changed J (mA/cm²)', 'difference (mA/cm²)', 'continued (mA/cm²)'],
      ...changed.junctions.map((one, i) => [
        String(i + 1),
        one.name,
        measured.junctions[i]!.jscMaCm2.toFixed(3),
        one.jscMaCm2.toFixed(3),
        (one.jscMaCm2 - measured.junctions[i]!.jscMaCm2).toFixed(3),
        one.continuedMaCm2.toFixed(3),
      ]),
    ]),
    '',
    `Measured: ${verdict(wiring, measured)}`,
    `Changed: ${verdict(wiring, changed)}`,
    ...(kept.length > 0 ? ['', ...kept] : []),
  ].join('\n')}\n`
}

function verdict(wiring: MeasuredDevice['wiring'], { limitingJunction, mismatchPercent, junctions }: Analysis): string {
  if (wiring === 'independent') return 'the junctions have terminals of their own: no matching applies.'
  if (mismatchPercent === null) return 'a single junction: there is nothing to match.'
  if (limitingJunction === null) return 'junctions carry exactly the same current: no single one limits.'
  return `junction ${limitingJunction} (${junctions[limitingJunction - 1]!.name}) limits; mismatch ${mismatchPercent.toFixed(2)} %.`
}
