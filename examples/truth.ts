import { shortCircuitCurrentDensity } from '../shared/physics/currents.js'
import { matching } from '../shared/physics/matching.js'
import { referenceSpectrum } from '../shared/physics/spectrum.js'
import { deviceFolders } from './deviceFolders.js'
import { SHAPED_EQES, shapedFiles } from './shapes.js'

/** What a reader must find. The tolerance is what the digits of the file leave open, mA/cm². */
export interface Truth {
  file: string
  shape?: string
  jscMaCm2: number[]
  toleranceMaCm2: number
  limitingJunction: number | null
  mismatchPercent: number | null
}

const TOLERANCE_MA_CM2 = 2e-4
const spectrum = referenceSpectrum('AM1.5G')
const rounded = (value: number) => Number(value.toFixed(6))

function truthOf(file: string, currents: number[], isSeries: boolean): Truth {
  const stack = isSeries ? matching(currents, 'series') : null
  return {
    file,
    jscMaCm2: currents.map(rounded),
    toleranceMaCm2: TOLERANCE_MA_CM2,
    limitingJunction: stack?.limitingJunction ?? null,
    mismatchPercent: stack ? rounded(stack.mismatchPercent) : null,
  }
}

/** Every shaped file holds the same two curves. */
export function truthOfShapes(): Truth[] {
  const currents = SHAPED_EQES.map((eqe) => shortCircuitCurrentDensity(eqe, spectrum))
  return shapedFiles().map(({ name, shape }) => ({ ...truthOf(`shapes/${name}`, currents, true), shape }))
}

/** Currents of the scans as they were taken; a device measured badly differs from what it is, on purpose. */
export function truthOfDevices(): Truth[] {
  return deviceFolders()
    .filter((folder) => folder.scans.length > 0)
    .map(({ name, scans, files }) => {
      const currents = scans.map((scan) => shortCircuitCurrentDensity(scan, spectrum))
      const isSeries = !JSON.stringify(files['device.json']).includes('4-terminal')
      return truthOf(`${name}/device.json`, currents, isSeries)
    })
}
