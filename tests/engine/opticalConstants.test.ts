import { describe, expect, it } from 'vitest'
import {
  OPTICAL_CONSTANT_IDS,
  OPTICAL_CONSTANTS,
  type OpticalConstantsId,
} from '../../shared/data/optical-constants/index.js'
import {
  absorptionPerCm,
  assertOpticalConstants,
  materialById,
  opticalColumnAt,
} from '../../shared/physics/absorption/index.js'
import { DomainError } from '../../shared/physics/errors.js'
import { LIBRARY_GAPS_EV } from '../../shared/physics/whatIf/index.js'

/** Rows, range in nm and the sums of n and of k, taken from the published rows with exact decimal arithmetic. */
const ENTERED: Record<OpticalConstantsId, [rows: number, fromNm: number, toNm: number, n: number, k: number]> = {
  'si-green-2008': [121, 250, 1450, 469.126, 51.53927221],
  'gaas-papatryfonos-2021': [101, 299.5, 1215.61, 390.56772, 84.63873564],
  'gainp-schubert-1995': [85, 294.65, 953.95, 307.95803, 29.43943],
  'ge-nunley-2016': [118, 300.2, 1907, 536.065, 155.7631887],
  'gainas-adachi-1989': [96, 300.05, 1789.2, 369.6559, 83.125704],
  'ch3nh3pbi3-phillips-2015': [120, 300.009583, 1198.320557, 287.013186, 41.056542],
  'ito-konig-2014': [116, 299.32, 1000, 209.2306686, 1.29671523],
  'ag-jiang-2016': [95, 300, 1200, 15.238, 429.995],
  'mgf2-rodriguez-de-marcos-2017': [86, 299.042, 1198.88, 122.421488, 0.052043],
  'soda-lime-clear-rubin-1985': [72, 310, 1200, 109.73405, 0.0001928561],
  'soda-lime-low-iron-rubin-1985': [72, 310, 1200, 109.73405, 4.374427e-5],
}
const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0)
const column = (id: OpticalConstantsId, which: 'n' | 'k', wavelengthNm: number): number =>
  opticalColumnAt(OPTICAL_CONSTANTS[id], OPTICAL_CONSTANTS[id][which], Float64Array.of(wavelengthNm))[0]!

describe.each(OPTICAL_CONSTANT_IDS)('%s', (id) => {
  const table = OPTICAL_CONSTANTS[id]
  const [rows, fromNm, toNm, n, k] = ENTERED[id]

  it('holds every row that was published', () => {
    expect([table.wavelengthNm.length, table.wavelengthNm[0], table.wavelengthNm.at(-1)]).toEqual([rows, fromNm, toNm])
    expect(sum(table.n) / n).toBeCloseTo(1, 9)
    expect(sum(table.k) / k).toBeCloseTo(1, 8)
  })

  it('can be computed with, and says where it is from', () => {
    expect(() => assertOpticalConstants(table, id)).not.toThrow()
    expect(table.id).toBe(id)
    expect(table.reference).toMatch(/\d{4}.*doi 10\./)
    expect(table.caveat).toMatch(/\.$/)
  })

  it('is not extrapolated', () => {
    const outside = (): unknown => opticalColumnAt(table, table.k, Float64Array.of(toNm + 1))
    expect(outside).toThrow(DomainError)
    expect(outside).toThrow(`${table.name} is known from ${fromNm} to ${toNm} nm`)
  })
})

describe('figures of the sources', () => {
  it('silicon absorbs 64.0 per cm at 1000 nm (Green 2008)', () => {
    const table = OPTICAL_CONSTANTS['si-green-2008']
    expect(absorptionPerCm({ kind: 'table', table }, Float64Array.of(1000))[0]).toBeCloseTo(64, 0)
    expect(column('si-green-2008', 'n', 300)).toBe(4.976)
  })

  it('gallium arsenide is transparent from 939 nm on, gallium indium phosphide from 675 nm', () => {
    for (const [id, edge] of [
      ['gaas-papatryfonos-2021', 939],
      ['gainp-schubert-1995', 675],
    ] as const) {
      const { wavelengthNm, k } = OPTICAL_CONSTANTS[id]
      expect(k.filter((value, i) => wavelengthNm[i]! >= edge && value !== 0)).toEqual([])
      expect(column(id, 'k', edge - 20)).toBeGreaterThan(0)
    }
  })

  it('the perovskite keeps the tail of a fit below its gap, as its caveat says', () => {
    expect(column('ch3nh3pbi3-phillips-2015', 'k', 900)).toBeGreaterThan(0.01)
    expect(OPTICAL_CONSTANTS['ch3nh3pbi3-phillips-2015'].caveat).toMatch(/must not count as current/)
  })

  it('the n of both glasses is that of the published formula', () => {
    // n = 1.5130 − 0.003169 λ² + 0.003962 λ⁻², λ in µm: M. Rubin, Sol. Energy Mater. 12, 275 (1985)
    for (const id of ['soda-lime-clear-rubin-1985', 'soda-lime-low-iron-rubin-1985'] as const) {
      const { wavelengthNm, n } = OPTICAL_CONSTANTS[id]
      wavelengthNm.forEach((nm, i) => {
        const um = nm / 1000
        expect(Math.abs(n[i]! - (1.513 - 0.003169 * um * um + 0.003962 / (um * um)))).toBeLessThan(6e-6)
      })
    }
  })
})

it('every absorber with a known gap is in the library, and absorbs above that gap', () => {
  for (const [id, gapEv] of Object.entries(LIBRARY_GAPS_EV)) {
    const table = materialById(OPTICAL_CONSTANTS, id, 'absorber')
    const [alpha] = absorptionPerCm({ kind: 'table', table }, Float64Array.of(1239.842 / (gapEv + 0.1)))
    expect(alpha).toBeGreaterThan(10)
  }
})
