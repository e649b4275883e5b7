import { makeCurve } from '../shared/physics/curve.js'
import { absorptionPerCm } from '../shared/physics/absorption/index.js'
import { beerLambertStack } from '../shared/physics/optics/index.js'
import { currentWeights } from '../shared/physics/uncertainty/currentWeights.js'
import { compileDevice, computeMap, evaluate, type MapRequest } from '../shared/physics/whatIf/index.js'
import { runNumpy } from './numpy.js'
import { fastestMs } from './timing.js'
import type { BenchRow } from './rows.js'

const edges = [
  { bandGapEv: 1.68, alpha0PerCm: 150_000, urbachMev: 15 },
  { bandGapEv: 1.12, alpha0PerCm: 2000, urbachMev: 30 },
] as const
const thicknessNm = [500, 150_000] as const
const pathFactor = [1, 2] as const

/** Two junctions on one grid of 400 wavelengths under a smooth spectrum. */
function problem() {
  const wavelengthNm = Float64Array.from({ length: 400 }, (_, i) => 300 + i * 2.2)
  const layers = edges.map((edge, p) => ({
    alphaPerCm: absorptionPerCm({ kind: 'edge', edge }, wavelengthNm),
    thicknessNm: thicknessNm[p]!,
    pathFactor: pathFactor[p]!,
  }))
  const { absorptance } = beerLambertStack(layers)
  const eqe = absorptance.map((a) =>
    makeCurve(
      wavelengthNm,
      a.map((x) => 0.93 * x),
    ),
  )
  const spectrumNm = Float64Array.from({ length: 1201 }, (_, i) => 280 + i)
  const spectrum = makeCurve(
    spectrumNm,
    spectrumNm.map((nm) => 8.2e15 / nm ** 5 / Math.expm1(14_387_769 / (nm * 5800))),
  )
  const compiled = compileDevice({
    device: {
      junctions: edges.map((absorber, p) => ({ absorber, thicknessNm: thicknessNm[p]!, pathFactor: pathFactor[p]! })),
    },
    eqe,
    spectrum,
    materials: {},
  })
  return { compiled, layers, eqe, weights: currentWeights(wavelengthNm, spectrum), spectrum }
}

const request: MapRequest = {
  x: { parameter: '1.thicknessNm', from: 150, to: 1500, points: 200 },
  y: { parameter: '2.thicknessNm', from: 40_000, to: 300_000, points: 200 },
}

/** The what-if engine with Beer–Lambert against numpy on the same device, map and rule for weak absorption. */
export default {
  name: 'What-if, Beer–Lambert',
  async run(): Promise<BenchRow[]> {
    const { compiled, layers, eqe, weights } = problem()
    const change = { '1.thicknessNm': 560, '2.thicknessNm': 120_000 }
    const evaluateMs = fastestMs(() => evaluate(compiled, change), 300)
    const mapMs = fastestMs(() => computeMap(compiled, request), 9)
    const map = computeMap(compiled, request)
    const numpy = runNumpy('whatIf.py', {
      alpha: layers.map((layer) => Array.from(layer.alphaPerCm)),
      thickness: thicknessNm,
      pathFactor,
      eqe: eqe.map((curve) => Array.from(curve.values)),
      weights: Array.from(weights),
      change: [560, 120_000],
      x: Array.from(map.x.values),
      y: Array.from(map.y.values),
      ownShare: 0.01,
      absorptance: 0.001,
    })
    const difference = (key: string): number =>
      Math.max(
        ...map.currentsMaCm2.map((currents, p) =>
          currents.reduce((worst, j, i) => Math.max(worst, Math.abs(j - numpy.arrays[key]![p]![i]!)), 0),
        ),
      )
    return [
      {
        name: 'one evaluation, 2 junctions × 400 wavelengths',
        oursMs: evaluateMs,
        peerMs: numpy.ms.evaluate!,
        peer: 'numpy, vectorised over wavelengths',
        largestDifference: Math.max(
          ...evaluate(compiled, change).currentsMaCm2.map((j, p) => Math.abs(j - numpy.arrays.evaluate![p]![0]!)),
        ),
      },
      {
        name: '200 × 200 map of two thicknesses',
        oursMs: mapMs,
        peerMs: numpy.ms.direct!,
        peer: 'numpy, the formula at every point, vectorised row by row',
        largestDifference: difference('direct'),
      },
      {
        name: '200 × 200 map of two thicknesses',
        oursMs: mapMs,
        peerMs: numpy.ms.separable!,
        peer: 'numpy, factors of each axis and a matrix product (BLAS)',
        largestDifference: difference('separable'),
      },
    ]
  },
}
