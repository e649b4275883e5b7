import { describe, expect, it } from 'vitest'
import { disagreesWithJv as check } from '../../../shared/physics/checks/disagreesWithJv.js'
import { shortCircuitCurrentDensity } from '../../../shared/physics/currents.js'
import { contextOf, findingOf, run, spectrum } from './device.js'

const currents = [0, 1].map((i) => shortCircuitCurrentDensity(contextOf(i).scan, spectrum))
const limiting = currents[0]! < currents[1]! ? 0 : 1
const least = currents[limiting]!
const withJv = (index: number, shortCircuitCurrentMaCm2: number | null) =>
  contextOf(index, { shortCircuitCurrentMaCm2 })

describe('disagrees with J–V', () => {
  it('fires on the limiting junction when its current is 3.1 % off', () => {
    const finding = findingOf(check, withJv(limiting, least / 0.969))
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.difference!.value).toBeCloseTo(-0.031, 9)
    expect(finding.message).toMatch(/3\.1 % below/)
    expect(findingOf(check, withJv(limiting, least / 1.031)).message).toMatch(/3\.1 % above/)
  })

  it('just passes at 2.9 %, and on the junction that does not limit', () => {
    expect(run(check, withJv(limiting, least / 0.971)).outcome).toBe('passed')
    expect(run(check, withJv(1 - limiting, least / 0.9)).outcome).toBe('passed')
  })

  it.each([
    ['no Jsc of an illuminated J–V', withJv(limiting, null)],
    ['no spectrum', { ...withJv(limiting, 10), spectrum: null }],
    ['no scan of junction 2', { ...withJv(0, 10), junctions: [{ scan: null }, { scan: null }] }],
    ['the junctions do not share a current', { ...withJv(0, 10), connection: 'independent' as const }],
  ])('%s: not checked', (reason, context) => {
    expect(run(check, context)).toEqual({ outcome: 'not-checked', reason })
  })
})
