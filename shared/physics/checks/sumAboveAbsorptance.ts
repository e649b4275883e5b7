import { valueAt } from '../curve.js'
import { pointNoise } from '../measurement/pointNoise.js'
import { bandsOf } from './bands.js'
import { fired, notChecked, PASSED, type Check } from './check.js'
import { allScans, isMissing, otherJunctions } from './otherJunctions.js'
import { band } from './wording.js'

/** What is reflected cannot be collected: Σ EQE + R stays below one. */
export const sumAboveAbsorptance: Check = {
  name: 'sum-above-absorptance',
  title: 'Sum above absorptance',
  inputs: ['scans of the other junctions', 'reflectance'],
  defaultThresholds: {
    scaleUncertainty: {
      value: 0.01,
      unit: '',
      meaning:
        'Relative standard uncertainty of the scale of the scans and the reflectance; the sum may exceed 1 by 2u',
    },
  },
  advice:
    'Look for a scale error (area, reference detector, amplifier range), a response counted twice by leakage, or a ' +
    'reflectance taken elsewhere on the sample; repeat the scan that stands out against its neighbours.',
  run(context, thresholds) {
    const others = otherJunctions(context)
    if (isMissing(others)) return notChecked(others.missing)
    const scans = allScans(context, others)
    const { reflectance } = context
    const noise = Math.hypot(...scans.map(pointNoise))
    const excess = Array.from(context.scan.wavelengthNm, (nm, i) => {
      const own = context.scan.values[i]!
      const sum = scans.reduce((total, scan) => total + (scan === context.scan ? own : valueAt(scan, nm)), 0)
      const reflected = reflectance ? valueAt(reflectance, nm) : 0
      const u = Math.hypot(thresholds.scaleUncertainty! * (sum + reflected), context.noise?.[i] ?? noise)
      return { sum: sum + reflected, over: sum + reflected - 1 - 2 * u }
    })
    const isOver = excess.map((e) => e.over > 0)
    if (!isOver.includes(true)) return reflectance ? PASSED : notChecked('no reflectance')
    const worst = excess.reduce((a, b) => (b.over > a.over ? b : a))
    const bands = bandsOf(context.scan.wavelengthNm, isOver)
    return fired(this, {
      severity: 'caution',
      message:
        `Σ EQE${reflectance ? ' + R' : ' (without reflectance)'} reaches ${worst.sum.toFixed(3)} at ` +
        `${bands.map(band).join(', ')}: more than 1 by over twice the uncertainty.`,
      numbers: {
        largestSum: { value: worst.sum, unit: '' },
        excessOverAllowed: { value: worst.over, unit: '' },
      },
      bandsNm: bands,
    })
  },
}
