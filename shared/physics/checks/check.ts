import type { Curve } from '../curve.js'
import type { JunctionDiode } from '../diode/junction.js'
import type { BiasSource } from '../measurement/biasLight.js'
import type { Spectrum } from '../spectrum.js'
import type { CheckOutcome, Finding, FindingNumber, Severity } from './finding.js'

/** How a scan was taken, as far as it was recorded; null or left out means not recorded. */
export interface ScanConditions {
  /** An empty list means that no bias light was used. */
  readonly biasLight?: readonly BiasSource[] | null
  readonly biasVoltageV?: number | null
  readonly temperatureC?: number | null
  /** Zero means unchopped. */
  readonly chopperHz?: number | null
  /** Wavelengths at which an order-sorting filter comes in. */
  readonly filterChangesNm?: readonly number[] | null
  /** ISO dates, year-month-day. */
  readonly referenceCalibrationDate?: string | null
  readonly measuredOn?: string | null
}

/** A junction of the device, with what is known of it. */
export interface JunctionInContext {
  /** EQE of the scan that stands for the junction; null when there is none yet. */
  readonly scan: Curve | null
  readonly diode?: JunctionDiode | null
}

/** One scan of a bias series, with the total bias irradiance (W m⁻²) and the bias voltage at which it was taken. */
export interface BiasSeriesMember {
  readonly scan: Curve
  readonly irradianceWM2: number | null
  readonly biasVoltageV: number | null
}

/** A scan and everything that its checks may look at. What is missing makes a check say "not checked". */
export interface ScanInContext {
  /** Apparent EQE, fraction. */
  readonly scan: Curve
  /** Place of the junction under test, 0 = sunward. */
  readonly junctionIndex: number
  /** All junctions from the sunward side, the one under test too (its entry's scan is not used). */
  readonly junctions: readonly JunctionInContext[]
  /** Junctions in series share a current; independent ones (four terminals) need no bias light. Default series. */
  readonly connection?: 'series' | 'independent'
  readonly conditions: ScanConditions
  /** Standard uncertainty of each point from the file, EQE fraction. */
  readonly noise?: ArrayLike<number> | null
  /** Lock-in X and Y on the grid of the scan, any unit. */
  readonly inPhase?: ArrayLike<number> | null
  readonly quadrature?: ArrayLike<number> | null
  /** Other scans of the same junction, of this device or a neighbour. */
  readonly repeats?: readonly Curve[] | null
  /** The bias series that the scan belongs to, the scan itself at `ownIndex`. */
  readonly biasSeries?: { readonly members: readonly BiasSeriesMember[]; readonly ownIndex: number } | null
  readonly reflectance?: Curve | null
  /** J_sc of the illuminated J–V of the device under `spectrum`, mA cm⁻². */
  readonly shortCircuitCurrentMaCm2?: number | null
  /** The spectrum that currents are counted under. */
  readonly spectrum?: Spectrum | null
}

export interface Threshold {
  readonly value: number
  readonly unit: string
  readonly meaning: string
}

export type ThresholdValues = Readonly<Record<string, number>>

/** One check of the registry. `run` never changes data and never throws for a missing input. */
export interface Check {
  readonly name: string
  readonly title: string
  /** What it needs, in words. */
  readonly inputs: readonly string[]
  readonly defaultThresholds: Readonly<Record<string, Threshold>>
  readonly advice: string
  readonly run: (context: ScanInContext, thresholds: ThresholdValues) => CheckOutcome
}

export const PASSED: CheckOutcome = { outcome: 'passed' }

export const notChecked = (reason: string): CheckOutcome => ({ outcome: 'not-checked', reason })

export interface Firing {
  readonly severity: Severity
  readonly message: string
  readonly numbers: Readonly<Record<string, FindingNumber>>
  readonly bandsNm?: Finding['bandsNm']
}

export function fired(check: Pick<Check, 'name' | 'title' | 'advice'>, firing: Firing): CheckOutcome {
  return {
    outcome: 'fired',
    finding: {
      check: check.name,
      title: check.title,
      advice: check.advice,
      severity: firing.severity,
      message: firing.message,
      numbers: firing.numbers,
      bandsNm: firing.bandsNm ?? [],
    },
  }
}
