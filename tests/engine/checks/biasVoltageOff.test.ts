import { describe, expect, it } from 'vitest'
import { biasVoltageOff as check } from '../../../shared/physics/checks/biasVoltageOff.js'
import { contextOf, findingOf, run, withConditions } from './device.js'

const wanted = findingOf(check, withConditions(contextOf(0), { biasVoltageV: 5 })).numbers.wantedVoltage!.value
const at = (biasVoltageV: number | null) => withConditions(contextOf(0), { biasVoltageV })

describe('bias voltage off', () => {
  it('wants the open-circuit voltage of the other junction under the bias light', () => {
    // About 7.9 mA/cm² of infrared light in a silicon cell of 1e-10 mA/cm².
    expect(wanted).toBeCloseTo(0.025692579 * Math.log(7.9 / 1e-10), 2)
  })

  it.each([
    [0.201, 'high'],
    [-0.201, 'low'],
  ])('fires %f V away', (difference, word) => {
    const finding = findingOf(check, at(wanted + difference))
    expect(finding.severity).toBe('caution')
    expect(finding.message).toContain(`0.20 V too ${word}`)
    expect(finding.numbers.difference).toEqual({ value: expect.closeTo(difference, 9), unit: 'V' })
  })

  it('just passes 0.199 V away', () => {
    expect(run(check, at(wanted + 0.199)).outcome).toBe('passed')
    expect(run(check, at(wanted - 0.199)).outcome).toBe('passed')
  })

  it('is no more than a note when the saturation current had to be estimated', () => {
    const context = contextOf(0)
    const unknown = { ...context, junctions: context.junctions.map(({ scan }) => ({ scan })) }
    const finding = findingOf(check, withConditions(unknown, { biasVoltageV: 2 }))
    expect(finding.severity).toBe('note')
    expect(finding.message).toContain('by reciprocity')
  })

  it.each([
    ['no bias voltage recorded', at(null)],
    ['no bias light recorded', withConditions(contextOf(0), { biasLight: null })],
    ['no scan of junction 2', contextOf(0, { junctions: [{ scan: null }, { scan: null }] })],
  ])('%s: not checked', (reason, context) => {
    expect(run(check, context)).toEqual({ outcome: 'not-checked', reason })
  })
})
