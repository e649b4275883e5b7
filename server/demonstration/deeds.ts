import { Conditions, type FileReading, type Scan } from '../../shared/contract/scans.js'
import { NewDevice, type Device } from '../../shared/contract/devices.js'
import type { Database } from '../database/transaction.js'
import type { Actor } from '../services/actor.js'
import { createDevice } from '../services/devices/createDevice.js'
import { confirmReading } from '../services/scans/confirmReading.js'
import { decideScan } from '../services/scans/decideScan.js'
import { uploadFiles } from '../services/scans/uploadFiles.js'
import type { InventedDevice } from './devices.js'
import type { ScanFile } from './scanFiles.js'

/** An invented device and its rows. */
export interface DescribedDevice {
  invented: InventedDevice
  device: Device
  projectId: string
}

export async function describe(
  database: Database,
  actor: Actor,
  projectId: string,
  invented: InventedDevice,
): Promise<DescribedDevice> {
  const { name, sampleId, description, series, terminals, deviceAreaCm2, apertureAreaCm2, junctions, layers } = invented
  const input = NewDevice.parse({
    name,
    sampleId,
    description,
    series,
    terminals,
    deviceAreaCm2,
    apertureAreaCm2,
    junctions,
    layers,
  })
  return { invented, projectId, device: await createDevice(database, actor, projectId, input) }
}

export async function upload(
  database: Database,
  actor: Actor,
  projectId: string,
  { name, text }: ScanFile,
): Promise<FileReading> {
  const file = { name, bytes: Buffer.from(text, 'utf8') }
  const { items } = await uploadFiles(database, actor, projectId, 'edit-scans', () => Promise.resolve([file]))
  return items[0]!
}

/** Confirms the proposed mapping: its EQE columns in order are the junctions from `firstPosition` on. */
export async function makeScans(
  database: Database,
  actor: Actor,
  { device, invented, projectId }: DescribedDevice,
  { file, mapping }: FileReading,
  { measuredOn, firstPosition }: { measuredOn: string; firstPosition: number },
): Promise<Scan[]> {
  if (!mapping) throw new Error(`The demonstration's file ${file.name} was not understood.`)
  const { items } = await confirmReading(database, actor, projectId, file.id, {
    mapping,
    scans: mapping.series.map(({ column, quantity, label }, i) => {
      const place = firstPosition - 1 + i
      const isReflectance = quantity === 'reflectance'
      return {
        column,
        quantity: isReflectance ? ('reflectance' as const) : ('eqe' as const),
        deviceId: device.id,
        junctionId: isReflectance ? null : device.junctions[place]!.id,
        label,
        conditions: isReflectance
          ? Conditions.parse({ operator: actor.name, instrument: 'Integrating sphere', measuredOn })
          : recordedConditions(invented, place, actor.name, measuredOn),
      }
    }),
  })
  return items
}

export async function decide(
  database: Database,
  actor: Actor,
  { id, projectId, version }: Scan,
  state: 'accepted' | 'excluded',
  reason: string,
): Promise<void> {
  await decideScan(database, actor, projectId, id, { version, state, reason })
}

/** What the operator wrote down. */
function recordedConditions(device: InventedDevice, place: number, operator: string, measuredOn: string): Conditions {
  const { biasLight, biasVoltageV, chopperHz } = device.measurements[place]!
  const usesGermanium = device.junctions[place]!.nominalGapEv < 1
  return Conditions.parse({
    biasLight: biasLight.map(({ name, centreNm, fwhmNm, irradianceWM2 }) => ({
      name: name ?? `${centreNm} nm`,
      centreNm,
      fwhmNm,
      irradianceWM2,
    })),
    biasVoltageV,
    temperatureC: 25,
    chopperHz,
    spotAreaCm2: 0.04,
    deviceAreaCm2: device.deviceAreaCm2,
    illumination: 'underfilled',
    referenceDetector: usesGermanium ? 'Germanium photodiode G-02' : 'Silicon photodiode S-07',
    referenceCalibrationDate: '2026-03-16',
    operator,
    instrument: 'Monochromator bench 1',
    measuredOn,
  })
}
