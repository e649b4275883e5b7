import { dirname } from 'node:path'
import { z } from 'zod'
import { readJsonFile } from './jsonFile.js'

const Column = z.union([z.string().min(1), z.int().min(1, 'Columns count from 1.')])
const Columns = z.strictObject({
  wavelength: Column.optional(),
  eqe: Column.optional(),
  reflectance: Column.optional(),
})
const Units = z.strictObject({
  wavelength: z.string().optional(),
  eqe: z.string().optional(),
  reflectance: z.string().optional(),
})

const BiasSource = z.strictObject({
  name: z.string().optional(),
  centreNm: z.number().positive(),
  fwhmNm: z.number().positive(),
  irradianceWM2: z.number().nonnegative(),
})

/** A light source for a bias plan. */
const LightSource = z.strictObject({
  name: z.string().min(1),
  centreNm: z.number().positive(),
  fwhmNm: z.number().positive(),
  maxIrradianceWM2: z.number().positive(),
})
export type LightSource = z.infer<typeof LightSource>

/** How a scan was taken; what is left out is not checked. */
export const ScanConditions = z.strictObject({
  biasLight: z.array(BiasSource).optional(),
  biasVoltageV: z.number().optional(),
  chopperHz: z.number().nonnegative().optional(),
  temperatureC: z.number().optional(),
})

const reading = { sheet: z.string().optional(), columns: Columns.optional(), units: Units.optional() }
const ScanFile = z.union([
  z.string().min(1),
  z.strictObject({ file: z.string().min(1), ...reading, conditions: ScanConditions.optional() }),
])

/** A junction from the sunward side. Keys of other commands are let through, unknown ones are not. */
const Junction = z.strictObject({
  name: z.string().min(1),
  scan: ScanFile,
  ...reading,
  conditions: ScanConditions.optional(),
  thicknessNm: z.number().positive().optional(),
  pathFactor: z.number().positive().optional(),
  absorber: z.looseObject({}).optional(),
})

const TERMINALS = /^\s*(2|3|4)[- ](terminals?|junctions?)([- ]series)?\s*$/i

const DeviceFile = z.strictObject({
  device: z.string().default(''),
  terminals: z
    .string()
    .regex(TERMINALS, 'Say "2-terminal", "4-terminal", "3-junction" or "4-junction".')
    .default('2-terminal'),
  junctions: z.array(Junction).min(1, 'A device has at least one junction.').max(6),
  reflectance: ScanFile.optional(),
  sources: z.array(LightSource).default([]),
  layers: z.array(z.looseObject({})).optional(),
  incidentIndex: z.number().positive().optional(),
  exit: z.union([z.string().min(1), z.number().positive()]).optional(),
  angleDeg: z.number().min(0).lt(90).optional(),
})

export type ScanConditions = z.infer<typeof ScanConditions>

/** One scan as the file describes it. */
export interface ScanReference {
  file: string
  sheet: string | undefined
  columns: z.infer<typeof Columns>
  units: z.infer<typeof Units>
}

/** Thicknesses, absorbers and layers as they stand in the file. */
export interface StatedOptics {
  junctions: { name: string; thicknessNm?: number | undefined; pathFactor?: number | undefined; absorber?: unknown }[]
  layers?: unknown[] | undefined
  incidentIndex?: number | undefined
  exit?: string | number | undefined
  angleDeg?: number | undefined
}

export interface DescribedDevice {
  name: string
  wiring: 'series' | 'independent'
  junctions: { name: string; scan: ScanReference; conditions: ScanConditions }[]
  reflectance: ScanReference | null
  sources: LightSource[]
  /** What was said about the optics, for a what-if; not looked at otherwise. */
  optics: StatedOptics
  /** Paths in the file are relative to this folder. */
  folder: string
}

/** Reads a device file. @throws CommandError: one sentence with the file, the place and the reason. */
export async function readDeviceFile(path: string): Promise<DescribedDevice> {
  const { device, terminals, junctions, reflectance, sources, ...optics } = await readJsonFile(path, DeviceFile)
  return {
    name: device,
    wiring: /^\s*4[- ]terminal/i.test(terminals) ? 'independent' : 'series',
    junctions: junctions.map((junction) => ({
      name: junction.name,
      scan: referenceOf(junction.scan, junction),
      conditions: {
        ...junction.conditions,
        ...(typeof junction.scan === 'string' ? {} : junction.scan.conditions),
      },
    })),
    reflectance: reflectance === undefined ? null : referenceOf(reflectance, {}),
    sources,
    optics: {
      ...optics,
      junctions: junctions.map(({ name, thicknessNm, pathFactor, absorber }) => ({
        name,
        thicknessNm,
        pathFactor,
        absorber,
      })),
    },
    folder: dirname(path),
  }
}

type Reading = { [Key in keyof typeof reading]?: z.infer<(typeof reading)[Key]> }

function referenceOf(scan: z.infer<typeof ScanFile>, outer: Reading): ScanReference {
  const inner = typeof scan === 'string' ? { file: scan } : scan
  return {
    file: inner.file,
    sheet: ('sheet' in inner ? inner.sheet : undefined) ?? outer.sheet,
    columns: { ...outer.columns, ...('columns' in inner ? inner.columns : {}) },
    units: { ...outer.units, ...('units' in inner ? inner.units : {}) },
  }
}
