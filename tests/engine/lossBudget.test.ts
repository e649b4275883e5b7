import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { PHOTON_ENERGY_NM_EV } from '../../shared/physics/constants.js'
import { makeCurve, valueAt } from '../../shared/physics/curve.js'
import type { Curve } from '../../shared/physics/curve.js'
import { DomainError } from '../../shared/physics/errors.js'
import { defaultLossBands, lastEdgeNm, lossBudget } from '../../shared/physics/lossBudget.js'
import type { LossAccount } from '../../shared/physics/lossBudget.js'
import { makeSpectrum } from '../../shared/physics/spectrum.js'
import type { Spectrum } from '../../shared/physics/spectrum.js'
import { currentWeights, weightedSum } from '../../shared/physics/uncertainty/index.js'
import { band, stripedSun } from './uncertainty/device.js'

const sun = stripedSun()
const sunOf = (curve: Curve): Spectrum => makeSpectrum({ id: 'test', name: 'Test', curve })
const junctions = [band(310, 770, 0.88), band(770, 1120, 0.9)]
const reflectance = makeCurve([280, 350, 500, 640, 900, 1100, 1250], [0.2, 0.12, 0.04, 0.07, 0.03, 0.1, 0.3])

const sumOf = ({ junctionsMaCm2, reflectionMaCm2, remainderMaCm2 }: LossAccount): number =>
  junctionsMaCm2.reduce((sum, current) => sum + current, (reflectionMaCm2 ?? 0) + remainderMaCm2)

/** Current of a unit response between two wavelengths. */
const photons = (fromNm: number, toNm: number): number =>
  weightedSum(currentWeights(Float64Array.of(fromNm, toNm), sun.curve), Float64Array.of(1, 1))

describe('loss budget', () => {
  const budget = lossBudget({ junctions, reflectance, spectrum: sun })

  it('runs from 300 nm to where the last junction falls below 2 %', () => {
    expect(budget.fromNm).toBe(300)
    expect(valueAt(junctions[1]!, budget.toNm)).toBeCloseTo(0.02, 10)
    expect(budget.toNm).toBeGreaterThan(1120)
  })

  it('adds up to the current of every photon in the range, as a whole and in every band', () => {
    expect(Math.abs(sumOf(budget.whole) - photons(300, budget.toNm))).toBeLessThan(1e-9)
    for (const part of budget.bands) expect(Math.abs(sumOf(part) - photons(part.fromNm, part.toNm))).toBeLessThan(1e-9)
    expect(
      Math.abs(budget.bands.reduce((sum, part) => sum + part.totalMaCm2, 0) - budget.whole.totalMaCm2),
    ).toBeLessThan(1e-9)
  })

  it('has a remainder that is the integral of 1 − R − ΣEQE itself', () => {
    const { wavelengthNm, remainder } = budget.curves
    const direct = weightedSum(currentWeights(wavelengthNm, sun.curve), remainder)
    expect(Math.abs(direct - budget.whole.remainderMaCm2)).toBeLessThan(1e-9)
  })

  it('gives each junction its current, less the tail beyond the edge', () => {
    const [top] = junctions.map((eqe) => weightedSum(currentWeights(eqe.wavelengthNm, sun.curve), eqe.values))
    expect(budget.whole.junctionsMaCm2[0]).toBeCloseTo(top!, 6)
    const bands = budget.bands.map((part) => part.junctionsMaCm2[0]!)
    expect(bands.reduce((sum, current) => sum + current, 0)).toBeCloseTo(budget.whole.junctionsMaCm2[0]!, 10)
  })

  it('stacks to one at every wavelength', () => {
    const { wavelengthNm, junctions: parts, reflection, remainder } = budget.curves
    wavelengthNm.forEach((_, k) =>
      expect(parts[0]![k]! + parts[1]![k]! + reflection![k]! + remainder[k]!).toBeCloseTo(1, 12),
    )
    expect(wavelengthNm[0]).toBe(300)
    expect(wavelengthNm.at(-1)).toBe(budget.toNm)
  })

  it('has the closed form under one photon current per nm', () => {
    const nm = [280, 700, 1300]
    // E λ constant: 0.1 mA/cm² for every nm.
    const flat = makeCurve(
      nm,
      nm.map((x) => PHOTON_ENERGY_NM_EV / x),
    )
    const step = (from: number, to: number, eqe: number): Curve => makeCurve([from, to], [eqe, eqe])
    const { whole } = lossBudget({
      junctions: [step(300, 800, 0.8), step(800, 1200, 0.7)],
      reflectance: step(250, 1300, 0.1),
      spectrum: sunOf(flat),
    })
    expect(whole.totalMaCm2).toBeCloseTo(90, 9)
    expect(whole.junctionsMaCm2[0]).toBeCloseTo(40, 9)
    expect(whole.junctionsMaCm2[1]).toBeCloseTo(28, 9)
    expect(whole.reflectionMaCm2).toBeCloseTo(9, 9)
    expect(whole.remainderMaCm2).toBeCloseTo(13, 9)
  })
})

describe('what can be said without a whole reflectance', () => {
  it('without any: 1 − ΣEQE in one piece', () => {
    const budget = lossBudget({ junctions, reflectance: null, spectrum: sun })
    expect(budget.whole.reflectionMaCm2).toBeNull()
    expect(budget.curves.reflection).toBeNull()
    expect(budget.withoutReflectanceNm).toEqual([[300, budget.toNm]])
    expect(sumOf(budget.whole)).toBeCloseTo(budget.whole.totalMaCm2, 10)
  })

  it('names the wavelengths that it does not reach and counts nothing reflected there', () => {
    const part = makeCurve([400, 900], [0.1, 0.1])
    const budget = lossBudget({ junctions, reflectance: part, spectrum: sun })
    expect(budget.withoutReflectanceNm).toEqual([
      [300, 400],
      [900, budget.toNm],
    ])
    expect(budget.whole.reflectionMaCm2).toBeCloseTo(0.1 * photons(400, 900), 10)
  })

  it('says where ΣEQE + R exceeds one and keeps the negative remainder', () => {
    const mirror = makeCurve([280, 1300], [0.2, 0.2])
    const budget = lossBudget({ junctions, reflectance: mirror, spectrum: sun })
    expect(budget.aboveOneNm![0]).toBeGreaterThan(310)
    expect(budget.aboveOneNm![1]).toBeLessThan(1120)
    expect(budget.bands.some((part) => part.remainderMaCm2 < 0)).toBe(true)
    expect(lossBudget({ junctions, reflectance, spectrum: sun }).aboveOneNm).toBeNull()
  })
})

describe('bands and range', () => {
  it('start from 300–400 nm and steps of 200 nm', () => {
    expect(defaultLossBands(300, 1130).map(({ name }) => name)).toEqual([
      '300–400 nm',
      '400–600 nm',
      '600–800 nm',
      '800–1000 nm',
      '1000–1130 nm',
    ])
    expect(defaultLossBands(300, 350)).toEqual([{ name: '300–350 nm', fromNm: 300, toNm: 350 }])
  })

  it('any cut of the range adds up to the whole', () => {
    fc.assert(
      fc.property(fc.uniqueArray(fc.integer({ min: 301, max: 1119 }), { minLength: 1, maxLength: 6 }), (nm) => {
        const edges = [300, ...nm.sort((a, b) => a - b), 1120]
        const bands = edges.slice(1).map((toNm, i) => ({ name: `${i}`, fromNm: edges[i]!, toNm }))
        const budget = lossBudget({ junctions, reflectance, spectrum: sun, bands, toNm: 1120 })
        const sum = (pick: (part: LossAccount) => number): number =>
          budget.bands.reduce((total, part) => total + pick(part), 0)
        expect(Math.abs(sum((part) => part.remainderMaCm2) - budget.whole.remainderMaCm2)).toBeLessThan(1e-9)
        expect(Math.abs(sum((part) => part.reflectionMaCm2!) - budget.whole.reflectionMaCm2!)).toBeLessThan(1e-9)
      }),
      { seed: 17, numRuns: 25 },
    )
  })

  it('ends at the end of a scan that is cut off above 2 %', () => {
    expect(lastEdgeNm([makeCurve([300, 900], [0.8, 0.8])])).toBe(900)
  })

  it.each<[string, () => unknown, string]>([
    ['no junction', () => lossBudget({ junctions: [], reflectance, spectrum: sun }), 'at least one'],
    ['a dark device', () => lastEdgeNm([makeCurve([300, 900], [0, 0.01])]), 'No junction has an EQE'],
    [
      'a spectrum that starts too late',
      () => lossBudget({ junctions, reflectance, spectrum: sunOf(makeCurve([400, 1500], [1, 1])) }),
      'covers 400 to 1500 nm',
    ],
    [
      'overlapping bands',
      () =>
        lossBudget({
          junctions,
          reflectance,
          spectrum: sun,
          bands: [
            { name: 'blue', fromNm: 400, toNm: 520 },
            { name: 'green', fromNm: 500, toNm: 600 },
          ],
        }),
      'Bands "blue" and "green" overlap below 520 nm',
    ],
    [
      'a reversed band',
      () => lossBudget({ junctions, reflectance, spectrum: sun, bands: [{ name: 'x', fromNm: 600, toNm: 500 }] }),
      'from 600 to 500 nm',
    ],
    [
      'a band outside',
      () => lossBudget({ junctions, reflectance, spectrum: sun, bands: [{ name: 'x', fromNm: 200, toNm: 500 }] }),
      'leaves the range',
    ],
    ['an empty range', () => lossBudget({ junctions, reflectance, spectrum: sun, toNm: 290 }), 'not beyond its start'],
  ])('refuses %s', (_, run, words) => {
    expect(run).toThrow(DomainError)
    expect(run).toThrow(words)
  })
})
