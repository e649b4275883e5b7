import { describe, expect, it, test } from 'vitest'
import {
  absorptionPerCm,
  directGapAbsorptionPerCm,
  gapShiftRangeEv,
  joinEnergyEv,
  materialById,
  type Absorber,
} from '../../../shared/physics/absorption/index.js'
import { PHOTON_ENERGY_NM_EV } from '../../../shared/physics/constants.js'
import { DomainError } from '../../../shared/physics/errors.js'

const edge = { bandGapEv: 1.68, alpha0PerCm: 150_000, urbachMev: 15 }

describe('the direct edge with its tail', () => {
  test.each([1, 15, 60, 400])('joins where the logarithmic slope is 1/E_U: %d meV', (urbachMev) => {
    const join = joinEnergyEv({ ...edge, urbachMev })
    expect(1 / (2 * (join - 1.68)) - 1 / join).toBeCloseTo(1000 / urbachMev, 8)
  })

  it('is continuous in value and slope at the join', () => {
    const join = joinEnergyEv(edge)
    const alpha = (e: number): number => directGapAbsorptionPerCm(edge, e)
    const h = 1e-6
    expect(alpha(join - 1e-12) / alpha(join)).toBeCloseTo(1, 9)
    const left = (alpha(join) - alpha(join - h)) / h
    const right = (alpha(join + h) - alpha(join)) / h
    expect(right / left).toBeCloseTo(1, 3)
  })

  it('falls by e over the Urbach energy, and follows the square root far above', () => {
    const alpha = (e: number): number => directGapAbsorptionPerCm(edge, e)
    expect(alpha(1.6) / alpha(1.585)).toBeCloseTo(Math.E, 10)
    expect(alpha(2.5)).toBeCloseTo(150_000 * Math.sqrt(0.82 / 1.68) * (1.68 / 2.5), 8)
  })

  test.each([0, -5, Number.NaN, 1680, Infinity])('an Urbach energy of %d meV is impossible', (urbachMev) => {
    expect(() => joinEnergyEv({ ...edge, urbachMev })).toThrow(/urbachMev/)
  })
})

describe('a rigid shift', () => {
  const grid = Float64Array.from({ length: 90 }, (_, i) => 310 + 6 * i)
  const table: Absorber = {
    kind: 'table',
    table: { name: 'test film', wavelengthNm: [300, 500, 700, 900], n: [2, 2, 2, 2], k: [1, 0.5, 0.1, 0] },
  }

  it('moves the edge in energy and leaves its form', () => {
    const shifted = absorptionPerCm({ kind: 'edge', edge }, grid, 0.07)
    grid.forEach((nm, i) =>
      expect(shifted[i]).toBeCloseTo(directGapAbsorptionPerCm(edge, PHOTON_ENERGY_NM_EV / nm - 0.07), 6),
    )
  })

  it('of a table answers from the table, and of nothing is the table', () => {
    const at = Float64Array.of(600)
    expect(absorptionPerCm(table, at)[0]).toBeCloseTo((4e7 * Math.PI * 0.3) / 600, 6)
    const energy = PHOTON_ENERGY_NM_EV / 600 - 0.1
    const from = PHOTON_ENERGY_NM_EV / energy
    const k = 0.5 + ((from - 500) / 200) * -0.4
    expect(absorptionPerCm(table, at, 0.1)[0]).toBeCloseTo((4e7 * Math.PI * k) / from, 6)
  })

  it('is refused with the range where the table ends, and the allowed shifts are told', () => {
    expect(() => absorptionPerCm(table, Float64Array.of(299))).toThrow(DomainError)
    expect(() => absorptionPerCm(table, Float64Array.of(299))).toThrow(/test film is known from 300 to 900 nm.*299 nm/)
    expect(() => absorptionPerCm(table, Float64Array.of(310), -0.5)).toThrow(/300 to 900 nm/)
    const [lowest, highest] = gapShiftRangeEv(table, 310, 850)
    expect(() => absorptionPerCm(table, Float64Array.of(310, 850), lowest * 0.999)).not.toThrow()
    expect(() => absorptionPerCm(table, Float64Array.of(310, 850), highest * 0.999)).not.toThrow()
    expect(() => absorptionPerCm(table, Float64Array.of(310, 850), lowest * 1.01)).toThrow(/300 to 900/)
    expect(() => absorptionPerCm(table, Float64Array.of(310, 850), highest * 1.01)).toThrow(/300 to 900/)
  })
})

it('a material that is not in the library is named with those that are', () => {
  const library = { glass: { wavelengthNm: [300, 900], n: [1.5, 1.5], k: [0, 0] } }
  expect(materialById(library, 'glass', 'material').name).toBe('glass')
  expect(() => materialById(library, 'toString', 'junction 1')).toThrow(/junction 1 is "toString".*Known are: glass/)
})
