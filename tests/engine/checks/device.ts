import { makeCurve, type Curve } from '../../../shared/physics/curve.js'
import { referenceSpectrum } from '../../../shared/physics/spectrum.js'
import type { Check, ScanInContext } from '../../../shared/physics/checks/check.js'
import type { CheckOutcome, Finding } from '../../../shared/physics/checks/finding.js'
import { thresholdsOf } from '../../../shared/physics/checks/runChecks.js'
import {
  simulateScan,
  type KnownStack,
  type SimulatedConditions,
} from '../../../shared/physics/measurement/simulateScan.js'

/** Wavelengths from, to (both ends) in steps, nm. */
export const grid = (from: number, to: number, step: number): number[] =>
  Array.from({ length: Math.round((to - from) / step) + 1 }, (_, i) => from + i * step)

export const curveOf = (wavelengthNm: readonly number[], f: (nm: number) => number): Curve =>
  makeCurve(wavelengthNm, wavelengthNm.map(f))

const rise = (nm: number, at: number, width: number): number => 1 / (1 + Math.exp(-(nm - at) / width))

/** An invented perovskite/silicon tandem: the top absorbs to 750 nm, the bottom what the top leaves, to 1100 nm. */
const topAbsorptance = (nm: number): number => rise(-nm, -752, 7) * (1 - 0.15 * rise(nm, 660, 25))
export const topEqe = (nm: number): number => 0.83 * rise(nm, 325, 5) * topAbsorptance(nm)
export const bottomEqe = (nm: number): number => 0.9 * (1 - topAbsorptance(nm)) * rise(-nm, -1095, 18)

const fine = grid(290, 1250, 1)

export const tandem: KnownStack = {
  eqes: [curveOf(fine, topEqe), curveOf(fine, bottomEqe)],
  diodes: [
    { saturationCurrentMaCm2: 1e-19, shuntResistanceKohmCm2: 1000 },
    { saturationCurrentMaCm2: 1e-10, shuntResistanceKohmCm2: 500 },
  ],
  seriesResistanceKohmCm2: 1e-4,
  temperatureK: 298.15,
}

export const spectrum = referenceSpectrum('AM1.5G')

export const infrared = { name: 'infrared LED', centreNm: 940, fwhmNm: 50, irradianceWM2: 120 }
export const blue = { name: 'blue LED', centreNm: 470, fwhmNm: 25, irradianceWM2: 200 }

const steps = grid(300, 1200, 5)

export const wellTaken: readonly SimulatedConditions[] = [
  { wavelengthNm: steps, biasLight: [infrared], biasVoltageV: 0.64, noise: 3e-4, seed: 11 },
  { wavelengthNm: steps, biasLight: [blue], biasVoltageV: 1.19, noise: 3e-4, seed: 12 },
]

/** Everything a check may ask for, measured well; `change` replaces parts. */
export function contextOf(junctionIndex: number, change: Partial<ScanInContext> = {}): ScanInContext {
  const scans = wellTaken.map((conditions) => simulateScan(tandem, conditions))
  const own = wellTaken[junctionIndex]!
  return {
    scan: scans[junctionIndex]!.scan,
    junctionIndex,
    junctions: scans.map(({ scan }, i) => ({ scan, diode: tandem.diodes[i]! })),
    conditions: {
      biasLight: own.biasLight,
      biasVoltageV: own.biasVoltageV,
      temperatureC: 25,
      chopperHz: 133,
      filterChangesNm: [600, 1000],
      referenceCalibrationDate: '2026-01-15',
      measuredOn: '2026-11-20',
    },
    spectrum,
    ...change,
  }
}

/** The conditions of a context with some of them replaced. */
export const withConditions = (
  context: ScanInContext,
  change: Partial<ScanInContext['conditions']>,
): ScanInContext => ({
  ...context,
  conditions: { ...context.conditions, ...change },
})

export const run = (check: Check, context: ScanInContext): CheckOutcome => check.run(context, thresholdsOf(check))

/** The finding of a check that must fire. */
export function findingOf(check: Check, context: ScanInContext): Finding {
  const result = run(check, context)
  if (result.outcome !== 'fired') throw new Error(`${check.name} did not fire but said ${JSON.stringify(result)}`)
  return result.finding
}
