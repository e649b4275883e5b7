import { biasPhotocurrents } from '../measurement/biasLight.js'
import { fired, notChecked, PASSED, type Check } from './check.js'
import { allScans, isMissing, otherJunctions } from './otherJunctions.js'
import { junctionName, percent } from './wording.js'

/** With the recorded bias light the junction under test must limit: every other photocurrent above its own by a margin. */
export const biasLightTooWeak: Check = {
  name: 'bias-light-too-weak',
  title: 'Bias light too weak',
  inputs: ['bias light', 'scans of the other junctions'],
  defaultThresholds: {
    smallestMargin: {
      value: 0.2,
      unit: '',
      meaning: 'Share by which every other junction’s bias photocurrent must exceed that of the junction under test',
    },
  },
  advice:
    'Raise the bias light that the other junctions absorb, or lower what reaches the junction under test, until it ' +
    'limits by the margin; then repeat the scan. The bias plan gives the intensities.',
  run(context, thresholds) {
    if (context.connection === 'independent') return notChecked('the junctions do not share a current')
    if (context.junctions.length < 2) return notChecked('the device has one junction')
    if (!context.conditions.biasLight) return notChecked('no bias light recorded')
    const others = otherJunctions(context)
    if (isMissing(others)) return notChecked(others.missing)
    const currents = biasPhotocurrents(allScans(context, others), context.conditions.biasLight)
    const own = currents[context.junctionIndex]!
    const weakest = others.reduce(
      (least, other) => (currents[other.index]! < currents[least]! ? other.index : least),
      others[0]!.index,
    )
    const other = currents[weakest]!
    const margin = own > 0 ? other / own - 1 : other > 0 ? Infinity : -1
    if (margin >= thresholds.smallestMargin!) return PASSED
    const doesLimit = margin > 0
    const under = junctionName(context.junctionIndex)
    const numbers = {
      ownPhotocurrent: { value: own, unit: 'mA/cm²' },
      otherPhotocurrent: { value: other, unit: 'mA/cm²' },
      otherJunction: { value: weakest + 1, unit: '' },
      margin: { value: margin, unit: '' },
    }
    const amounts = `${other.toFixed(3)} mA/cm² in ${junctionName(weakest)} and ${own.toFixed(3)} mA/cm² in ${under}`
    return fired(this, {
      severity: doesLimit ? 'caution' : 'reject',
      message: doesLimit
        ? `The bias light drives ${amounts}: ${under} limits by ${percent(margin)} only, ` +
          `${percent(thresholds.smallestMargin!, 0)} is wanted.`
        : `The bias light drives ${amounts}: ${under} does not limit, the scan shows ${junctionName(weakest)} instead.`,
      numbers,
    })
  },
}
