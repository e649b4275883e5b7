import { inventedDevices, inventedScans, type InventedDevice } from '../server/demonstration/devices.js'
import { REFERENCE_SPECTRA } from '../shared/data/spectra/index.js'
import type { Curve } from '../shared/physics/curve.js'
import { shapedFiles } from './shapes.js'
import { textRows } from './writing.js'

/** A device in a folder of its own: a file a junction, reflectance, and the device file of the command line. */
export interface DeviceFolder {
  name: string
  device: InventedDevice
  /** The scans as they were taken, from the sunward side. */
  scans: Curve[]
  files: Record<string, string | object>
}

const PER_CENT = { valueUnit: 'percent' } as const

const scanText = (curve: Curve, sample: string, junction: string): string =>
  lines([
    `# Sample ${sample}, junction ${junction}`,
    'Wavelength (nm),EQE (%)',
    ...textRows([...curve.wavelengthNm], [curve], PER_CENT).map((row) => row.join(',')),
  ])

const reflectanceText = (curve: Curve): string =>
  lines([
    'Wavelength (nm);Reflectance (%)',
    ...textRows([...curve.wavelengthNm], [curve], { ...PER_CENT, decimalMark: ',' }).map((row) => row.join(';')),
  ])

const lines = (list: readonly string[]) => `${list.join('\n')}\n`

function folderOf(name: string, device: InventedDevice, terminals: string = device.terminals): DeviceFolder {
  const scans = inventedScans(device).map((scan) => scan.curve)
  const fileNames = device.junctions.map((junction) => `${junction.label.toLowerCase()}.csv`)
  return {
    name,
    device,
    scans,
    files: {
      ...Object.fromEntries(
        scans.map((scan, i) => [fileNames[i], scanText(scan, device.sampleId, device.junctions[i]!.label)]),
      ),
      'reflectance.csv': reflectanceText(device.reflectance),
      'device.json': {
        device: device.name,
        terminals,
        junctions: device.junctions.map((junction, i) => ({
          name: junction.label.toLowerCase(),
          scan: fileNames[i],
          conditions: conditionsOf(device, i),
        })),
        reflectance: 'reflectance.csv',
      },
    },
  }
}

function conditionsOf(device: InventedDevice, i: number) {
  const { biasLight, biasVoltageV, chopperHz } = device.measurements[i]!
  return { biasLight, biasVoltageV, chopperHz, temperatureC: 25 }
}

/** The devices of the walk-through: a tandem, the same with four terminals, a triple, and one measured badly. */
export function deviceFolders(): DeviceFolder[] {
  const { split, triple, bad } = inventedDevices()
  return [
    folderOf('tandem', split[2]!),
    folderOf('four-terminal', split[0]!, '4-terminal'),
    folderOf('triple', triple),
    folderOf('measured-badly', bad),
    spectrumFolder(split[2]!),
  ]
}

/** AM1.5D as a file, in the units of an instrument, to try `--spectrum FILE`. */
function spectrumFolder(device: InventedDevice): DeviceFolder {
  const { wavelengthNm, irradianceWM2Nm } = REFERENCE_SPECTRA['AM1.5D']
  const rows = wavelengthNm.map((nm, i) => `${(nm / 1000).toFixed(4)}\t${(1000 * irradianceWM2Nm[i]!).toPrecision(6)}`)
  const files = { 'direct.txt': lines(['Wavelength (µm)\tSpectral irradiance (W m-2 µm-1)', ...rows]) }
  return { name: 'spectrum', device, scans: [], files }
}

/** A device file for each shape of file, to read it from the command line. */
export function shapeDevices(): { name: string; description: object }[] {
  return shapedFiles().map(({ name, columns, sheet }) => {
    const junction = (which: 'top' | 'bottom') => ({
      name: which,
      scan: name,
      ...(sheet !== undefined && { sheet }),
      ...(columns && {
        columns: { ...(columns.wavelength !== undefined && { wavelength: columns.wavelength }), eqe: columns[which] },
      }),
    })
    return {
      name: `${name.replace(/\.[^.]*$/, '')}.device.json`,
      description: { device: name, terminals: '2-terminal', junctions: [junction('top'), junction('bottom')] },
    }
  })
}
