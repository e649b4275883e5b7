import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { PHOTON_ENERGY_NM_EV } from '../../shared/physics/constants.js'
import { shortCircuitCurrentDensity } from '../../shared/physics/currents.js'
import { makeCurve } from '../../shared/physics/curve.js'
import { DomainError } from '../../shared/physics/errors.js'
import { matching } from '../../shared/physics/matching.js'
import { referenceSpectrum } from '../../shared/physics/spectrum.js'

describe('published devices (the currents of their EQE)', () => {
  it.each([
    ['4.1 all-perovskite, Lin et al., Nature (2022)', [16.7, 16.8], 1, 16.7],
    ['4.6 perovskite on silicon, poly-SiOx contacts', [17.8, 19.2], 1, 17.8],
    ['4.7 three perovskites, EES Solar (2025) d4el00012a', [9.6, 9.3, 9.0], 3, 9.0],
  ])('%s', (_, currents, limiting, jLim) => {
    const result = matching(currents, 'series')
    expect(result.limitingJunction).toBe(limiting)
    expect(result.jLimMaCm2).toBe(jLim)
  })

  it.each([
    ['4.3 all-perovskite of 28.5 %', 16.5],
    ['4.4 all-perovskite of 30.6 %', 16.6],
  ])('%s: equal currents limit together, no junction is picked', (_, current) => {
    const result = matching([current, current], 'series')
    expect(result.limitingJunction).toBeNull()
    expect(result.limitingJunctions).toEqual([1, 2])
    expect([result.mismatchPercent, result.gainOpenMaCm2, result.jMatchedMaCm2]).toEqual([0, 0, current])
  })
})

describe('the figures of a series stack', () => {
  it('are excess, mismatch, pairs and the gain still open', () => {
    // 20, 25, 21 mA/cm²: J_lim 20, J_matched 66/3 = 22, gain 2, mismatch 25 %.
    const result = matching([20, 25, 21], 'series')
    expect(result).toMatchObject({ limitingJunction: 1, limitingJunctions: [1], mismatchPercent: 25 })
    expect([result.jLimMaCm2, result.jMatchedMaCm2, result.gainOpenMaCm2]).toEqual([20, 22, 2])
    expect(result.junctions).toEqual([
      { excessMaCm2: 0, excessPercent: 0 },
      { excessMaCm2: 5, excessPercent: 25 },
      { excessMaCm2: 1, excessPercent: 5 },
    ])
    expect(result.pairs).toEqual([
      { higher: 2, lower: 1, differenceMaCm2: 5, mismatchPercent: 25 },
      { higher: 3, lower: 1, differenceMaCm2: 1, mismatchPercent: 5 },
      { higher: 2, lower: 3, differenceMaCm2: 4, mismatchPercent: expect.closeTo(400 / 21, 12) as number },
    ])
  })

  it('4.18 name two of three where two tie', () => {
    const result = matching([18, 20, 18], 'series')
    expect(result.limitingJunction).toBeNull()
    expect(result.limitingJunctions).toEqual([1, 3])
    expect(result.pairs[1]).toEqual({ higher: 1, lower: 3, differenceMaCm2: 0, mismatchPercent: 0 })
  })

  it('follow the junctions when they are put in another order, and scale with the light', () => {
    const stacks = fc.array(fc.double({ min: 0.01, max: 70, noNaN: true }), { minLength: 2, maxLength: 6 })
    fc.assert(
      fc.property(stacks, fc.double({ min: 0.01, max: 100, noNaN: true }), (currents, suns) => {
        const result = matching(currents, 'series')
        const turned = matching([...currents].reverse(), 'series')
        expect(turned.jLimMaCm2).toBe(result.jLimMaCm2)
        expect(turned.mismatchPercent).toBe(result.mismatchPercent)
        expect(turned.limitingJunctions.map((i) => currents.length + 1 - i).reverse()).toEqual(result.limitingJunctions)
        expect([...turned.junctions].reverse()).toEqual(result.junctions)
        expect(Math.abs(turned.jMatchedMaCm2 / result.jMatchedMaCm2 - 1)).toBeLessThan(1e-14)
        expect(result.gainOpenMaCm2).toBeGreaterThanOrEqual(0)

        const brighter = matching(
          currents.map((current) => suns * current),
          'series',
        )
        expect(Math.abs(brighter.jLimMaCm2 - suns * result.jLimMaCm2)).toBeLessThan(1e-12 * suns * result.jLimMaCm2)
        expect(Math.abs(brighter.mismatchPercent - result.mismatchPercent)).toBeLessThan(
          1e-12 * (100 + result.mismatchPercent),
        )
      }),
      { seed: 51 },
    )
  })
})

describe('ideal steps on silicon', () => {
  const currentsOf = (topEv: number, spectrum: 'AM1.5G' | 'AM1.5D'): number[] => {
    const top = PHOTON_ENERGY_NM_EV / topEv
    return [
      [280, top],
      [top, PHOTON_ENERGY_NM_EV / 1.12],
    ].map((band) => shortCircuitCurrentDensity(makeCurve(band, [1, 1]), referenceSpectrum(spectrum)))
  }

  it('4.15 a 1.68 eV top leaves a 1.12 eV bottom 2.309 mA/cm² short under AM1.5G', () => {
    const currents = currentsOf(1.68, 'AM1.5G')
    expect(currents[0]).toBeCloseTo(23.06, 2)
    expect(currents[1]).toBeCloseTo(20.751, 2)
    const result = matching(currents, 'series')
    expect(result.limitingJunction).toBe(2)
    expect(Math.abs(result.junctions[0]!.excessMaCm2 - 2.309)).toBeLessThan(0.015)
  })

  it.each([
    ['AM1.5G', 1.7203],
    ['AM1.5D', 1.6918],
  ] as const)('13.18 under %s a %s eV top matches it', (spectrum, gapEv) => {
    const [top, bottom] = currentsOf(gapEv, spectrum)
    expect(Math.abs(top! - bottom!)).toBeLessThan(0.015)
  })
})

describe('what has no matching', () => {
  it('is said of junctions with terminals of their own', () => {
    const result = matching([20, 15], 'independent')
    expect(result).toEqual({ wiring: 'independent', reason: expect.stringMatching(/no matching applies\.$/) as string })
    expect(matching([20], 'independent').wiring).toBe('independent')
  })

  it.each([
    ['one junction', [20], 'A series stack has at least two junctions, not 1.'],
    ['none', [], 'A series stack has at least two junctions, not 0.'],
    ['a dark junction', [20, 0], 'The current of junction 2 is 0 mA/cm²; matching needs currents above zero.'],
    ['a negative current', [-1, 20], 'The current of junction 1 is -1 mA/cm²; matching needs currents above zero.'],
    ['a current that is no number', [20, NaN], 'currentsMaCm2[1] is NaN; it must be a finite number.'],
  ])('%s is refused', (_, currents, message) => {
    expect(() => matching(currents, 'series')).toThrow(DomainError)
    expect(() => matching(currents, 'series')).toThrow(message)
  })
})
