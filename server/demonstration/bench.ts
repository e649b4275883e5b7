import { DetectorInput, LightSourceInput, SetUpContent } from '../../shared/contract/bench.js'
import { Conditions, type Scan } from '../../shared/contract/scans.js'
import type { BandSource } from '../../shared/physics/measurement/biasLight.js'
import { simulateScan } from '../../shared/physics/measurement/simulateScan.js'
import type { Database } from '../database/transaction.js'
import type { Actor } from '../services/actor.js'
import { createBenchItem } from '../services/bench/benchItems.js'
import { detectorContent } from '../services/bench/detectorContent.js'
import { lightSourceContent } from '../services/bench/lightSourceContent.js'
import { setUpContent } from '../services/bench/setUpContent.js'
import { createBiasSeries } from '../services/biasSeries/biasSeries.js'
import { updateConditions } from '../services/scans/updateConditions.js'
import { makeScans, upload, type DescribedDevice } from './deeds.js'
import { junctionFile } from './scanFiles.js'

const SOURCES: readonly (readonly [name: string, centreNm: number, fwhmNm: number, highestIrradianceWM2: number])[] = [
  ['LED 470 nm', 470, 25, 400],
  ['LED 625 nm', 625, 20, 350],
  ['LED 850 nm', 850, 40, 300],
  ['LED 940 nm', 940, 50, 250],
]
const DETECTOR = 'Silicon photodiode S-07'
const STEPS_WM2 = [15, 50, 110] as const

/** What stands on the bench: four LEDs, a reference detector with its calibration, and the set-up of the split. */
export async function seedBench(database: Database, actor: Actor, projectId: string): Promise<void> {
  const { work } = database
  for (const [name, centreNm, fwhmNm, highestIrradianceWM2] of SOURCES) {
    const input = LightSourceInput.parse({ kind: 'led', centreNm, fwhmNm, highestIrradianceWM2 })
    await createBenchItem(database, actor, projectId, 'light-source', name, () =>
      lightSourceContent(work, projectId, input),
    )
  }
  const { file, mapping } = await upload(database, actor, projectId, calibrationFile())
  const calibration = DetectorInput.parse({
    sourceFileId: file.id,
    mapping,
    calibratedOn: '2026-03-16',
    serialNumber: 'S-07',
  })
  const detector = await createBenchItem(database, actor, projectId, 'detector', DETECTOR, () =>
    detectorContent(work, projectId, calibration),
  )
  const setUp = SetUpContent.parse({
    biasLight: [{ name: 'LED 940 nm', centreNm: 940, fwhmNm: 50, irradianceWM2: 120 }],
    biasVoltageV: 0.68,
    temperatureC: 25,
    chopperHz: 133,
    detectorId: detector.id,
    spotAreaCm2: 0.04,
    deviceAreaCm2: 1.21,
    illumination: 'underfilled',
    instrument: 'Monochromator bench 1',
  })
  await createBenchItem(database, actor, projectId, 'set-up', 'Top cell of a tandem', () =>
    setUpContent(work, projectId, setUp),
  )
}

/** The bottom cell at rising blue bias light, up to the scan that was accepted. */
export async function seedBiasSeries(
  database: Database,
  actor: Actor,
  device: DescribedDevice,
  accepted: Scan,
  measuredOn: string,
): Promise<void> {
  const { invented, projectId } = device
  const measurement = invented.measurements[1]!
  const scanIds = [accepted.id]
  for (const [step, irradianceWM2] of STEPS_WM2.entries()) {
    const biasLight = measurement.biasLight.map((source): BandSource => ({ ...source, irradianceWM2 }))
    const { scan } = simulateScan(invented.truth, {
      wavelengthNm: invented.reflectance.wavelengthNm,
      biasLight,
      biasVoltageV: measurement.biasVoltageV,
      noise: 3e-4,
      seed: measurement.seed + 3000 + step,
    })
    const file = junctionFile(invented, 2, scan, `blue ${irradianceWM2} W per m2`)
    const reading = await upload(database, actor, projectId, file)
    const [made] = await makeScans(database, actor, device, reading, { measuredOn, firstPosition: 2 })
    const conditions = Conditions.parse({
      ...made!.conditions,
      biasLight: biasLight.map(({ name, ...band }) => ({ name: name ?? 'LED', ...band })),
    })
    const label = `Bottom, blue ${irradianceWM2} W/m²`
    const { id } = await updateConditions(database, actor, projectId, made!.id, { version: 1, label, conditions })
    scanIds.push(id)
  }
  await createBiasSeries(database, actor, projectId, {
    name: 'Blue bias light on the bottom cell',
    varied: 'irradiance',
    scanIds,
  })
}

/** An invented responsivity of a silicon photodiode, A/W. */
function calibrationFile() {
  const rows = Array.from({ length: 91 }, (_, i) => {
    const nm = 300 + 10 * i
    const quantumEfficiency = 0.93 / (1 + Math.exp((nm - 1085) / 28)) / (1 + 0.9 * Math.exp((330 - nm) / 60))
    return `${nm},${((quantumEfficiency * nm) / 1239.84198).toFixed(6)}`
  })
  return {
    name: 'S-07_calibration.csv',
    text: ['# Reference detector S-07, calibrated 2026-03-16', 'Wavelength (nm),Responsivity (A/W)', ...rows, ''].join(
      '\r\n',
    ),
  }
}
