import { valueAt, type Curve } from '../curve.js'
import { pointNoise } from '../measurement/pointNoise.js'
import type { Spectrum } from '../spectrum.js'
import { shortCircuitCurrentDensity } from '../currents.js'
import { fired, notChecked, PASSED, type Check } from './check.js'
import { percent } from './wording.js'

const POINTS_FOR_NOISE = 60

/** If every second point can be dropped without moving the current, the steps are fine enough. */
export const coarseStep: Check = {
  name: 'coarse-step',
  title: 'Coarse step',
  inputs: ['spectrum'],
  defaultThresholds: {
    largestChange: { value: 0.003, unit: '', meaning: 'Relative change of Jsc when every second point is dropped' },
  },
  advice: 'Repeat with steps of 5 nm (common practice), and 1–5 nm across the absorption edge.',
  run(context, thresholds) {
    if (!context.spectrum) return notChecked('no spectrum')
    if (context.scan.values.length < 5) return notChecked('the scan has fewer than five points')
    const full = shortCircuitCurrentDensity(context.scan, context.spectrum)
    if (!(full > 0)) return notChecked('the scan has no response to count a current from')
    const change = shortCircuitCurrentDensity(everySecond(context.scan), context.spectrum) / full - 1
    const noise = noiseOfCurrent(context.scan, context.spectrum) / full
    if (Math.abs(change) <= thresholds.largestChange! + 2 * noise) return PASSED
    const step = steepestStep(context.scan)
    return fired(this, {
      severity: 'caution',
      message:
        `Jsc moves by ${percent(change, 2)} when every second point is dropped; the steepest step is ` +
        `${(step[1] - step[0]).toFixed(1)} nm. The integral depends on the step.`,
      numbers: {
        change: { value: change, unit: '' },
        steepestStep: { value: step[1] - step[0], unit: 'nm' },
      },
      bandsNm: [step],
    })
  },
}

function everySecond(curve: Curve): Curve {
  const last = curve.values.length - 1
  const isKept = (_: number, i: number): boolean => i % 2 === 0 || i === last
  return { wavelengthNm: curve.wavelengthNm.filter(isKept), values: curve.values.filter(isKept) }
}

/** The interval with the largest fall or rise of EQE: where finer steps help most. */
function steepestStep({ wavelengthNm, values }: Curve): [number, number] {
  let best = 1
  for (let i = 1; i < values.length; i++)
    if (Math.abs(values[i]! - values[i - 1]!) > Math.abs(values[best]! - values[best - 1]!)) best = i
  return [wavelengthNm[best - 1]!, wavelengthNm[best]!]
}

/**
 * Standard uncertainty that the noise from point to point gives the integral, mA cm⁻². With few points the structure
 * of the scan itself would count as noise, and none is allowed for.
 */
function noiseOfCurrent(scan: Curve, spectrum: Spectrum): number {
  const { wavelengthNm: x } = scan
  if (x.length < POINTS_FOR_NOISE) return 0
  let squares = 0
  for (let i = 0; i < x.length; i++) {
    const width = 0.5 * ((x[i + 1] ?? x[i]!) - (x[i - 1] ?? x[i]!))
    squares += (width * valueAt(spectrum.photonCurrent, x[i]!)) ** 2
  }
  return pointNoise(scan) * Math.sqrt(squares)
}
