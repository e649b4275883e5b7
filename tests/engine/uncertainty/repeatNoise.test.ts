import { describe, expect, it } from 'vitest'
import { makeCurve } from '../../../shared/physics/curve.js'
import type { Curve } from '../../../shared/physics/curve.js'
import { DomainError } from '../../../shared/physics/errors.js'
import { seededRandom } from '../../../shared/physics/numerics/random.js'
import { repeatNoise } from '../../../shared/physics/uncertainty/index.js'
import { band } from './device.js'

const truth = band(310, 770, 0.88)

function repeats(count: number, noise: number, drift: number): Curve[] {
  const random = seededRandom(42)
  return Array.from({ length: count }, () => {
    const factor = 1 + drift * random.normal()
    return makeCurve(
      truth.wavelengthNm,
      truth.values.map((value) => factor * (value + noise * random.normal())),
    )
  })
}

describe('noise from repeat scans', () => {
  it('finds the noise of a scan, and √n less for the mean', () => {
    const { singleScanRms, pointUncertainty, pointDegreesOfFreedom } = repeatNoise(repeats(8, 0.005, 0))
    expect(Math.abs(singleScanRms / 0.005 - 1)).toBeLessThan(0.06)
    const rms = Math.sqrt(pointUncertainty.reduce((sum, u) => sum + u * u, 0) / pointUncertainty.length)
    expect(rms).toBeCloseTo(singleScanRms / Math.sqrt(8), 12)
    expect(pointDegreesOfFreedom).toBe(7)
  })

  it('keeps a drift of the whole scan apart from the noise', () => {
    const result = repeatNoise(repeats(12, 0.002, 0.02))
    expect(result.singleScanRms).toBeLessThan(0.0024)
    expect(result.driftPercent).toBeGreaterThan(1)
    expect(result.driftPercent).toBeLessThan(3.2)
    expect(result.driftOfMeanPercent).toBeCloseTo(result.driftPercent / Math.sqrt(12), 12)
  })

  it('has the closed form for two scans', () => {
    const a = makeCurve([400, 500], [0.5, 0.6])
    const b = makeCurve([400, 500], [0.6, 0.5])
    const { mean, pointUncertainty, driftPercent } = repeatNoise([a, b])
    expect([...mean.values].map((value) => value.toFixed(12))).toEqual(['0.550000000000', '0.550000000000'])
    pointUncertainty.forEach((u) => expect(u).toBeCloseTo(0.05, 12))
    expect(driftPercent).toBeCloseTo(0, 10)
  })

  it('is zero for identical scans', () => {
    expect(repeatNoise([truth, truth, truth]).singleScanRms).toBeLessThan(1e-15)
  })

  it.each<[string, () => unknown, string]>([
    ['a single scan', () => repeatNoise([truth]), 'There is one scan'],
    ['another number of points', () => repeatNoise([truth, makeCurve([300, 400], [1, 1])]), 'Repeat 2 has 2 points'],
    [
      'other wavelengths',
      () => repeatNoise([makeCurve([300, 400], [1, 1]), makeCurve([300, 401], [1, 1])]),
      'Repeat 2 has 401 nm where the first has 400 nm',
    ],
    [
      'a scan of something else',
      () => repeatNoise([makeCurve([300, 400], [0.9, 0]), makeCurve([300, 400], [-0.1, 0.01])]),
      'does not resemble',
    ],
  ])('refuses %s', (_, run, words) => {
    expect(run).toThrow(DomainError)
    expect(run).toThrow(words)
  })
})
