import { describe, expect, it } from 'vitest'
import { makeCurve } from '../../../shared/physics/curve.js'
import { analyseBiasSeries } from '../../../shared/physics/measurement/biasSeries.js'
import { spectrum } from '../checks/device.js'

const scan = (eqe: number) => makeCurve([400, 700], [eqe, eqe])
const series = (pairs: readonly (readonly [number, number])[]) =>
  analyseBiasSeries(
    pairs.map(([level, eqe]) => ({ scan: scan(eqe), level })),
    spectrum,
  )

describe('a bias series', () => {
  it('finds the plateau in any order of input and proposes a scan inside it', () => {
    const found = series([
      [100, 0.8],
      [20, 0.5],
      [40, 0.7],
      [80, 0.799],
      [60, 0.798],
      [120, 0.9],
    ])
    expect(found.steps.map((s) => s.level)).toEqual([20, 40, 60, 80, 100, 120])
    expect(found.plateau).toMatchObject({ fromLevel: 60, toLevel: 100 })
    expect(found.proposedIndex).toBe(3)
    expect(found.steps.filter((s) => s.isOnPlateau).map((s) => s.index)).toEqual([4, 3, 0])
    expect(found.steps[1]!.changeFromBelow).toBeCloseTo(0.4, 9)
    expect(found.steps[0]!.changeFromBelow).toBeNull()
  })

  it('a change of just the limit is still a plateau, just above is none', () => {
    expect(
      series([
        [1, 0.8],
        [2, 0.8 * 1.00499],
      ]).plateau,
    ).not.toBeNull()
    const none = series([
      [1, 0.8],
      [2, 0.8 * 1.00501],
    ])
    expect(none.plateau).toBeNull()
    expect(none.proposedIndex).toBeNull()
  })

  it('says what is wrong with a series', () => {
    expect(() => series([[1, 0.8]])).toThrow(/two scans or more/)
    expect(() =>
      series([
        [1, 0.8],
        [1, 0.7],
      ]),
    ).toThrow(/both at 1/)
    expect(() =>
      series([
        [1, 0],
        [2, 0.7],
      ]),
    ).toThrow(/no current/)
  })
})
