import { photovoltaicGap } from '../shared/physics/bandGap.js'
import { runChecks } from '../shared/physics/checks/index.js'
import { shortCircuitCurrentDensity } from '../shared/physics/currents.js'
import { rangeNm } from '../shared/physics/curve.js'
import { DomainError } from '../shared/physics/errors.js'
import { matching } from '../shared/physics/matching.js'
import type { Spectrum } from '../shared/physics/spectrum.js'
import { commandArguments, type Command } from './command.js'
import { CommandError } from './commandError.js'
import { chosenSpectrum } from './chosenSpectrum.js'
import { readDeviceFile } from './deviceFile.js'
import { measuredDevice, type MeasuredDevice } from './measuredDevice.js'
import { analysisText } from './analysisText.js'

export interface Analysis {
  spectrum: string
  junctions: {
    name: string
    jscMaCm2: number
    bandGapEv: number | null
    rangeNm: [number, number]
    points: number
  }[]
  /** 1 is the sunward junction; null when junctions are independent or tie exactly. */
  limitingJunction: number | null
  mismatchPercent: number | null
  findings: { check: string; severity: 'note' | 'caution' | 'reject'; junction: number; message: string }[]
}

const USAGE = 'tierlight analyse device.json [--spectrum AM1.5G|AM1.5D|AM0|FILE] [--json]'

export const analyse: Command = {
  name: 'analyse',
  usage: USAGE,
  summary: 'Subcell currents, limiting junction, mismatch and findings of a device.',
  description: [
    'device.json: {"device": "…", "terminals": "2-terminal", "junctions": [{"name": "top", "scan": "top.csv"}, …],',
    '"reflectance": "r.csv"}. Junctions from the sunward side, paths relative to the file. A scan may add "sheet",',
    '"columns": {"wavelength": …, "eqe": …} (header, or number from 1), "units": {"wavelength": "nm", "eqe": "%"} and',
    '"conditions": {"biasLight": [{"centreNm", "fwhmNm", "irradianceWM2"}], "biasVoltageV", "chopperHz", "temperatureC"}.',
  ].join('\n'),
  async run(args, output) {
    const { values, file } = commandArguments(USAGE, args, {
      spectrum: { type: 'string', default: 'AM1.5G' },
      json: { type: 'boolean', default: false },
    })
    const device = await measuredDevice(await readDeviceFile(file))
    const spectrum = await chosenSpectrum(values.spectrum)
    const analysis = analyseDevice(device, spectrum)
    output.out(values.json ? `${JSON.stringify(analysis, null, 2)}\n` : analysisText(device, spectrum, analysis))
  },
}

/** Pure: the analysis of a device that was read. */
export function analyseDevice(device: MeasuredDevice, spectrum: Spectrum): Analysis {
  const currents = device.junctions.map(({ curve }) => shortCircuitCurrentDensity(curve, spectrum))
  return {
    spectrum: spectrum.name,
    junctions: device.junctions.map(({ name, curve }, i) => ({
      name,
      jscMaCm2: currents[i]!,
      bandGapEv: photovoltaicGap(curve).gap?.inflectionEv ?? null,
      rangeNm: rangeNm(curve),
      points: curve.values.length,
    })),
    ...limits(device, currents),
    findings: device.junctions.flatMap(({ curve, conditions }, i) =>
      runChecks({
        scan: curve,
        junctionIndex: i,
        junctions: device.junctions.map((junction) => ({ scan: junction.curve })),
        connection: device.wiring,
        conditions,
        reflectance: device.reflectance,
        spectrum,
      }).findings.map(({ check, severity, message }) => ({ check, severity, junction: i + 1, message })),
    ),
  }
}

function limits(device: MeasuredDevice, currents: number[]): Pick<Analysis, 'limitingJunction' | 'mismatchPercent'> {
  if (device.wiring === 'independent' || currents.length < 2) return { limitingJunction: null, mismatchPercent: null }
  try {
    const { limitingJunction, mismatchPercent } = matching(currents, 'series')
    return { limitingJunction, mismatchPercent }
  } catch (error) {
    if (error instanceof DomainError) throw new CommandError(error.message)
    throw error
  }
}
