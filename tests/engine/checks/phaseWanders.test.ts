import { describe, expect, it } from 'vitest'
import { phaseWanders as check } from '../../../shared/physics/checks/phaseWanders.js'
import { simulateScan } from '../../../shared/physics/measurement/simulateScan.js'
import { contextOf, findingOf, run, tandem, wellTaken } from './device.js'

/** A top scan whose phase turns from the first to the last point; its signal ends near 760 of 300 to 1200 nm. */
function turning(turnDeg: number, noise = 0) {
  const { scan, inPhase, quadrature } = simulateScan(tandem, {
    ...wellTaken[0]!,
    noise,
    phase: { startDeg: 175, turnDeg },
  })
  return { ...contextOf(0), scan, inPhase: inPhase!, quadrature: quadrature! }
}
/** Share of the scan over which the signal is above 5 %. */
const SHARE = 0.5

describe('phase wanders', () => {
  it('fires above 5°, also through 180°', () => {
    const finding = findingOf(check, turning(5.6 / SHARE))
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.turn!.value).toBeGreaterThan(5)
    expect(finding.numbers.turn!.value).toBeLessThan(6)
    expect(finding.bandsNm[0]![1]).toBeLessThan(800)
  })

  it('just passes below 5°, and noise alone does not fire', () => {
    expect(run(check, turning(4.6 / SHARE)).outcome).toBe('passed')
    expect(run(check, turning(0, 2e-3)).outcome).toBe('passed')
  })

  it('without X and Y: not checked', () => {
    expect(run(check, contextOf(0))).toEqual({ outcome: 'not-checked', reason: 'no X and Y recorded' })
    expect(run(check, { ...turning(1), quadrature: [1] }).outcome).toBe('not-checked')
  })
})
