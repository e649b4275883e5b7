import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { REFERENCE_SPECTRUM_IDS, isReferenceSpectrumId, REFERENCE_SPECTRA } from '../../shared/data/spectra/index.js'
import { makeCurve } from '../../shared/physics/curve.js'
import { DomainError } from '../../shared/physics/errors.js'
import { integrateProduct } from '../../shared/physics/integration.js'
import {
  makeSpectrum,
  photonFluxM2S,
  referenceSpectrum,
  scaleSpectrum,
  totalIrradianceWM2,
} from '../../shared/physics/spectrum.js'

const nm = (id: (typeof REFERENCE_SPECTRUM_IDS)[number]): readonly number[] => REFERENCE_SPECTRA[id].wavelengthNm

describe('reference spectra', () => {
  it('2.1 ASTM G173-03 has 2002 rows with the steps of the standard', () => {
    for (const id of ['AM1.5G', 'AM1.5D'] as const) {
      expect(nm(id)).toHaveLength(2002)
      expect(REFERENCE_SPECTRA[id].irradianceWM2Nm).toHaveLength(2002)
      const steps = nm(id)
        .slice(1)
        .map((x, i) => [nm(id)[i]!, x - nm(id)[i]!] as const)
      for (const [at, step] of steps) {
        const expected = at < 400 ? 0.5 : at < 1700 ? 1 : at === 1700 ? 2 : at === 1702 ? 3 : 5
        expect([at, step]).toEqual([at, expected])
      }
      expect([nm(id)[0], nm(id).at(-1)]).toEqual([280, 4000])
    }
  })

  it('ASTM E490-00a has the 1441 rows from 200.5 to 4000 nm', () => {
    expect(nm('AM0')).toHaveLength(1441)
    expect(REFERENCE_SPECTRA.AM0.irradianceWM2Nm).toHaveLength(1441)
    expect([nm('AM0')[0], nm('AM0').at(-1)]).toEqual([200.5, 4000])
  })

  it.each([
    ['2.2', 'AM1.5G', 1000.37, 0.05],
    ['2.3', 'AM1.5D', 900.14, 0.05],
    // The part of the 1366.1 W/m² of ASTM E490-00a that lies between 200.5 and 4000 nm.
    ['E490', 'AM0', 1354.24, 0.05],
  ] as const)('%s total irradiance of %s is %s W/m²', (_, id, total, tolerance) => {
    expect(Math.abs(totalIrradianceWM2(referenceSpectrum(id)) - total)).toBeLessThan(tolerance)
  })

  it('2.6 irradiance of AM1.5G between 300 and 1200 nm', () => {
    const { curve } = referenceSpectrum('AM1.5G')
    const ones = makeCurve([300, 1200], [1, 1])
    expect(Math.abs(integrateProduct(curve, ones) - 836.09)).toBeLessThan(0.05)
  })

  it('2.8 photon flux of AM1.5G', () => {
    expect(photonFluxM2S(referenceSpectrum('AM1.5G')) / 4.30557e21).toBeCloseTo(1, 4)
  })

  it('1.14 irradiance of AM1.5G at 700 nm', () => {
    const i = nm('AM1.5G').indexOf(700)
    expect(REFERENCE_SPECTRA['AM1.5G'].irradianceWM2Nm[i]).toBe(1.2823)
  })

  it('are known by their ids alone, and made once', () => {
    expect(REFERENCE_SPECTRUM_IDS.every(isReferenceSpectrumId)).toBe(true)
    expect(isReferenceSpectrumId('AM1.5')).toBe(false)
    expect(referenceSpectrum('AM0')).toBe(referenceSpectrum('AM0'))
    expect(referenceSpectrum('AM0').name).toBe('AM0')
  })
})

describe('makeSpectrum', () => {
  const make = (x: number[], y: number[]) => makeSpectrum({ id: 'lamp', name: 'Lamp', curve: makeCurve(x, y) })

  it('gives the photon current q E λ/(h c): a photon at 1239.842 nm carries 1 eV, so 1 W is 1 A', () => {
    const { photonCurrent } = make([1239.841984332, 2479.683968664], [1, 1])
    // 1 W m⁻² nm⁻¹ → 1 A m⁻² nm⁻¹ = 0.1 mA cm⁻² nm⁻¹
    expect(photonCurrent.values[0]).toBeCloseTo(0.1, 12)
    expect(photonCurrent.values[1]).toBeCloseTo(0.2, 12)
  })

  it('refuses light below zero, no light and bad curves, by name', () => {
    expect(() => make([300, 400], [1, -0.1])).toThrow('The irradiance at 400 nm is -0.1; it must be zero or above.')
    expect(() => make([300, 400], [0, 0])).toThrow('The spectrum holds no light: every irradiance is zero.')
    const broken = { wavelengthNm: Float64Array.of(300, 300), values: Float64Array.of(1, 1) }
    expect(() => makeSpectrum({ id: 'lamp', name: 'Lamp', curve: broken })).toThrow(
      'spectrum.wavelengthNm[1] = 300 is not above 300 before it.',
    )
    const gap = { wavelengthNm: Float64Array.of(300, 400), values: Float64Array.of(1, NaN) }
    expect(() => makeSpectrum({ id: 'lamp', name: 'Lamp', curve: gap })).toThrow(DomainError)
  })
})

describe('scaleSpectrum', () => {
  it('gives the total that is asked for, and photons in the same ratio (2.36: 1000.0 W/m² is G173 × 0.99963)', () => {
    const global = referenceSpectrum('AM1.5G')
    const scaled = scaleSpectrum(global, 1000)
    expect(totalIrradianceWM2(scaled)).toBeCloseTo(1000, 9)
    expect(photonFluxM2S(scaled) / photonFluxM2S(global)).toBeCloseTo(0.99963, 5)
    expect(scaled.curve.wavelengthNm).toBe(global.curve.wavelengthNm)
    expect(totalIrradianceWM2(global)).toBeCloseTo(1000.37, 1)
  })

  it('comes back', () => {
    const direct = referenceSpectrum('AM1.5D')
    fc.assert(
      fc.property(fc.double({ min: 1e-3, max: 1e6, noNaN: true }), (total) => {
        const back = scaleSpectrum(scaleSpectrum(direct, total), totalIrradianceWM2(direct))
        expect(Math.abs(photonFluxM2S(back) / photonFluxM2S(direct) - 1)).toBeLessThan(1e-13)
      }),
      { seed: 31, numRuns: 30 },
    )
  })

  it.each([0, -100, NaN, Infinity])('refuses a total of %s W/m²', (total) => {
    expect(() => scaleSpectrum(referenceSpectrum('AM0'), total)).toThrow(
      `totalWM2 is ${total}; it must be a number above zero.`,
    )
  })
})
