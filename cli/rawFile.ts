import { dirname } from 'node:path'
import { z } from 'zod'
import { readMeasurementFile } from '../server/reading/readMeasurementFile.js'
import { ReadingError } from '../server/reading/readingError.js'
import type { LockInReading, RawMeasurement, RawPass } from '../shared/physics/measurement/rawSignals.js'
import type { Curve } from '../shared/physics/curve.js'
import { CommandError } from './commandError.js'
import { readJsonFile } from './jsonFile.js'
import { columnOf, openFile, proposal, readScan, unitOf, WAVELENGTH_UNITS } from './readScan.js'

const Column = z.union([z.string().min(1), z.int().min(1, 'Columns count from 1.')])
const Reading = z.union(
  [z.strictObject({ x: Column, y: Column }), z.strictObject({ magnitude: Column, phase: Column.optional() })],
  { error: 'Give {"x", "y"}, {"magnitude", "phase"} or {"magnitude"}.' },
)
type Reading = z.infer<typeof Reading>

const Pass = z
  .strictObject({
    file: z.string().min(1),
    sheet: z.string().optional(),
    wavelength: Column,
    wavelengthUnit: z.string().default('nm'),
    signal: Reading,
    dark: Reading.optional(),
    monitor: Column.optional(),
    gainVA: z.number().positive().optional(),
    shuntOhm: z.number().positive().optional(),
  })
  .refine(({ gainVA, shuntOhm }) => (gainVA === undefined) !== (shuntOhm === undefined), {
    error: 'Give either "gainVA" or "shuntOhm".',
  })
type Pass = z.infer<typeof Pass>

const ScanFile = z.union([
  z.string().min(1),
  z.strictObject({
    file: z.string().min(1),
    sheet: z.string().optional(),
    columns: z
      .strictObject({ wavelength: Column.optional(), eqe: Column.optional(), reflectance: Column.optional() })
      .default({}),
    units: z
      .strictObject({
        wavelength: z.string().optional(),
        eqe: z.string().optional(),
        reflectance: z.string().optional(),
      })
      .default({}),
  }),
])

const RawFile = z.strictObject({
  device: Pass,
  reference: Pass,
  calibration: ScanFile,
  areas: z.strictObject({ referenceCm2: z.number().positive(), deviceCm2: z.number().positive() }).optional(),
  corrections: z.record(z.string(), z.number().positive()).default({}),
  reflectance: ScanFile.optional(),
})

export interface DescribedMeasurement {
  raw: RawMeasurement
  reflectance: Curve | null
}

/** Reads a raw file and every file that it names. @throws CommandError: one sentence with file, place and reason. */
export async function readRawFile(path: string): Promise<DescribedMeasurement> {
  const { device, reference, calibration, areas, corrections, reflectance } = await readJsonFile(path, RawFile)
  const folder = dirname(path)
  return {
    raw: {
      device: await passOf(folder, device),
      reference: await passOf(folder, reference),
      // The reader turns a responsivity in A/W into EQE.
      calibration: { curve: await readScan(folder, scanReference(calibration), 'eqe', ''), unit: 'eqe' },
      ...(areas && { overfilled: areas }),
      corrections,
    },
    reflectance:
      reflectance === undefined ? null : await readScan(folder, scanReference(reflectance), 'reflectance', ''),
  }
}

function scanReference(scan: z.infer<typeof ScanFile>) {
  if (typeof scan === 'string') return { file: scan, sheet: undefined, columns: {}, units: {} }
  return { file: scan.file, sheet: scan.sheet, columns: scan.columns, units: scan.units }
}

async function passOf(folder: string, pass: Pass): Promise<RawPass> {
  const { path, bytes } = await openFile(folder, pass.file)
  const named = [pass.signal, pass.dark].flatMap((one) => (one ? Object.values(one) : []))
  const columns = pass.monitor === undefined ? named : [...named, pass.monitor]
  const { wavelengthNm, values } = readColumns(path, bytes, pass, columns)
  const column = (name: string | number): Float64Array => values[columns.indexOf(name)]!
  return {
    wavelengthNm,
    signal: readingOf(pass.signal, column),
    ...(pass.dark && { dark: readingOf(pass.dark, column) }),
    ...(pass.monitor !== undefined && { monitor: column(pass.monitor) }),
    gain: pass.shuntOhm === undefined ? { transimpedanceVA: pass.gainVA! } : { shuntOhm: pass.shuntOhm },
  }
}

function readColumns(
  path: string,
  bytes: Uint8Array,
  pass: Pass,
  names: readonly (string | number)[],
): { wavelengthNm: Float64Array; values: Float64Array[] } {
  try {
    const tables = proposal(bytes, path, 'irradiance').tables.filter(
      (one) => pass.sheet === undefined || one.sheet === pass.sheet,
    )
    const table = tables[0]
    if (!table) throw new CommandError(`${path} has no sheet "${pass.sheet}".`)
    const wanted = names.map((name) => columnOf(path, table, name).index)
    // Voltages need no conversion: a column in the reader's base unit is given as it stands.
    const { scans } = readMeasurementFile(bytes, path, {
      mapping: {
        sheet: table.sheet,
        tableIndex: table.tableIndex,
        wavelength: {
          column: columnOf(path, table, pass.wavelength).index,
          unit: unitOf(path, pass.wavelengthUnit, WAVELENGTH_UNITS),
        },
        series: [...new Set(wanted)].map((column) => ({
          column,
          quantity: 'irradiance',
          unit: 'W/m2/nm',
          label: String(column + 1),
        })),
      },
    })
    const { wavelengthNm } = scans[0]!
    const values = wanted.map((column, i) => {
      const scan = scans.find((one) => one.column === column)!
      if (scan.values.length === wavelengthNm.length) return scan.values
      throw new CommandError(
        `${path}: column "${names[i]}" has ${scan.values.length} values where the pass has ${wavelengthNm.length} wavelengths.`,
      )
    })
    return { wavelengthNm, values }
  } catch (error) {
    if (!(error instanceof ReadingError)) throw error
    const { line } = error.details
    throw new CommandError(`${path}${line === undefined ? '' : `, line ${line}`}: ${error.message}`)
  }
}

function readingOf(reading: Reading, column: (name: string | number) => Float64Array): LockInReading {
  if ('x' in reading) return { inPhaseV: column(reading.x), quadratureV: column(reading.y) }
  const magnitudeV = column(reading.magnitude)
  return reading.phase === undefined ? { magnitudeV } : { magnitudeV, phaseDeg: column(reading.phase) }
}
