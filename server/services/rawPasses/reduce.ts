import { ApiError } from '../../../shared/contract/errors.js'
import type { RawPassInput, RawReduction, ReducedRaw, SignalColumns } from '../../../shared/contract/rawPasses.js'
import { makeCurve, type Curve } from '../../../shared/physics/curve.js'
import { DomainError } from '../../../shared/physics/errors.js'
import {
  internalQuantumEfficiency,
  reduceRawSignals,
  type LockInReading,
  type RawPass,
  type ReducedScan,
} from '../../../shared/physics/measurement/rawSignals.js'
import type { RawColumns } from '../../database/entities/RawMeasurement.js'
import type { RawMeasurementRow } from '../../database/repositories/rawMeasurements.js'
import { presentCurve } from '../../presenters/curve.js'

export type StoredRaw = Pick<RawMeasurementRow, 'reduction' | 'deviceColumns' | 'referenceColumns' | 'calibration'>

/** EQE of stored raw columns. @throws ApiError INPUT_INVALID with the engine's sentence. */
export function reduceStored({ reduction, deviceColumns, referenceColumns, calibration }: StoredRaw): ReducedScan {
  try {
    return reduceRawSignals({
      device: passOf(reduction.device, deviceColumns),
      reference: passOf(reduction.reference, referenceColumns),
      calibration: { curve: makeCurve(calibration.wavelengthNm, calibration.values), unit: 'eqe' },
      ...(reduction.overfilled && { overfilled: reduction.overfilled }),
      corrections: correctionsOf(reduction),
    })
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    throw new ApiError('INPUT_INVALID', { errors: [{ path: ['reduction'], message: error.message }] }, error.message)
  }
}

export function presentReduced({ eqe, factors, remarks }: ReducedScan, reflectance: Curve | null): ReducedRaw {
  const iqe = reflectance && iqeOf(eqe, reflectance)
  return {
    eqe: presentCurve(eqe),
    iqe: iqe && 'curve' in iqe ? presentCurve(iqe.curve) : null,
    factors: {
      ...factors,
      wavelengthNm: Array.from(factors.wavelengthNm),
      referenceEqe: Array.from(factors.referenceEqe),
      deviceSignalV: Array.from(factors.deviceSignalV),
      referenceSignalV: Array.from(factors.referenceSignalV),
      monitorRatio: Array.from(factors.monitorRatio),
    },
    remarks: [
      ...remarks,
      ...(iqe === null ? ['No IQE: the device has no reflectance scan.'] : []),
      ...(iqe && 'reason' in iqe ? [`No IQE: ${iqe.reason}`] : []),
    ],
  }
}

/** Every column that a pass names. */
export function columnsOf({ signal, dark, monitor }: RawPassInput): number[] {
  const columns = [signal, dark].flatMap((one) => (one ? Object.values(one) : []))
  return [...new Set(monitor === null ? columns : [...columns, monitor])]
}

function iqeOf(eqe: Curve, reflectance: Curve): { curve: Curve } | { reason: string } {
  try {
    return { curve: internalQuantumEfficiency(eqe, reflectance) }
  } catch (error) {
    if (error instanceof DomainError) return { reason: error.message }
    throw error
  }
}

function passOf(pass: RawPassInput, { wavelengthNm, byColumn }: RawColumns): RawPass {
  const column = (index: number): number[] => byColumn[String(index)]!
  return {
    wavelengthNm,
    signal: readingOf(pass.signal, column),
    ...(pass.dark && { dark: readingOf(pass.dark, column) }),
    ...(pass.monitor !== null && { monitor: column(pass.monitor) }),
    gain: pass.gain,
  }
}

function readingOf(signal: SignalColumns, column: (index: number) => number[]): LockInReading {
  if ('inPhase' in signal) return { inPhaseV: column(signal.inPhase), quadratureV: column(signal.quadrature) }
  const magnitudeV = column(signal.magnitude)
  return 'phase' in signal ? { magnitudeV, phaseDeg: column(signal.phase) } : { magnitudeV }
}

function correctionsOf({ corrections }: RawReduction): Record<string, number> {
  return Object.fromEntries(corrections.map(({ name, factor }) => [name, factor]))
}
