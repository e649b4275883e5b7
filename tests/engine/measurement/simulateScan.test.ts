import { describe, expect, it } from 'vitest'
import { valueAt } from '../../../shared/physics/curve.js'
import { simulateScan } from '../../../shared/physics/measurement/simulateScan.js'
import { blue, grid, infrared, tandem, topEqe } from '../checks/device.js'

const conditions = { wavelengthNm: grid(300, 1200, 5), biasLight: [infrared], biasVoltageV: 0.6 }

describe('the simulated scan', () => {
  it('infrared bias light selects the top, blue the bottom', () => {
    const top = simulateScan(tandem, conditions)
    expect(top.truth.selectivities[0]).toBeGreaterThan(0.999)
    expect(valueAt(top.scan, 500)).toBeCloseTo(topEqe(500), 3)
    const bottom = simulateScan(tandem, { ...conditions, biasLight: [blue], biasVoltageV: 1.15 })
    expect(bottom.truth.selectivities[1]).toBeGreaterThan(0.999)
    expect(valueAt(bottom.scan, 500)).toBeLessThan(0.002)
  })

  it('the same seed gives the same scan, another seed another', () => {
    const noisy = { ...conditions, noise: 0.002, relativeNoise: 0.001 }
    const first = simulateScan(tandem, { ...noisy, seed: 7 })
    expect(simulateScan(tandem, { ...noisy, seed: 7 }).scan).toEqual(first.scan)
    expect(simulateScan(tandem, { ...noisy, seed: 8 }).scan).not.toEqual(first.scan)
    expect(first.noise![40]).toBeCloseTo(Math.hypot(0.002, 0.001 * topEqe(500)), 5)
  })

  it('second order repeats the half wavelength until a filter sorts it out', () => {
    const free = simulateScan(tandem, { ...conditions, secondOrderShare: 0.05 })
    const sorted = simulateScan(tandem, { ...conditions, secondOrderShare: 0.05, filters: [{ atNm: 600 }] })
    expect(valueAt(free.scan, 900)).toBeCloseTo(0.05 * topEqe(450), 3)
    expect(valueAt(sorted.scan, 900)).toBeLessThan(0.002)
  })

  it('a filter with a factor makes a step, a scale moves everything', () => {
    const stepped = simulateScan(tandem, { ...conditions, filters: [{ atNm: 600, factor: 0.9 }], scale: 1.1 })
    expect(valueAt(stepped.scan, 595)).toBeCloseTo(1.1 * topEqe(595), 3)
    expect(valueAt(stepped.scan, 600)).toBeCloseTo(0.99 * topEqe(600), 3)
  })

  it('X and Y have the asked phase and the magnitude of the scan', () => {
    const { scan, inPhase, quadrature } = simulateScan(tandem, { ...conditions, phase: { startDeg: 10, turnDeg: 20 } })
    const i = 40
    expect(Math.hypot(inPhase![i]!, quadrature![i]!)).toBeCloseTo(scan.values[i]!, 9)
    expect((Math.atan2(quadrature![i]!, inPhase![i]!) * 180) / Math.PI).toBeCloseTo(10 + (20 * i) / 180, 6)
  })

  it('each junction needs a diode', () => {
    expect(() => simulateScan({ ...tandem, diodes: [] }, conditions)).toThrow(/each junction needs one/)
    expect(() => simulateScan(tandem, { ...conditions, noise: -1 })).toThrow(/noise/)
  })
})
