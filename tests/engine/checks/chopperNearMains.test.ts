import { describe, expect, it } from 'vitest'
import { chopperNearMains as check } from '../../../shared/physics/checks/chopperNearMains.js'
import { contextOf, findingOf, run, withConditions } from './device.js'

const at = (chopperHz: number | null) => withConditions(contextOf(0), { chopperHz })

describe('chopper near a mains harmonic', () => {
  it.each([
    [50, 50],
    [60.5, 60],
    [99.2, 100],
    [121, 120],
    [180, 180],
    [240, 240],
    [300, 300],
  ])('fires at %f Hz', (chopper, harmonic) => {
    const finding = findingOf(check, at(chopper))
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.harmonic).toEqual({ value: harmonic, unit: 'Hz' })
  })

  it.each([133, 217, 270, 330, 83, 37, 473, 51.1, 118.9])('passes at %f Hz', (chopper) => {
    expect(run(check, at(chopper)).outcome).toBe('passed')
  })

  it('not recorded, or not chopped: not checked', () => {
    expect(run(check, at(null))).toEqual({ outcome: 'not-checked', reason: 'no chopper frequency recorded' })
    expect(run(check, at(0))).toEqual({ outcome: 'not-checked', reason: 'the light was not chopped' })
  })
})
