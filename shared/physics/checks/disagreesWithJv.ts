import { shortCircuitCurrentDensity } from '../currents.js'
import { fired, notChecked, PASSED, type Check } from './check.js'
import { allScans, isMissing, otherJunctions } from './otherJunctions.js'
import { junctionName, percent } from './wording.js'

/** The smallest integrated current of a series device should be its J_sc; reported on the scan that gives it. */
export const disagreesWithJv: Check = {
  name: 'disagrees-with-jv',
  title: 'Disagrees with J–V',
  inputs: ['Jsc of the illuminated J–V', 'scans of the other junctions', 'spectrum'],
  defaultThresholds: {
    largestDifference: {
      value: 0.03,
      unit: '',
      meaning: 'Relative difference of the smallest current from the J–V’s Jsc',
    },
  },
  advice:
    'Compare areas (aperture or device), the simulator’s spectrum for each junction, and the dates of the two ' +
    'measurements; a leaky limiting junction gives a higher Jsc than its EQE. A difference of some per cent is common.',
  run(context, thresholds) {
    if (context.connection === 'independent') return notChecked('the junctions do not share a current')
    const jsc = context.shortCircuitCurrentMaCm2
    if (jsc === null || jsc === undefined) return notChecked('no Jsc of an illuminated J–V')
    if (!(jsc > 0)) return notChecked('the Jsc of the illuminated J–V is not above zero')
    if (!context.spectrum) return notChecked('no spectrum')
    const others = otherJunctions(context)
    if (isMissing(others)) return notChecked(others.missing)
    const spectrum = context.spectrum
    const currents = allScans(context, others).map((scan) => shortCircuitCurrentDensity(scan, spectrum))
    const least = Math.min(...currents)
    const own = currents[context.junctionIndex]!
    const difference = least / jsc - 1
    if (own > least || Math.abs(difference) <= thresholds.largestDifference!) return PASSED
    return fired(this, {
      severity: 'caution',
      message:
        `${junctionName(context.junctionIndex).replace('j', 'J')} gives the smallest current, ${least.toFixed(2)} mA/cm², ` +
        `${percent(Math.abs(difference))} ${difference < 0 ? 'below' : 'above'} the ${jsc.toFixed(2)} mA/cm² of the J–V.`,
      numbers: {
        smallestCurrent: { value: least, unit: 'mA/cm²' },
        jvCurrent: { value: jsc, unit: 'mA/cm²' },
        difference: { value: difference, unit: '' },
      },
    })
  },
}
