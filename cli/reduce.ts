import { valueAt, type Curve } from '../shared/physics/curve.js'
import { DomainError } from '../shared/physics/errors.js'
import {
  internalQuantumEfficiency,
  reduceRawSignals,
  type ReducedScan,
} from '../shared/physics/measurement/rawSignals.js'
import { commandArguments, type Command } from './command.js'
import { CommandError } from './commandError.js'
import { readRawFile, type DescribedMeasurement } from './rawFile.js'

const USAGE = 'tierlight reduce raw.json [--json]'

export const reduce: Command = {
  name: 'reduce',
  usage: USAGE,
  summary: 'EQE from raw lock-in passes by substitution, as a CSV table.',
  description: [
    'raw.json: {"device": PASS, "reference": PASS, "calibration": "detector.csv", "areas": {"referenceCm2", "deviceCm2"},',
    '"corrections": {"temperature": 1.002}, "reflectance": "r.csv"}; areas only for an overfilled beam. Paths relative to',
    'the file. A PASS is {"file": "dut.csv", "wavelength": COLUMN, "signal": READING, "dark": READING, "monitor": COLUMN,',
    '"gainVA": 1e6 or "shuntOhm": 50}, also "sheet" and "wavelengthUnit"; a READING {"x", "y"}, {"magnitude", "phase"} (in',
    'degrees) or {"magnitude"} in V; a COLUMN a header, or a number from 1. The calibration may be in EQE, % or A/W; like',
    'the reflectance it may be {"file", "columns": {…}, "units": {…}}. The table has EQE as a fraction, and IQE where the',
    'reflectance reaches; remarks go to standard error. --json gives every factor.',
  ].join('\n'),
  async run(args, output) {
    const { values, file } = commandArguments(USAGE, args, { json: { type: 'boolean', default: false } })
    const { reduced, iqe } = reduceMeasurement(file, await readRawFile(file))
    if (values.json) return output.out(`${JSON.stringify(printed(reduced, iqe), null, 2)}\n`)
    output.out(table(reduced.eqe, iqe))
    output.err(reduced.remarks.map((remark) => `${remark}\n`).join(''))
  },
}

/** Pure: EQE, and IQE where a reflectance was given. */
export function reduceMeasurement(
  file: string,
  { raw, reflectance }: DescribedMeasurement,
): { reduced: ReducedScan; iqe: Curve | null } {
  try {
    const reduced = reduceRawSignals(raw)
    return { reduced, iqe: reflectance && internalQuantumEfficiency(reduced.eqe, reflectance) }
  } catch (error) {
    if (error instanceof DomainError) throw new CommandError(`${file}: ${error.message}`)
    throw error
  }
}

function table({ wavelengthNm, values }: Curve, iqe: Curve | null): string {
  const rows = Array.from(wavelengthNm, (nm, i) => {
    if (!iqe) return `${nm},${values[i]}`
    const isCovered = nm >= iqe.wavelengthNm[0]! && nm <= iqe.wavelengthNm.at(-1)!
    return `${nm},${values[i]},${isCovered ? valueAt(iqe, nm) : ''}`
  })
  return `${[iqe ? 'Wavelength (nm),EQE,IQE' : 'Wavelength (nm),EQE', ...rows].join('\n')}\n`
}

function printed({ eqe, factors, remarks }: ReducedScan, iqe: Curve | null) {
  const { wavelengthNm, deviceGainVA, referenceGainVA, areaRatio, correction, ...columns } = factors
  return {
    wavelengthNm: Array.from(wavelengthNm),
    eqe: Array.from(eqe.values),
    iqe: iqe && { wavelengthNm: Array.from(iqe.wavelengthNm), values: Array.from(iqe.values) },
    factors: {
      referenceEqe: Array.from(columns.referenceEqe),
      deviceSignalV: Array.from(columns.deviceSignalV),
      referenceSignalV: Array.from(columns.referenceSignalV),
      monitorRatio: Array.from(columns.monitorRatio),
      deviceGainVA,
      referenceGainVA,
      areaRatio,
      correction,
    },
    remarks,
  }
}
