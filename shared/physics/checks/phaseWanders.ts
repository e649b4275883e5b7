import { median } from '../measurement/pointNoise.js'
import { fired, notChecked, PASSED, type Check } from './check.js'

const WINDOW = 2
/** A phase below this signal-to-noise ratio says nothing. */
const LEAST_SIGNAL_TO_NOISE = 8
const DEGREES = 180 / Math.PI

/** A junction that answers as one has one phase; two mixed junctions, or a slow trap, turn it over the scan. */
export const phaseWanders: Check = {
  name: 'phase-wanders',
  title: 'Phase wanders',
  inputs: ['lock-in X and Y'],
  defaultThresholds: {
    largestTurnDeg: { value: 5, unit: '°', meaning: 'Range of the phase over the scan, beyond what noise explains' },
    signalShare: { value: 0.05, unit: '', meaning: 'Share of the largest signal from which on the phase counts' },
  },
  advice:
    'Chop more slowly and see whether the phase settles; set the phase on the junction under test where it alone ' +
    'responds; use the magnitude only when the phase is steady.',
  run(context, thresholds) {
    const { inPhase, quadrature, scan } = context
    if (!inPhase || !quadrature) return notChecked('no X and Y recorded')
    const n = scan.values.length
    if (inPhase.length !== n || quadrature.length !== n) return notChecked('X and Y do not fit the wavelengths')
    const x = Array.from(inPhase)
    const y = Array.from(quadrature)
    const magnitude = x.map((value, i) => Math.hypot(value, y[i]!))
    const floor = thresholds.signalShare! * Math.max(...magnitude)
    const noise = acrossNoise(x, y)
    let reference: number | null = null
    let lowest: Turn | null = null
    let highest: Turn | null = null
    for (let i = 0; i < n; i++) {
      if (!(magnitude[i]! > Math.max(floor, LEAST_SIGNAL_TO_NOISE * noise))) continue
      const from = Math.max(0, i - WINDOW)
      const to = Math.min(n, i + WINDOW + 1)
      const meanX = x.slice(from, to).reduce((sum, value) => sum + value, 0)
      const meanY = y.slice(from, to).reduce((sum, value) => sum + value, 0)
      reference ??= Math.atan2(meanY, meanX)
      const angle = Math.atan2(
        meanY * Math.cos(reference) - meanX * Math.sin(reference),
        meanX * Math.cos(reference) + meanY * Math.sin(reference),
      )
      const slack = (2 * noise * Math.sqrt(to - from)) / Math.hypot(meanX, meanY)
      const turn = { angle, slack, nm: scan.wavelengthNm[i]! }
      if (!lowest || angle + slack < lowest.angle + lowest.slack) lowest = turn
      if (!highest || angle - slack > highest.angle - highest.slack) highest = turn
    }
    if (!lowest || !highest) return notChecked('X and Y hold no signal')
    const range = (highest.angle - lowest.angle) * DEGREES
    const beyondNoise = range - (highest.slack + lowest.slack) * DEGREES
    if (!(beyondNoise > thresholds.largestTurnDeg!)) return PASSED
    return fired(this, {
      severity: 'caution',
      message: `The phase turns by ${range.toFixed(1)}° between ${Math.round(Math.min(lowest.nm, highest.nm))} and ${Math.round(Math.max(lowest.nm, highest.nm))} nm.`,
      numbers: {
        turn: { value: range, unit: '°' },
        turnBeyondNoise: { value: beyondNoise, unit: '°' },
      },
      bandsNm: [[Math.min(lowest.nm, highest.nm), Math.max(lowest.nm, highest.nm)]],
    })
  },
}

interface Turn {
  readonly angle: number
  readonly slack: number
  readonly nm: number
}

/** Noise across the signal's direction, from the fourth differences of the part at right angles to the mean phase. */
function acrossNoise(x: readonly number[], y: readonly number[]): number {
  const mean = Math.atan2(
    y.reduce((sum, value) => sum + value, 0),
    x.reduce((sum, value) => sum + value, 0),
  )
  const across = x.map((value, i) => y[i]! * Math.cos(mean) - value * Math.sin(mean))
  const differences: number[] = []
  for (let i = 2; i + 2 < across.length; i++)
    differences.push(
      Math.abs(across[i - 2]! - 4 * across[i - 1]! + 6 * across[i]! - 4 * across[i + 1]! + across[i + 2]!),
    )
  return (1.4826 * median(differences)) / Math.sqrt(70)
}
