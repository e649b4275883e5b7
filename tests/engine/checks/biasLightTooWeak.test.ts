import { describe, expect, it } from 'vitest'
import { biasLightTooWeak as check } from '../../../shared/physics/checks/biasLightTooWeak.js'
import { biasPhotocurrents } from '../../../shared/physics/measurement/biasLight.js'
import { allScans } from '../../../shared/physics/checks/otherJunctions.js'
import { contextOf, findingOf, infrared, blue, run, withConditions } from './device.js'

/** Infrared light for the bottom and as much blue as makes the top limit by exactly `margin`. */
function withMargin(margin: number) {
  const context = contextOf(0)
  const scans = allScans(context, [{ index: 1, scan: context.junctions[1]!.scan! }])
  const [topRed, bottomRed] = biasPhotocurrents(scans, [infrared])
  const [topBlue, bottomBlue] = biasPhotocurrents(scans, [{ ...blue, irradianceWM2: 1 }])
  // bottomRed + b bottomBlue = (1 + margin)(topRed + b topBlue)
  const b = (bottomRed! - (1 + margin) * topRed!) / ((1 + margin) * topBlue! - bottomBlue!)
  return withConditions(context, { biasLight: [infrared, { ...blue, irradianceWM2: b }] })
}

describe('bias light too weak', () => {
  it('cautions when the junction under test limits by less than a fifth', () => {
    const finding = findingOf(check, withMargin(0.19))
    expect(finding.severity).toBe('caution')
    expect(finding.numbers.margin!.value).toBeCloseTo(0.19, 3)
    expect(finding.message).toMatch(/junction 1 limits by 19\.0 % only/)
  })

  it('rejects when it does not limit, and without any bias light', () => {
    const finding = findingOf(check, withMargin(-0.05))
    expect(finding.severity).toBe('reject')
    expect(finding.message).toMatch(/junction 1 does not limit, the scan shows junction 2/)
    expect(findingOf(check, withConditions(contextOf(0), { biasLight: [] })).severity).toBe('reject')
  })

  it('just passes at a fifth', () => {
    expect(run(check, withMargin(0.2001))).toEqual({ outcome: 'passed' })
  })

  it.each([
    ['no bias light recorded', withConditions(contextOf(0), { biasLight: null })],
    ['no scan of junction 2', contextOf(0, { junctions: [{ scan: null }, { scan: null }] })],
    ['the device has one junction', contextOf(0, { junctions: [{ scan: null }] })],
    ['the junctions do not share a current', contextOf(0, { connection: 'independent' })],
  ])('%s: not checked', (reason, context) => {
    expect(run(check, context)).toEqual({ outcome: 'not-checked', reason })
  })
})
