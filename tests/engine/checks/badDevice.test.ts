import { describe, expect, it } from 'vitest'
import { runChecks } from '../../../shared/physics/checks/runChecks.js'
import { simulateScan } from '../../../shared/physics/measurement/simulateScan.js'
import { blue, contextOf, infrared, spectrum, tandem, wellTaken } from './device.js'

/** A leaky bottom cell, too little infrared bias light for the top, and a chopper near mains. */
function badNight() {
  const leaky = {
    ...tandem,
    diodes: [tandem.diodes[0]!, { saturationCurrentMaCm2: 1e-10, shuntResistanceKohmCm2: 0.03 }],
  }
  const lights = [
    [
      { ...infrared, irradianceWM2: 40 },
      { ...blue, irradianceWM2: 78 },
    ],
    [blue],
  ]
  const scans = lights.map((biasLight, k) => {
    const conditions = { ...wellTaken[k]!, biasLight, biasVoltageV: k === 0 ? 0.08 : 1.19 }
    return { conditions, ...simulateScan(leaky, conditions) }
  })
  return scans.map(({ scan, conditions, truth }, k) => ({
    truth,
    context: {
      ...contextOf(k),
      scan,
      junctions: scans.map((s, i) => ({ scan: s.scan, diode: leaky.diodes[i]! })),
      conditions: {
        ...contextOf(k).conditions,
        biasLight: conditions.biasLight,
        biasVoltageV: conditions.biasVoltageV,
        chopperHz: 150.4,
      },
      spectrum,
    },
  }))
}

describe('the bad device', () => {
  it('has exactly its three faults named', () => {
    const night = badNight()
    const reports = night.map(({ context }) => runChecks(context))
    expect(night[1]!.truth.selectivities[0]).toBeGreaterThan(0.05)
    expect(reports[0]!.findings.map((f) => f.check).sort()).toEqual(['bias-light-too-weak', 'chopper-near-mains'])
    expect(reports[1]!.findings.map((f) => f.check).sort()).toEqual(['chopper-near-mains', 'leakage'])
    expect(reports[1]!.findings[0]!.severity).toBe('reject')
  })
})
