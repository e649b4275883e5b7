import { foreignShare } from '../measurement/exclusiveBand.js'
import { fired, notChecked, PASSED, type Check } from './check.js'
import { band, junctionName, percent } from './wording.js'

/** Light that the junction above emits feeds the one under test: its response there grows with the bias light. */
export const luminescentCoupling: Check = {
  name: 'luminescent-coupling',
  title: 'Luminescent coupling suspected',
  inputs: ['bias series with at least two intensities', 'scan of the junction above'],
  defaultThresholds: {
    smallestGrowth: {
      value: 0.01,
      unit: '',
      meaning: 'Growth of the response in the band of the junction above from the weakest to the strongest bias light',
    },
  },
  advice:
    'Exclude a shunt or breakdown first (J–V under the same bias light; a shunt’s share falls with intensity and moves ' +
    'with the bias voltage, coupling does not). Then scan at the lowest intensity on the plateau and unmix the rest.',
  run(context, thresholds) {
    if (context.connection === 'independent') return notChecked('the junctions do not share a current')
    const above = context.junctionIndex - 1
    if (above < 0) return notChecked('no junction lies above this one')
    const upper = context.junctions[above]?.scan
    if (!upper) return notChecked(`no scan of ${junctionName(above)}`)
    const members = (context.biasSeries?.members ?? []).flatMap((m) =>
      m.irradianceWM2 === null ? [] : [{ scan: m.scan, irradianceWM2: m.irradianceWM2 }],
    )
    const levels = new Set(members.map((m) => m.irradianceWM2))
    if (levels.size < 2) return notChecked('no bias series with at least two intensities')
    const rest = context.junctions.flatMap((j, i) =>
      i !== above && i !== context.junctionIndex && j.scan ? [j.scan] : [],
    )
    const shares = members
      .sort((a, b) => a.irradianceWM2 - b.irradianceWM2)
      .flatMap((m) => {
        const found = foreignShare(m.scan, upper, rest)
        return found ? [{ ...found, irradianceWM2: m.irradianceWM2 }] : []
      })
    if (shares.length < 2) return notChecked(`no band where ${junctionName(above)} alone responds`)
    const weakest = shares[0]!
    const strongest = shares.at(-1)!
    const growth = strongest.weight - weakest.weight
    const uncertainty = Math.hypot(weakest.uncertainty, strongest.uncertainty)
    if (!(growth > thresholds.smallestGrowth! && growth > 3 * uncertainty)) return PASSED
    return fired(this, {
      severity: 'caution',
      message:
        `In the band of ${junctionName(above)} (${band(strongest.bandNm)}) the response grows from ` +
        `${percent(weakest.weight)} to ${percent(strongest.weight)} of it while the bias light goes from ` +
        `${weakest.irradianceWM2.toPrecision(3)} to ${strongest.irradianceWM2.toPrecision(3)} W/m².`,
      numbers: {
        shareAtWeakest: { value: weakest.weight, unit: '' },
        shareAtStrongest: { value: strongest.weight, unit: '' },
        weakestIrradiance: { value: weakest.irradianceWM2, unit: 'W/m²' },
        strongestIrradiance: { value: strongest.irradianceWM2, unit: 'W/m²' },
      },
      bandsNm: [strongest.bandNm],
    })
  },
}
