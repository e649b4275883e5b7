import { expect, it, test } from 'vitest'
import { absorptionFromExtinctionPerCm } from '../../../shared/physics/absorption/index.js'
import {
  beerLambertStack,
  incoherentSlab,
  lambertianAbsorptance,
  lambertianPathFactor,
} from '../../../shared/physics/optics/index.js'

const single = (alphaPerCm: number, thicknessNm: number, pathFactor = 1): number =>
  beerLambertStack([{ alphaPerCm: Float64Array.of(alphaPerCm), thicknessNm, pathFactor }]).absorptance[0]![0]!

it('11.21 α from k, and what 200 nm absorb', () => {
  const alpha = absorptionFromExtinctionPerCm(0.1, 600)
  expect(alpha).toBeCloseTo(20_943.95, 2)
  expect(single(alpha, 200)).toBeCloseTo(0.342216, 6)
})

it('11.22 α of 1e4 per cm over 500 nm', () => expect(single(1e4, 500)).toBeCloseTo(0.393469, 6))

test.each([
  [3.5, 49],
  [3.6, 51.84],
])('11.23 the Lambertian limit for n = %d', (n, factor) => expect(lambertianPathFactor(n)).toBeCloseTo(factor, 10))

test.each([
  [10, 0.898167, 0.16473],
  [1, 0.46865, 0.017839],
])('11.24 weak absorption of %d per cm in 180 µm', (alpha, trapped, once) => {
  expect(lambertianAbsorptance(alpha, 180_000, 3.5)).toBeCloseTo(trapped, 6)
  expect(single(alpha, 180_000)).toBeCloseTo(once, 6)
})

it('what is absorbed and what passes add up to one, and a double path is a double thickness', () => {
  const layers = [3e5, 2e4, 50].map((alpha, l) => ({
    alphaPerCm: Float64Array.of(alpha, alpha / 7),
    thicknessNm: 100 * 30 ** l,
    pathFactor: 1 + l,
  }))
  const { absorptance, transmittance } = beerLambertStack(layers)
  for (const i of [0, 1]) expect(absorptance.reduce((sum, a) => sum + a[i]!, transmittance[i]!)).toBeCloseTo(1, 14)
  expect(single(1234, 400, 2)).toBe(single(1234, 800))
})

it('a thin layer keeps its digits', () => expect(single(1e-6, 1e-3)).toBeCloseTo(1e-16, 30))

it('a layer whose spectrum is of another length, or negative, is named', () => {
  const good = { alphaPerCm: Float64Array.of(1, 2), thicknessNm: 10 }
  expect(() => beerLambertStack([good, { ...good, alphaPerCm: Float64Array.of(1) }])).toThrow(/layers\[1\]\.alphaPerCm/)
  expect(() => beerLambertStack([{ ...good, alphaPerCm: Float64Array.of(1, -2) }])).toThrow(/alphaPerCm\[1\] is -2/)
  expect(() => beerLambertStack([])).toThrow(/at least one layer/)
})

it('the slab keeps energy also when it is opaque or a mirror', () => {
  expect(incoherentSlab(0.04, 0.9, 0)).toEqual({
    reflectance: 0.040000000000000036,
    transmittance: 0,
    absorptance: 0.96,
  })
  expect(incoherentSlab(1, 1, 1)).toEqual({ reflectance: 1, transmittance: 0, absorptance: 0 })
  const slab = incoherentSlab(0.2, 0.3, 0.5)
  expect(slab.reflectance + slab.transmittance + slab.absorptance).toBeCloseTo(1, 15)
})
