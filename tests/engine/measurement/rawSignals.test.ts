import { describe, expect, it } from 'vitest'
import { makeCurve, valueAt } from '../../../shared/physics/curve.js'
import {
  internalQuantumEfficiency,
  peakToPeakCurrentA,
  reduceRawSignals,
  SQUARE_WAVE_RMS_FRACTION,
  squareWaveFundamental,
  type RawMeasurement,
} from '../../../shared/physics/measurement/rawSignals.js'
import { grid, topEqe } from '../checks/device.js'

const one = (change: Partial<RawMeasurement> = {}): RawMeasurement => ({
  device: {
    wavelengthNm: [650, 660],
    signal: { magnitudeV: [0.295, 0.295] },
    gain: { transimpedanceVA: 1e5 },
    monitor: [1.03, 1.03],
  },
  reference: {
    wavelengthNm: [650, 660],
    signal: { magnitudeV: [0.256, 0.256] },
    gain: { transimpedanceVA: 1e5 },
    monitor: [0.98, 0.98],
  },
  calibration: { curve: makeCurve([600, 700], [0.41, 0.41]), unit: 'A/W' },
  ...change,
})

describe('waveforms', () => {
  it('fundamental of a 0–1 square wave', () => {
    expect(squareWaveFundamental(0.5)).toBeCloseTo(0.63662, 6)
    expect(squareWaveFundamental(0.45)).toBeCloseTo(0.628782, 6)
    expect(squareWaveFundamental(0.4)).toBeCloseTo(0.605461, 6)
    expect(squareWaveFundamental(0.25)).toBeCloseTo(0.450158, 6)
    expect(SQUARE_WAVE_RMS_FRACTION).toBeCloseTo(0.450158, 6)
    expect(() => squareWaveFundamental(1)).toThrow(/between 0 and 1/)
  })

  it('peak-to-peak currents from rms readings', () => {
    expect(peakToPeakCurrentA(1e-3, { shuntOhm: 10 }) * 1e6).toBeCloseTo(222.144, 3)
    expect(peakToPeakCurrentA(0.256, { transimpedanceVA: 1e5 }) * 1e6).toBeCloseTo(5.68689, 6)
  })
})

describe('substitution', () => {
  it('the example: EQE 0.857448 and 0.449526 A/W', () => {
    const { eqe, responsivityAW, factors } = reduceRawSignals(one())
    expect(eqe.values[0]).toBeCloseTo(0.857448, 6)
    expect(responsivityAW.values[0]).toBeCloseTo(0.449526, 6)
    expect(factors.monitorRatio[0]).toBeCloseTo(0.98 / 1.03, 12)
    expect(factors.referenceEqe[0]).toBeCloseTo((0.41 * 1239.841984) / 650, 6)
  })

  it('a gain ten times lower for the device gives ten times the EQE', () => {
    const raw = one()
    const { eqe } = reduceRawSignals({ ...raw, device: { ...raw.device, gain: { transimpedanceVA: 1e4 } } })
    expect(eqe.values[0]).toBeCloseTo(8.57448, 5)
  })

  it('a shunt resistor of R Ω is a gain of R V/A; areas and corrections multiply', () => {
    const raw = one()
    const { eqe, factors } = reduceRawSignals({
      ...raw,
      device: { ...raw.device, gain: { shuntOhm: 1e5 } },
      overfilled: { referenceCm2: 1, deviceCm2: 0.5 },
      corrections: { shadow: 1.1, temperature: 0.99 },
    })
    expect(eqe.values[0]).toBeCloseTo(0.857448 * 2 * 1.1 * 0.99, 5)
    expect(factors.areaRatio).toBe(2)
    expect(factors.correction).toBeCloseTo(1.089, 12)
  })

  it('X and Y give magnitude and phase: 0.290 and 0.054 are 0.294985', () => {
    const raw = one()
    const signal = { inPhaseV: [0.29, 0.29], quadratureV: [0.054, 0.054] }
    const { factors } = reduceRawSignals({ ...raw, device: { ...raw.device, signal } })
    expect(factors.deviceSignalV[0]).toBeCloseTo(0.294985, 6)
  })

  it('a synthetic raw upload with dark, drift, gains, areas and phases comes back to 1e-6', () => {
    const nm = grid(310, 800, 5)
    const coarse = grid(300, 810, 5)
    const referenceEqe = makeCurve(
      coarse,
      coarse.map((x) => 0.6 + 0.2 * Math.sin(x / 200)),
    )
    const power = (x: number): number => 2e-6 * (1.5 + Math.cos(x / 90))
    const drift = (i: number): number => 1 + 0.001 * i
    const dark = { x: 2e-4, y: -5e-4 }
    const deviceAmplitude = nm.map((x, i) => topEqe(x) * power(x) * drift(i) * 0.25 * 1e6)
    const referenceAmplitude = nm.map((x) => valueAt(referenceEqe, x) * power(x) * 1 * 1e5)
    const phase = nm.map((_, i) => 12 + 0.05 * i)
    const rad = (deg: number): number => (deg * Math.PI) / 180
    const { eqe, vector } = reduceRawSignals({
      device: {
        wavelengthNm: nm,
        signal: {
          inPhaseV: deviceAmplitude.map((r, i) => r * Math.cos(rad(phase[i]!)) + dark.x),
          quadratureV: deviceAmplitude.map((r, i) => r * Math.sin(rad(phase[i]!)) + dark.y),
        },
        dark: { inPhaseV: [dark.x], quadratureV: [dark.y] },
        gain: { transimpedanceVA: 1e6 },
        monitor: nm.map((x, i) => power(x) * drift(i)),
      },
      reference: {
        wavelengthNm: nm,
        signal: { magnitudeV: referenceAmplitude, phaseDeg: phase },
        gain: { shuntOhm: 1e5 },
        monitor: nm.map(power),
      },
      calibration: { curve: referenceEqe, unit: 'eqe' },
      overfilled: { referenceCm2: 1, deviceCm2: 0.25 },
    })
    nm.forEach((x, i) => expect(Math.abs(eqe.values[i]! - topEqe(x))).toBeLessThan(1e-6))
    expect(vector).not.toBeNull()
  })

  it('says when a dark had to be taken off as a magnitude, and what was assumed', () => {
    const raw = one()
    const { eqe, remarks } = reduceRawSignals({ ...raw, device: { ...raw.device, dark: { magnitudeV: [0.005] } } })
    expect(eqe.values[0]).toBeCloseTo((0.857448 * 0.29) / 0.295, 5)
    expect(remarks.join(' ')).toMatch(/taken off as a magnitude/)
    expect(remarks.join(' ')).toMatch(/waveform factor √2\/π/)
    const { monitor: _, ...unmonitored } = raw.device
    expect(reduceRawSignals({ ...raw, device: unmonitored }).remarks.join(' ')).toMatch(/Only one pass has a monitor/)
  })

  it.each([
    ['a short column', { device: { ...one().device, signal: { magnitudeV: [1] } } }, /1 values; the pass has 2/],
    ['a gain of zero', { device: { ...one().device, gain: { shuntOhm: 0 } } }, /device.gain.shuntOhm is 0/],
    ['a dead reference', { reference: { ...one().reference, signal: { magnitudeV: [0, 0] } } }, /must see light/],
    [
      'a calibration too short',
      { calibration: { curve: makeCurve([600, 655], [1, 1]), unit: 'eqe' as const } },
      /does not cover 660 nm/,
    ],
    ['a NaN', { device: { ...one().device, signal: { magnitudeV: [NaN, 1] } } }, /must be a finite number/],
    ['an area of zero', { overfilled: { referenceCm2: 1, deviceCm2: 0 } }, /deviceCm2/],
  ])('refuses %s with a sentence', (_, change, message) => {
    expect(() => reduceRawSignals(one(change))).toThrow(message)
  })
})

describe('internal quantum efficiency', () => {
  it('is EQE over what is not reflected, where the reflectance is known', () => {
    const iqe = internalQuantumEfficiency(
      makeCurve([300, 400, 500], [0.1, 0.6, 0.8]),
      makeCurve([350, 600], [0.2, 0.2]),
    )
    expect(Array.from(iqe.wavelengthNm)).toEqual([400, 500])
    expect(iqe.values[1]).toBeCloseTo(1, 12)
    expect(() => internalQuantumEfficiency(makeCurve([300, 340], [1, 1]), makeCurve([350, 600], [0, 0]))).toThrow(
      /0 points/,
    )
    expect(() => internalQuantumEfficiency(makeCurve([400, 500], [1, 1]), makeCurve([350, 600], [1, 1]))).toThrow(
      /below 1/,
    )
  })
})
