import { PHOTON_ENERGY_NM_EV } from '../constants.js'
import { makeCurve, rangeNm, valueAt, type Curve } from '../curve.js'
import { assertPositive, DomainError } from '../errors.js'

/** A lock-in reading at each wavelength, in V: X and Y, magnitude and phase (degrees), or magnitude alone. */
export type LockInReading =
  | { readonly inPhaseV: ArrayLike<number>; readonly quadratureV: ArrayLike<number> }
  | { readonly magnitudeV: ArrayLike<number>; readonly phaseDeg: ArrayLike<number> }
  | { readonly magnitudeV: ArrayLike<number> }

/** How a current became the voltage that the lock-in read. */
export type CurrentToVoltage =
  | { readonly transimpedanceVA: number }
  /** A shunt resistor: its resistance in Ω is its gain in V/A. */
  | { readonly shuntOhm: number }

/** One pass over the wavelengths: of the device under test, or of the reference detector. */
export interface RawPass {
  readonly wavelengthNm: ArrayLike<number>
  readonly signal: LockInReading
  /** Reading with the shutter closed, one value for all wavelengths or one a wavelength. */
  readonly dark?: LockInReading
  readonly gain: CurrentToVoltage
  /** Monitor-diode signal, any unit, the same in both passes. */
  readonly monitor?: ArrayLike<number>
}

/** Calibration of the reference detector. */
export interface ReferenceCalibration {
  readonly curve: Curve
  readonly unit: 'eqe' | 'A/W'
}

/** Illuminated areas in an overfilled beam; an underfilled beam needs none. */
export interface OverfilledAreas {
  readonly referenceCm2: number
  readonly deviceCm2: number
}

export interface RawMeasurement {
  readonly device: RawPass
  readonly reference: RawPass
  readonly calibration: ReferenceCalibration
  readonly overfilled?: OverfilledAreas
  /** Further correction factors by name, each one number (common practice: temperature, shadow, bandwidth). */
  readonly corrections?: Readonly<Record<string, number>>
}

/** Every factor of the product at every wavelength of the device pass, so that each can be shown and questioned. */
export interface ReducedFactors {
  readonly wavelengthNm: Float64Array
  readonly referenceEqe: Float64Array
  /** Amplitudes after the dark was taken off, V. */
  readonly deviceSignalV: Float64Array
  readonly referenceSignalV: Float64Array
  readonly deviceGainVA: number
  readonly referenceGainVA: number
  /** M_ref/M_dut. */
  readonly monitorRatio: Float64Array
  /** A_ref/A_dut; 1 for an underfilled beam. */
  readonly areaRatio: number
  /** Product of the further corrections. */
  readonly correction: number
}

export interface ReducedScan {
  readonly eqe: Curve
  /** EQE λ/(hc/q), A/W. */
  readonly responsivityAW: Curve
  readonly factors: ReducedFactors
  /** X and Y of the device pass after the dark, V; null when only a magnitude was read. */
  readonly vector: { readonly inPhaseV: Float64Array; readonly quadratureV: Float64Array } | null
  /** Sentences about what was assumed. */
  readonly remarks: string[]
}

/** What a lock-in's rms reading is to the amplitude of a 0–1 square wave of 50 % duty: √2/π. */
export const SQUARE_WAVE_RMS_FRACTION = Math.SQRT2 / Math.PI

/**
 * Fundamental of a 0–1 square wave of a given duty cycle, peak: `(2/π) sin(π d)`; its rms is that over √2.
 * @throws DomainError unless the duty cycle lies between 0 and 1.
 */
export function squareWaveFundamental(dutyCycle: number): number {
  if (!(dutyCycle > 0 && dutyCycle < 1))
    throw new DomainError('dutyCycle', `dutyCycle is ${dutyCycle}; it must lie between 0 and 1.`)
  return (2 / Math.PI) * Math.sin(Math.PI * dutyCycle)
}

/** Peak-to-peak current (A) of a square wave from a lock-in's rms reading: `(V/G) π/√2`. */
export function peakToPeakCurrentA(rmsV: number, gain: CurrentToVoltage): number {
  return rmsV / gainVA(gain, 'gain') / SQUARE_WAVE_RMS_FRACTION
}

/**
 * EQE by substitution with a calibrated reference detector:
 * `EQE_dut = EQE_ref · (S_dut/G_dut)/(S_ref/G_ref) · (M_ref/M_dut) · (A_ref/A_dut if overfilled)`.
 * The dark reading is taken off first, as a vector where both parts are there. The lock-in's waveform factor √2/π
 * cancels between the passes and is not applied.
 * Source: IEC 60904-8 (substitution); the vector subtraction is common practice.
 * @throws DomainError for columns of different length, wavelengths of the device pass that the reference pass or the
 * calibration does not cover, a reference signal or monitor of zero, or a factor outside its domain. Reference columns
 * are read linearly between their wavelengths, never beyond. Cost: O(n).
 */
export function reduceRawSignals(raw: RawMeasurement): ReducedScan {
  const { device, reference, calibration } = raw
  const remarks: string[] = []
  const deviceReading = darkFree(device, 'device', remarks)
  const referenceReading = darkFree(reference, 'reference', remarks)
  const wavelengthNm = Float64Array.from(device.wavelengthNm)
  const referenceSignalV = resampled(referenceReading.magnitude, reference, 'reference.signal', wavelengthNm)
  referenceSignalV.forEach((s, i) => {
    if (!(s > 0))
      throw new DomainError(
        'reference.signal',
        `reference.signal is ${s} V at ${wavelengthNm[i]} nm after the dark; the reference detector must see light.`,
      )
  })
  const referenceEqe = calibrationAt(calibration, wavelengthNm)
  const deviceGainVA = gainVA(device.gain, 'device.gain')
  const referenceGainVA = gainVA(reference.gain, 'reference.gain')
  const monitorRatio = monitors(device, reference, wavelengthNm, remarks)
  const areaRatio = raw.overfilled ? areas(raw.overfilled) : 1
  let correction = 1
  for (const [name, factor] of Object.entries(raw.corrections ?? {})) {
    assertPositive(factor, `corrections.${name}`)
    correction *= factor
  }
  remarks.push('The lock-in’s waveform factor √2/π is the same in both passes and cancels; it is not applied.')
  const deviceSignalV = deviceReading.magnitude
  const eqe = wavelengthNm.map(
    (_, i) =>
      ((referenceEqe[i]! * (deviceSignalV[i]! / deviceGainVA)) / (referenceSignalV[i]! / referenceGainVA)) *
      monitorRatio[i]! *
      areaRatio *
      correction,
  )
  return {
    eqe: makeCurve(wavelengthNm, eqe),
    responsivityAW: makeCurve(
      wavelengthNm,
      eqe.map((y, i) => (y * wavelengthNm[i]!) / PHOTON_ENERGY_NM_EV),
    ),
    factors: {
      wavelengthNm,
      referenceEqe,
      deviceSignalV,
      referenceSignalV,
      deviceGainVA,
      referenceGainVA,
      monitorRatio,
      areaRatio,
      correction,
    },
    vector: deviceReading.vector,
    remarks,
  }
}

/**
 * Internal quantum efficiency, `IQE = EQE/(1 − R)`, at the wavelengths of the EQE that the reflectance covers.
 * @throws DomainError when the two do not overlap in two points, or R reaches 1.
 */
export function internalQuantumEfficiency(eqe: Curve, reflectance: Curve): Curve {
  const [from, to] = rangeNm(reflectance)
  const nm = eqe.wavelengthNm.filter((x) => x >= from && x <= to)
  if (nm.length < 2)
    throw new DomainError(
      'reflectance',
      `reflectance runs from ${from} to ${to} nm and meets the EQE in ${nm.length} points; two are needed.`,
    )
  return makeCurve(
    nm,
    nm.map((x) => {
      const absorbed = 1 - valueAt(reflectance, x)
      if (!(absorbed > 0))
        throw new DomainError('reflectance', `reflectance is ${1 - absorbed} at ${x} nm; it must be below 1.`)
      return valueAt(eqe, x) / absorbed
    }),
  )
}

interface DarkFree {
  readonly magnitude: Float64Array
  readonly vector: { readonly inPhaseV: Float64Array; readonly quadratureV: Float64Array } | null
}

function darkFree(pass: RawPass, name: string, remarks: string[]): DarkFree {
  const n = pass.wavelengthNm.length
  const signal = partsOf(pass.signal, n, `${name}.signal`)
  const dark = pass.dark ? partsOf(spread(pass.dark, n), n, `${name}.dark`) : null
  if (signal.vector && (!dark || dark.vector)) {
    const inPhaseV = signal.vector.x.map((x, i) => x - (dark?.vector?.x[i] ?? 0))
    const quadratureV = signal.vector.y.map((y, i) => y - (dark?.vector?.y[i] ?? 0))
    return { magnitude: inPhaseV.map((x, i) => Math.hypot(x, quadratureV[i]!)), vector: { inPhaseV, quadratureV } }
  }
  if (!dark) return { magnitude: signal.magnitude, vector: null }
  remarks.push(
    `The dark reading of the ${name} pass was taken off as a magnitude, because X and Y are not known for both; a dark ` +
      'signal of another phase is then taken off wrongly.',
  )
  return { magnitude: signal.magnitude.map((r, i) => r - dark.magnitude[i]!), vector: null }
}

interface Parts {
  readonly magnitude: Float64Array
  readonly vector: { readonly x: Float64Array; readonly y: Float64Array } | null
}

function partsOf(reading: LockInReading, n: number, name: string): Parts {
  if ('inPhaseV' in reading) {
    const x = column(reading.inPhaseV, n, `${name}.inPhaseV`)
    const y = column(reading.quadratureV, n, `${name}.quadratureV`)
    return { magnitude: x.map((value, i) => Math.hypot(value, y[i]!)), vector: { x, y } }
  }
  const magnitude = column(reading.magnitudeV, n, `${name}.magnitudeV`)
  if (!('phaseDeg' in reading)) return { magnitude, vector: null }
  const angle = column(reading.phaseDeg, n, `${name}.phaseDeg`).map((deg) => (deg * Math.PI) / 180)
  return {
    magnitude,
    vector: {
      x: magnitude.map((r, i) => r * Math.cos(angle[i]!)),
      y: magnitude.map((r, i) => r * Math.sin(angle[i]!)),
    },
  }
}

/** A dark reading of one value stands for every wavelength. */
function spread(reading: LockInReading, n: number): LockInReading {
  const all = (values: ArrayLike<number>): ArrayLike<number> =>
    values.length === 1 ? new Float64Array(n).fill(values[0]!) : values
  if ('inPhaseV' in reading) return { inPhaseV: all(reading.inPhaseV), quadratureV: all(reading.quadratureV) }
  if ('phaseDeg' in reading) return { magnitudeV: all(reading.magnitudeV), phaseDeg: all(reading.phaseDeg) }
  return { magnitudeV: all(reading.magnitudeV) }
}

function column(values: ArrayLike<number>, n: number, name: string): Float64Array {
  if (values.length !== n)
    throw new DomainError(name, `${name} has ${values.length} values; the pass has ${n} wavelengths.`)
  const out = Float64Array.from(values)
  out.forEach((value, i) => {
    if (!Number.isFinite(value)) throw new DomainError(name, `${name}[${i}] is ${value}; it must be a finite number.`)
  })
  return out
}

function resampled(values: Float64Array, pass: RawPass, name: string, wavelengthNm: Float64Array): Float64Array {
  const curve = makeCurve(pass.wavelengthNm, values)
  return covering(curve, name, wavelengthNm)
}

function covering(curve: Curve, name: string, wavelengthNm: Float64Array): Float64Array {
  const [from, to] = rangeNm(curve)
  return wavelengthNm.map((nm) => {
    if (!(nm >= from && nm <= to))
      throw new DomainError(
        name,
        `${name} runs from ${from} to ${to} nm and does not cover ${nm} nm of the device pass.`,
      )
    return valueAt(curve, nm)
  })
}

function calibrationAt(calibration: ReferenceCalibration, wavelengthNm: Float64Array): Float64Array {
  const values = covering(calibration.curve, 'calibration', wavelengthNm)
  return calibration.unit === 'eqe' ? values : values.map((sr, i) => (sr * PHOTON_ENERGY_NM_EV) / wavelengthNm[i]!)
}

function gainVA(gain: CurrentToVoltage, name: string): number {
  if ('shuntOhm' in gain) {
    assertPositive(gain.shuntOhm, `${name}.shuntOhm`)
    return gain.shuntOhm
  }
  assertPositive(gain.transimpedanceVA, `${name}.transimpedanceVA`)
  return gain.transimpedanceVA
}

function monitors(device: RawPass, reference: RawPass, wavelengthNm: Float64Array, remarks: string[]): Float64Array {
  if (!device.monitor || !reference.monitor) {
    if (device.monitor || reference.monitor)
      remarks.push('Only one pass has a monitor signal; it was not used, and lamp drift between the passes remains.')
    else remarks.push('No monitor signal: the lamp is taken as equally bright in both passes.')
    return new Float64Array(wavelengthNm.length).fill(1)
  }
  const dut = column(device.monitor, wavelengthNm.length, 'device.monitor')
  const ref = resampled(
    column(reference.monitor, reference.wavelengthNm.length, 'reference.monitor'),
    reference,
    'reference.monitor',
    wavelengthNm,
  )
  return dut.map((m, i) => {
    assertPositive(m, `device.monitor[${i}]`)
    assertPositive(ref[i]!, `reference.monitor at ${wavelengthNm[i]} nm`)
    return ref[i]! / m
  })
}

function areas(overfilled: OverfilledAreas): number {
  assertPositive(overfilled.referenceCm2, 'overfilled.referenceCm2')
  assertPositive(overfilled.deviceCm2, 'overfilled.deviceCm2')
  return overfilled.referenceCm2 / overfilled.deviceCm2
}
