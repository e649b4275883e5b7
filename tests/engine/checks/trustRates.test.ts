import { describe, expect, it } from 'vitest'
import { randomDevice } from '../../../bench/trust/devices.js'
import { trustRates, unmixingErrors } from '../../../bench/trust/experiment.js'
import { measure, planNight } from '../../../bench/trust/measuring.js'
import { runChecks } from '../../../shared/physics/checks/runChecks.js'
import { seededRandom } from '../../../shared/physics/numerics/random.js'

describe('findings on devices of known truth', () => {
  it('well-measured devices raise nothing above a note, and every check has its inputs', () => {
    const random = seededRandom(31)
    for (let n = 0; n < 15; n++) {
      const night = measure(planNight(randomDevice(random), random))
      for (const { context } of night) {
        const report = runChecks(context)
        expect(report.findings.filter((f) => f.severity !== 'note')).toEqual([])
        const reasons = report.notChecked.map((r) => r.check)
        expect(reasons.filter((c) => c !== 'luminescent-coupling' && c !== 'second-order-suspected')).toEqual([])
      }
    }
  })

  it('finds at least 95 % of random faults with at most 2 % false rejects', () => {
    const rates = trustRates(90, 77)
    expect(rates.faults).toBeGreaterThan(50)
    expect(rates.found / rates.faults).toBeGreaterThanOrEqual(0.95)
    expect(rates.falseRejects / rates.scans).toBeLessThanOrEqual(0.02)
    expect(rates.falseCautions / rates.scans).toBeLessThanOrEqual(0.05)
  })

  it('unmixing brings Jsc within 0.5 % of the truth below 20 % leakage', () => {
    const errors = unmixingErrors(40, 5)
    expect(Math.max(...errors.map((e) => e.share))).toBeGreaterThan(0.15)
    for (const e of errors) expect(Math.abs(e.relative)).toBeLessThan(0.005)
    expect(Math.max(...errors.map((e) => Math.abs(e.before)))).toBeGreaterThan(0.02)
  })
})
