import { makeCurve } from '../shared/physics/curve.js'
import { referenceSpectrum } from '../shared/physics/spectrum.js'
import {
  deviceErrors,
  propagateDevice,
  runMonteCarlo,
  TYPICAL_COMPONENTS,
  type BudgetComponent,
  type DeviceErrors,
  type MeasuredJunction,
  type MonteCarloResult,
} from '../shared/physics/uncertainty/index.js'
import { shiftTable } from '../shared/physics/uncertainty/shiftTable.js'
import { runNumpy } from './numpy.js'
import type { BenchRow } from './rows.js'
import { fastestMs } from './timing.js'

const DRAWS = 20_000
const POINTS = 300
const TABLE_REACH_NM = 3

/** The typical budget with something in every line. */
const components: readonly BudgetComponent[] = TYPICAL_COMPONENTS.map(({ component }) =>
  component.kind === 'bias-residual' ? { ...component, uncertainty: { unit: 'percent', value: 0.4 } } : component,
)

function junction(fromNm: number, toNm: number, height: number): MeasuredJunction {
  const wavelengthNm = Float64Array.from({ length: POINTS }, (_, k) => 300 + (900 * k) / (POINTS - 1))
  const edge = (x: number): number => 1 / (1 + Math.exp(-x))
  const eqe = makeCurve(
    wavelengthNm,
    wavelengthNm.map((nm) => height * edge((nm - fromNm) / 12) * edge((toNm - nm) / 9)),
  )
  return { eqe, pointUncertainty: eqe.values.map(() => 0.004), components }
}

/** The job of the peer: the same independent errors and tables of offsets, ready made. */
function peerJob(errors: DeviceErrors): unknown {
  const { higher, lower } = propagateDevice(errors).mismatch!
  return {
    draws: DRAWS,
    repeats: 15,
    higher: higher - 1,
    lower: lower - 1,
    junctions: errors.eqe.map((_, i) => {
      const { lowestNm, stepNm, currentsMaCm2 } = shiftTable(errors, i, TABLE_REACH_NM)
      return { lowestNm, stepNm, table: Array.from(currentsMaCm2) }
    }),
    sources: errors.sources.map(({ distribution, effects }) => ({
      distribution,
      effects: effects.map((effect) =>
        effect?.type === 'points' ? { ...effect, pointsMaCm2: Array.from(effect.pointsMaCm2) } : effect,
      ),
    })),
  }
}

/** Means and standard uncertainties, in one order, for the comparison; each row is [mean, u]. */
function statistics(result: MonteCarloResult): [number, number][] {
  return [...result.currents, result.limitingCurrent, result.mismatch!, result.spread].map(({ mean, uncertainty }) => [
    mean,
    uncertainty,
  ])
}

/** Largest difference of the means, in standard errors of the peer's mean; throws when the two samples disagree. */
function compare(ours: readonly [number, number][], peer: readonly (readonly number[])[]): number {
  let largest = 0
  ours.forEach(([mean, u], i) => {
    const [peerMean, peerU] = peer[i]! as [number, number]
    const inErrors = Math.abs(mean - peerMean) / (u * Math.sqrt(2 / DRAWS))
    if (inErrors > 5 || Math.abs(u / peerU - 1) > 0.03)
      throw new Error(`Draws disagree: ${mean} ± ${u} here, ${peerMean} ± ${peerU} in the peer.`)
    largest = Math.max(largest, Math.abs(mean - peerMean))
  })
  return largest
}

/** The Monte Carlo of a two-junction device of 300 points under AM1.5G against numpy with the same number of draws. */
export default {
  name: 'Monte Carlo of the currents',
  async run(): Promise<BenchRow[]> {
    const errors = deviceErrors([junction(310, 780, 0.88), junction(780, 1120, 0.93)], referenceSpectrum('AM1.5G'))
    const numpy = runNumpy('monteCarlo.py', peerJob(errors))
    const rows = [
      { key: 'everyPoint', drawEveryPoint: true, name: '20 000 draws, 2 × 300 points, every point drawn' },
      { key: 'exactSum', drawEveryPoint: false, name: '20 000 draws, normal noise as its exact sum (the default)' },
    ]
    return rows.map(({ key, drawEveryPoint, name }) => {
      const options = { seed: 2026, draws: DRAWS, drawEveryPoint }
      return {
        name,
        oursMs: fastestMs(() => runMonteCarlo(errors, options), 15),
        peerMs: numpy.ms[key]!,
        peer: 'numpy, SFC64, whole arrays, tables of offsets given',
        largestDifference: compare(statistics(runMonteCarlo(errors, options)!), numpy.arrays[key]!),
      }
    })
  },
}
