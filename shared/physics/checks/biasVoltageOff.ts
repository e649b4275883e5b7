import { STANDARD_TEMPERATURE_K, ZERO_CELSIUS_K } from '../constants.js'
import type { Curve } from '../curve.js'
import { junctionOpenCircuitVoltage, type JunctionDiode } from '../diode/junction.js'
import { radiativeSaturationCurrent } from '../diode/reciprocity.js'
import { biasPhotocurrents } from '../measurement/biasLight.js'
import { fired, notChecked, PASSED, type Check } from './check.js'
import { allScans, isMissing, otherJunctions } from './otherJunctions.js'

/** EQE below this share is taken for noise when a saturation current is estimated from a scan. */
const NOISE_FLOOR = 0.01

/** The bias voltage should carry what the other junctions give at open circuit under the bias light. */
export const biasVoltageOff: Check = {
  name: 'bias-voltage-off',
  title: 'Bias voltage off',
  inputs: ['bias light', 'bias voltage', 'scans of the other junctions', 'diode parameters (else by reciprocity)'],
  defaultThresholds: {
    largestDifferenceV: {
      value: 0.2,
      unit: 'V',
      meaning: 'Distance of the bias voltage from the sum of the other junctions’ open-circuit voltages',
    },
    externalRadiativeEfficiency: {
      value: 0.01,
      unit: '',
      meaning: 'Assumed for a junction without diode parameters; the finding is then no more than a note',
    },
  },
  advice:
    'Set the bias voltage to the sum of the other junctions’ open-circuit voltages under the bias light, so that the ' +
    'junction under test stands near short circuit; keep within its reverse-bias limit. Then repeat the scan.',
  run(context, thresholds) {
    if (context.connection === 'independent') return notChecked('the junctions do not share a current')
    if (context.junctions.length < 2) return notChecked('the device has one junction')
    const { biasLight, biasVoltageV, temperatureC } = context.conditions
    if (!biasLight) return notChecked('no bias light recorded')
    if (biasVoltageV === null || biasVoltageV === undefined) return notChecked('no bias voltage recorded')
    const others = otherJunctions(context)
    if (isMissing(others)) return notChecked(others.missing)
    const temperatureK =
      temperatureC === null || temperatureC === undefined ? STANDARD_TEMPERATURE_K : temperatureC + ZERO_CELSIUS_K
    const currents = biasPhotocurrents(allScans(context, others), biasLight)
    let isEstimated = false
    let wanted = 0
    for (const { index, scan } of others) {
      const known = context.junctions[index]!.diode
      const diode = known ?? estimatedDiode(scan, temperatureK, thresholds.externalRadiativeEfficiency!)
      if (!diode) return notChecked('no diode parameters, and a scan without response to estimate them from')
      if (!known) isEstimated = true
      wanted += junctionOpenCircuitVoltage(diode, currents[index]!, temperatureK)
    }
    const difference = biasVoltageV - wanted
    if (Math.abs(difference) <= thresholds.largestDifferenceV!) return PASSED
    return fired(this, {
      severity: isEstimated ? 'note' : 'caution',
      message:
        `The bias voltage is ${biasVoltageV.toFixed(2)} V; the other junctions give ${wanted.toFixed(2)} V at open ` +
        `circuit under the bias light${isEstimated ? ' (estimated from their scans by reciprocity)' : ''}: ` +
        `${Math.abs(difference).toFixed(2)} V too ${difference > 0 ? 'high' : 'low'}.`,
      numbers: {
        biasVoltage: { value: biasVoltageV, unit: 'V' },
        wantedVoltage: { value: wanted, unit: 'V' },
        difference: { value: difference, unit: 'V' },
      },
    })
  },
}

function estimatedDiode(scan: Curve, temperatureK: number, efficiency: number): JunctionDiode | null {
  const radiative = radiativeSaturationCurrent(scan, temperatureK, { noiseFloor: NOISE_FLOOR })
  return radiative > 0 ? { saturationCurrentMaCm2: radiative / efficiency } : null
}
