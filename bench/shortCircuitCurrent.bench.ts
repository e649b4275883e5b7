import { shortCircuitCurrentDensity } from '../shared/physics/currents.js'
import { makeCurve, type Curve } from '../shared/physics/curve.js'
import { seededRandom } from '../shared/physics/numerics/random.js'
import { referenceSpectrum } from '../shared/physics/spectrum.js'
import { runNumpy } from './numpy.js'
import type { BenchRow } from './rows.js'
import { fastestMs } from './timing.js'

const SCANS = 2000
const POINTS = 300
const SEED = 41

/** Scans of 300 points, each on a grid of its own that starts anywhere and never meets the table's points. */
function randomScans(): Curve[] {
  const random = seededRandom(SEED)
  return Array.from({ length: SCANS }, () => {
    const from = random.between(290, 340)
    const stepNm = random.between(2.5, 3.1)
    const edgeNm = random.between(700, 1150)
    const plateau = random.between(0.6, 0.95)
    const wavelengthNm = Float64Array.from({ length: POINTS }, (_, i) => from + (i + random.between(0, 0.5)) * stepNm)
    const eqe = wavelengthNm.map((nm) => plateau / (1 + Math.exp((nm - edgeNm) / 12)) + 0.002 * random.normal())
    return makeCurve(wavelengthNm, eqe)
  })
}

/** The currents of 2 000 scans of 300 points under AM1.5G (2 002 points) against numpy with the same exact integral. */
export default {
  name: 'Short-circuit current densities',
  async run(): Promise<BenchRow[]> {
    const spectrum = referenceSpectrum('AM1.5G')
    const scans = randomScans()
    const currents = (): number[] => scans.map((eqe) => shortCircuitCurrentDensity(eqe, spectrum))
    const oursMs = fastestMs(currents, 20)
    const ours = currents()
    const numpy = runNumpy('shortCircuitCurrent.py', {
      sunNm: Array.from(spectrum.photonCurrent.wavelengthNm),
      sun: Array.from(spectrum.photonCurrent.values),
      scansNm: scans.map((eqe) => Array.from(eqe.wavelengthNm)),
      scans: scans.map((eqe) => Array.from(eqe.values)),
    })
    return [
      ['union', 'numpy, formula on the union of the grids, scan by scan'] as const,
      ['nodes', 'numpy, antiderivatives at all points of all scans at once'] as const,
    ].map(([key, peer]) => ({
      name: `${SCANS} scans × ${POINTS} points, AM1.5G`,
      oursMs,
      peerMs: numpy.ms[key]!,
      peer,
      largestDifference: Math.max(...ours.map((current, i) => Math.abs(current - numpy.arrays[key]![0]![i]!))),
    }))
  },
}
