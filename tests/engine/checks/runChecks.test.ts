import { describe, expect, it } from 'vitest'
import { CHECKS } from '../../../shared/physics/checks/registry.js'
import { runChecks } from '../../../shared/physics/checks/runChecks.js'
import { contextOf } from './device.js'

describe('the registry', () => {
  it('has seventeen checks with their own names, advice and thresholds with units', () => {
    expect(CHECKS.length).toBe(17)
    expect(new Set(CHECKS.map((c) => c.name)).size).toBe(17)
    for (const check of CHECKS) {
      expect(check.advice.length).toBeGreaterThan(30)
      expect(Object.keys(check.defaultThresholds).length).toBeGreaterThan(0)
      for (const threshold of Object.values(check.defaultThresholds)) expect(threshold.meaning).not.toBe('')
    }
  })
})

describe('runChecks', () => {
  it.each([0, 1])('a well-taken scan of junction %i has no finding, and each check is accounted for', (index) => {
    const report = runChecks(contextOf(index))
    expect(report.findings).toEqual([])
    expect(report.passed.length + report.notChecked.length).toBe(CHECKS.length)
    expect(report.notChecked.map((n) => n.reason)).toContain('no reflectance')
  })

  it('with nothing but the scan, what needs more says what is missing', () => {
    const { scan } = contextOf(0)
    const report = runChecks({ scan, junctionIndex: 0, junctions: [{ scan }, { scan: null }], conditions: {} })
    const reasons = Object.fromEntries(report.notChecked.map((n) => [n.check, n.reason]))
    expect(reasons).toMatchObject({
      'bias-light-too-weak': 'no bias light recorded',
      leakage: 'no scan of junction 2',
      'chopper-near-mains': 'no chopper frequency recorded',
      'phase-wanders': 'no X and Y recorded',
      'sum-above-absorptance': 'no scan of junction 2',
      'coarse-step': 'no spectrum',
    })
  })

  it('lists the worst finding first', () => {
    const context = contextOf(1)
    const report = runChecks({ ...context, conditions: { ...context.conditions, biasLight: [], chopperHz: 100 } })
    expect(report.findings.map((f) => [f.check, f.severity])).toEqual([
      ['bias-light-too-weak', 'reject'],
      ['bias-voltage-off', 'caution'],
      ['chopper-near-mains', 'caution'],
    ])
  })

  it('takes thresholds from the settings and refuses those that do not exist', () => {
    const context = contextOf(0)
    const strict = runChecks(context, { 'chopper-near-mains': { smallestDistanceHz: 20 } })
    expect(strict.findings.map((f) => f.check)).toEqual(['chopper-near-mains'])
    expect(() => runChecks(context, { nonsense: {} })).toThrow(/no check named nonsense/)
    expect(() => runChecks(context, { noisy: { wrong: 1 } })).toThrow(/has no threshold wrong; it has largestRms/)
    expect(() => runChecks(context, { noisy: { largestRms: NaN } })).toThrow(/finite number/)
    expect(() => runChecks({ ...context, junctionIndex: 2 })).toThrow(/2 junctions/)
  })
})
