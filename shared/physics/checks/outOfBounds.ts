import { bandsOf } from './bands.js'
import { fired, PASSED, type Check } from './check.js'
import { band, percent } from './wording.js'

/** An EQE lies between zero and one. */
export const outOfBounds: Check = {
  name: 'negative-or-above-one',
  title: 'Negative or above one',
  inputs: [],
  defaultThresholds: {
    lowest: { value: -0.01, unit: '', meaning: 'Least EQE that passes' },
    highest: { value: 1.02, unit: '', meaning: 'Largest EQE that passes' },
  },
  advice:
    'Below zero: subtract the dark reading as X and Y and check the phase setting. Above one: check gains, areas and ' +
    'the reference detector’s calibration; a forgotten amplifier range is a factor of ten.',
  run(context, thresholds) {
    const { values, wavelengthNm } = context.scan
    const isOutside = Array.from(values, (y) => y < thresholds.lowest! || y > thresholds.highest!)
    if (!isOutside.includes(true)) return PASSED
    const least = values.reduce((a, b) => Math.min(a, b))
    const most = values.reduce((a, b) => Math.max(a, b))
    const bands = bandsOf(wavelengthNm, isOutside)
    return fired(this, {
      severity: 'caution',
      message: `EQE runs from ${percent(least)} to ${percent(most)}; it leaves the physical range at ${bands.map(band).join(', ')}.`,
      numbers: { lowest: { value: least, unit: '' }, highest: { value: most, unit: '' } },
      bandsNm: bands,
    })
  },
}
