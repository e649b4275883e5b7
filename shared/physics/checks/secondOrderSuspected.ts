import { fired, notChecked, PASSED, type Check } from './check.js'
import { secondOrderShare } from './secondOrderShare.js'
import { band, percent } from './wording.js'

/** A grating passes λ/2 together with λ: beyond the edge the scan then repeats its own short-wave response. */
export const secondOrderSuspected: Check = {
  name: 'second-order-suspected',
  title: 'Second order suspected',
  inputs: ['scan beyond the junction’s own edge'],
  defaultThresholds: {
    largestShare: { value: 0.01, unit: '', meaning: 'Share of the response at half the wavelength' },
  },
  advice:
    'Put an order-sorting long-pass filter in before twice the shortest wavelength of the lamp (common practice: near ' +
    '600 nm and again near 1000 nm), record where it changes, and repeat the long-wave part.',
  run(context, thresholds) {
    const others = context.junctions.flatMap((j, i) => (i !== context.junctionIndex && j.scan ? [j.scan] : []))
    const filters = context.conditions.filterChangesNm ?? []
    const found = secondOrderShare(context.scan, others, filters)
    if (!found)
      return secondOrderShare(context.scan, others, []) && filters.length > 0
        ? PASSED
        : notChecked('the scan does not reach far enough beyond the junction’s edge')
    if (!(found.share > thresholds.largestShare! && found.share > 4 * found.uncertainty)) return PASSED
    return fired(this, {
      severity: 'caution',
      message:
        `At ${band(found.bandNm)}, beyond the junction’s edge, the scan follows its own response at half the ` +
        `wavelength: ${percent(found.share)} of it (± ${percent(found.uncertainty, 2)}).`,
      numbers: {
        share: { value: found.share, unit: '' },
        shareUncertainty: { value: found.uncertainty, unit: '' },
      },
      bandsNm: [found.bandNm],
    })
  },
}
