import { describe, expect, it } from 'vitest'
import { gapWavelengthNm, photovoltaicGap, type PhotovoltaicGap } from '../../shared/physics/bandGap.js'
import { PHOTON_ENERGY_NM_EV } from '../../shared/physics/constants.js'
import { makeCurve, type Curve } from '../../shared/physics/curve.js'
import { seededRandom } from '../../shared/physics/numerics/random.js'

type Response = (energyEv: number) => number
const logistic =
  (gapEv: number, widthEv: number, plateau = 1): Response =>
  (energyEv) =>
    plateau / (1 + Math.exp(-(energyEv - gapEv) / widthEv))

/** A scan of a response in wavelength steps, as an instrument takes it. */
function scan(response: Response, fromNm: number, toNm: number, stepNm: number): Curve {
  const points = Math.floor((toNm - fromNm) / stepNm) + 1
  const wavelengthNm = Array.from({ length: points }, (_, i) => fromNm + i * stepNm)
  return makeCurve(
    wavelengthNm,
    wavelengthNm.map((nm) => response(PHOTON_ENERGY_NM_EV / nm)),
  )
}

function gapOf(eqe: Curve): PhotovoltaicGap {
  const result = photovoltaicGap(eqe)
  if (!result.gap) throw new Error(result.reason)
  return result.gap
}

describe('symmetric edges on a fine grid', () => {
  it('7.3 logistic: both gaps at 1.60000 eV, half maximum at 1.57356 and 1.62644 eV', () => {
    const { inflectionEv, meanEv, windowEv } = gapOf(scan(logistic(1.6, 0.015, 0.9), 650, 950, 0.05))
    expect(Math.abs(inflectionEv - 1.6)).toBeLessThan(1e-4)
    expect(Math.abs(meanEv! - 1.6)).toBeLessThan(1e-4)
    expect(Math.abs(windowEv![0] - 1.57356)).toBeLessThan(2e-4)
    expect(Math.abs(windowEv![1] - 1.62644)).toBeLessThan(2e-4)
  })

  it('7.4 error function: both gaps at 1.68000 eV, half maximum at σ√(2 ln 2) on either side', () => {
    const { inflectionEv, meanEv, windowEv } = gapOf(
      scan((ev) => 0.9 * normalBelow((ev - 1.68) / 0.03), 600, 900, 0.05),
    )
    expect(Math.abs(inflectionEv - 1.68)).toBeLessThan(1e-4)
    expect(Math.abs(meanEv! - 1.68)).toBeLessThan(1e-4)
    expect(Math.abs(windowEv![0] - 1.64468)).toBeLessThan(2e-4)
    expect(Math.abs(windowEv![1] - 1.71532)).toBeLessThan(2e-4)
  })

  it('7.7 the derivative is taken in energy: in wavelength the maximum would lie 0.562 meV higher', () => {
    const { inflectionEv } = gapOf(scan(logistic(1.6, 0.015), 650, 950, 0.02))
    expect(Math.abs(inflectionEv - 1.6)).toBeLessThan(0.00005)
  })
})

describe('scans as laboratories take them', () => {
  it.each([
    [5, 1.6, 0.0003],
    [10, 1.6, 0.0015],
    [5, 1.12, 0.0003],
    [10, 1.12, 0.0015],
    [10, 1.9, 0.003],
  ])('steps of %s nm find an edge at %s eV within %s eV, wherever the points fall', (stepNm, gapEv, tolerance) => {
    for (let phase = 0; phase < 1; phase += 0.1) {
      const eqe = scan(logistic(gapEv, 0.018, 0.85), 300 + phase * stepNm, 1300, stepNm)
      const gap = gapOf(eqe)
      expect(Math.abs(gap.inflectionEv - gapEv)).toBeLessThan(tolerance)
      expect(Math.abs(gap.meanEv! - gapEv)).toBeLessThan(tolerance)
    }
  })

  it.each([
    [0.003, 5, 0.004],
    [0.003, 2, 0.004],
    [0.01, 5, 0.006],
    [0.01, 2, 0.005],
    [0.01, 0.5, 0.005],
  ])('noise of %s in steps of %s nm moves it by less than %s eV', (noise, stepNm, tolerance) => {
    const random = seededRandom(71)
    for (let i = 0; i < 40; i++) {
      const { wavelengthNm, values } = scan(logistic(1.6, 0.018, 0.85), 300 + random.between(0, 5), 900, stepNm)
      const noisy = values.map((y) => y * (1 + noise * random.normal()) + 0.2 * noise * random.normal())
      const gap = gapOf({ wavelengthNm, values: noisy })
      expect(Math.abs(gap.inflectionEv - 1.6)).toBeLessThan(tolerance)
      expect(Math.abs(gap.meanEv! - 1.6)).toBeLessThan(tolerance)
    }
  })

  it('the bottom cell has its own gap, not the rise where the top cell lets light through', () => {
    const bottom: Response = (ev) => (1 - logistic(1.68, 0.018, 0.97)(ev)) * logistic(1.14, 0.022, 0.92)(ev)
    for (const stepNm of [5, 10]) {
      const gap = gapOf(scan(bottom, 300, 1250, stepNm))
      expect(Math.abs(gap.inflectionEv - 1.14)).toBeLessThan(0.001)
      expect(Math.abs(gap.meanEv! - 1.14)).toBeLessThan(0.001)
    }
  })

  it.each([0.02, 0.1, 0.3])('leakage of %s beyond the edge, ended by the lower gap, is not taken for it', (leakage) => {
    const own = logistic(1.6, 0.018, 0.85)
    const lower = logistic(1.14, 0.022)
    const top: Response = (ev) => own(ev) + leakage * (1 - own(ev)) * lower(ev)
    for (const stepNm of [5, 10])
      expect(Math.abs(gapOf(scan(top, 300, 1250, stepNm)).inflectionEv - 1.6)).toBeLessThan(0.003)
  })

  it('a fringe on the plateau is no edge', () => {
    const fringed: Response = (ev) => logistic(1.12, 0.02)(ev) * (0.7 + 0.25 * Math.cos(60 * (ev - 1.12)))
    expect(Math.abs(gapOf(scan(fringed, 600, 1250, 5)).inflectionEv - 1.12)).toBeLessThan(0.012)
  })

  it('the result does not depend on the height of the plateau', () => {
    const full = gapOf(scan(logistic(1.6, 0.018, 0.9), 300, 900, 5))
    const low = gapOf(scan(logistic(1.6, 0.018, 0.009), 300, 900, 5))
    expect(Math.abs(full.inflectionEv - low.inflectionEv)).toBeLessThan(1e-12)
    expect(Math.abs(full.meanEv! - low.meanEv!)).toBeLessThan(1e-12)
  })
})

describe('a scan that does not show its edge', () => {
  it('is told by its reason: it ends too early', () => {
    expect(photovoltaicGap(scan(logistic(1.6, 0.018), 300, 770, 10))).toEqual({
      gap: null,
      reason: 'The scan ends before the response has fallen at the long-wavelength edge.',
    })
  })

  it('has no mean where the edge is cut within its half maximum', () => {
    const { inflectionEv, meanEv, windowEv } = gapOf(scan(logistic(1.6, 0.018), 300, 790, 10))
    expect(Math.abs(inflectionEv - 1.6)).toBeLessThan(0.003)
    expect([meanEv, windowEv]).toEqual([null, null])
  })

  it('shows no response at all', () => {
    const reason = 'The scan shows no response.'
    expect(photovoltaicGap(makeCurve([300, 400, 500], [0, 0, 0]))).toEqual({ gap: null, reason })
    expect(photovoltaicGap(makeCurve([300, 400, 500], [-0.01, -0.02, -0.01]))).toEqual({ gap: null, reason })
  })

  it('has two points only: the middle of their energies', () => {
    const { inflectionEv, meanEv } = gapOf(makeCurve([700, 800], [1, 0]))
    expect(inflectionEv).toBeCloseTo((PHOTON_ENERGY_NM_EV / 700 + PHOTON_ENERGY_NM_EV / 800) / 2, 12)
    expect(meanEv).toBeNull()
  })
})

it('gapWavelengthNm is that of the inflection', () => {
  expect(gapWavelengthNm({ inflectionEv: 1.12, meanEv: 1.2, windowEv: null })).toBeCloseTo(1107.0018, 4)
})

/** Φ(z) by its series: Abramowitz & Stegun 26.2.10. */
function normalBelow(z: number): number {
  if (Math.abs(z) > 7) return z > 0 ? 1 : 0
  let term = z
  let sum = z
  for (let n = 1; n < 200; n++) {
    term *= (-z * z * (2 * n - 1)) / (2 * n * (2 * n + 1))
    sum += term
  }
  return 0.5 + sum / Math.sqrt(2 * Math.PI)
}
