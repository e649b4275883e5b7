import { describe, expect, it } from 'vitest'
import { makeCurve, valueAt } from '../../../shared/physics/curve.js'
import { luminescentCoupling as check } from '../../../shared/physics/checks/luminescentCoupling.js'
import { contextOf, findingOf, run, tandem } from './device.js'

/** A series of bottom scans whose share of the top's response is given at each bias intensity. */
function series(shares: readonly (readonly [irradianceWM2: number | null, share: number])[]) {
  const context = contextOf(1)
  const x = context.scan.wavelengthNm
  const members = shares.map(([irradianceWM2, share]) => ({
    scan: makeCurve(
      x,
      x.map((nm) => (1 - share) * valueAt(tandem.eqes[1]!, nm) + share * valueAt(tandem.eqes[0]!, nm)),
    ),
    irradianceWM2,
    biasVoltageV: 1.1,
  }))
  return { ...context, biasSeries: { members, ownIndex: 0 } }
}

describe('luminescent coupling suspected', () => {
  it('fires when the response in the upper band grows with the bias light', () => {
    const finding = findingOf(
      check,
      series([
        [200, 0.05],
        [20, 0.01],
        [80, 0.03],
      ]),
    )
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.weakestIrradiance).toEqual({ value: 20, unit: 'W/m²' })
    expect(finding.numbers.shareAtStrongest!.value).toBeCloseTo(0.05, 3)
    expect(finding.bandsNm[0]![1]).toBeLessThan(720)
  })

  it('just passes below 1 % of growth, and when the share falls with the light as a shunt does', () => {
    expect(
      run(
        check,
        series([
          [20, 0.01],
          [200, 0.0195],
        ]),
      ).outcome,
    ).toBe('passed')
    expect(
      run(
        check,
        series([
          [20, 0.06],
          [200, 0.01],
        ]),
      ).outcome,
    ).toBe('passed')
  })

  it.each([
    ['no bias series with at least two intensities', contextOf(1)],
    [
      'no bias series with at least two intensities',
      series([
        [20, 0.01],
        [20, 0.06],
        [null, 0.1],
      ]),
    ],
    ['no junction lies above this one', contextOf(0)],
    [
      'no scan of junction 1',
      {
        ...series([
          [20, 0.01],
          [200, 0.06],
        ]),
        junctions: [{ scan: null }, { scan: null }],
      },
    ],
  ])('%s: not checked', (reason, context) => {
    expect(run(check, context)).toEqual({ outcome: 'not-checked', reason })
  })
})
