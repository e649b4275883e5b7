import { StackSolver, type StackLayer } from '../shared/physics/optics/index.js'
import { runNumpy } from './numpy.js'
import { fastestMs } from './timing.js'
import type { BenchRow } from './rows.js'

const wavelengthNm = Float64Array.from({ length: 300 }, (_, i) => 300 + 3 * i)
const column = (f: (nm: number) => number): Float64Array => wavelengthNm.map(f)

/** Eight layers of smooth invented dispersion: coating, contact, transport, absorber, transport, contact, absorber, rear. */
const layers: readonly StackLayer[] = [
  { n: 1.38, k: 0, thicknessNm: 100 },
  { n: column((nm) => 1.9 + 2e4 / nm ** 2), k: column((nm) => 0.01 + 1e-8 * nm ** 2), thicknessNm: 80 },
  { n: 2, k: 0, thicknessNm: 20 },
  {
    n: column((nm) => 2.3 + 5e4 / nm ** 2),
    k: column((nm) => 0.6 / (1 + Math.exp((nm - 700) / 20))),
    thicknessNm: 500,
  },
  { n: 1.8, k: 0, thicknessNm: 25 },
  { n: column((nm) => 1.9 + 2e4 / nm ** 2), k: column((nm) => 0.01 + 1e-8 * nm ** 2), thicknessNm: 30 },
  {
    n: column((nm) => 3.4 + 2e5 / nm ** 2),
    k: column((nm) => 0.8 / (1 + Math.exp((nm - 500) / 80)) + 1e-3),
    thicknessNm: 3000,
  },
  { n: 1.9, k: 0.02, thicknessNm: 100 },
]
const exit = { n: 0.2, k: 6 }
const varied = [1, 3] as const
const axis = (low: number, high: number): number[] =>
  Array.from({ length: 50 }, (_, i) => low + ((high - low) * i) / 49)
const x = axis(20, 160)
const y = axis(200, 900)
const absorber = 3

/** The absorber's mean absorptance over the wavelengths, and the largest departure of the energy balance from one. */
function map(solver: StackSolver): { mean: Float64Array; worstBalance: number } {
  const mean = new Float64Array(x.length * y.length)
  let worstBalance = 0
  y.forEach((absorberNm, row) =>
    x.forEach((contactNm, columnIndex) => {
      solver.setThickness(varied[0], contactNm)
      solver.setThickness(varied[1], absorberNm)
      const { reflectance, transmittance, absorptance } = solver.solve()
      let sum = 0
      for (let i = 0; i < wavelengthNm.length; i++) {
        let total = reflectance[i]! + transmittance[i]!
        for (let l = 0; l < layers.length; l++) total += absorptance[l]![i]!
        worstBalance = Math.max(worstBalance, Math.abs(total - 1))
        sum += absorptance[absorber]![i]!
      }
      mean[row * x.length + columnIndex] = sum / wavelengthNm.length
    }),
  )
  return { mean, worstBalance }
}

/** The transfer matrix over two thicknesses against numpy, vectorised over a row of the map and all wavelengths. */
export default {
  name: 'What-if, transfer matrix',
  async run(): Promise<BenchRow[]> {
    const oursMs = fastestMs(() => map(new StackSolver({ wavelengthNm, layers, exit })), 5)
    const { mean } = map(new StackSolver({ wavelengthNm, layers, exit }))
    const asArray = (values: Float64Array | number): number[] =>
      Array.from(wavelengthNm, (_, i) => (typeof values === 'number' ? values : values[i]!))
    const numpy = runNumpy('transferMatrix.py', {
      wavelength: Array.from(wavelengthNm),
      n: layers.map((layer) => asArray(layer.n)),
      k: layers.map((layer) => asArray(layer.k)),
      thickness: layers.map((layer) => layer.thicknessNm),
      exit: [exit.n, exit.k],
      varied,
      absorber,
      x,
      y,
    })
    const peers = [
      ['matrix', 'numpy, 2 × 2 matrices, vectorised row by row'],
      ['recursion', 'numpy, the same recursion, vectorised row by row'],
    ] as const
    return peers.map(([key, peer]) => ({
      name: '50 × 50 map, 8 layers × 300 wavelengths',
      oursMs,
      peerMs: numpy.ms[key]!,
      peer,
      largestDifference: mean.reduce(
        (worst, value, i) => Math.max(worst, Math.abs(value - numpy.arrays[key]![0]![i]!)),
        0,
      ),
    }))
  },
}
