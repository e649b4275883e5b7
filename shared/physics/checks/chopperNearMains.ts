import { fired, notChecked, PASSED, type Check } from './check.js'

const MAINS_HZ = [50, 60]

/** Mains and its harmonics leak into every lock-in; the chopper keeps away from them (common practice). */
export const chopperNearMains: Check = {
  name: 'chopper-near-mains',
  title: 'Chopper near a mains harmonic',
  inputs: ['chopper frequency'],
  defaultThresholds: {
    smallestDistanceHz: { value: 1, unit: 'Hz', meaning: 'Distance from the nearest multiple of 50 or 60 Hz' },
  },
  advice: 'Chop between the harmonics of 50 and 60 Hz, for example at 37, 83, 133, 217 or 277 Hz, and repeat the scan.',
  run(context, thresholds) {
    const { chopperHz } = context.conditions
    if (chopperHz === null || chopperHz === undefined) return notChecked('no chopper frequency recorded')
    if (chopperHz === 0) return notChecked('the light was not chopped')
    const [mains, harmonic] = MAINS_HZ.map((hz) => [hz, hz * Math.max(1, Math.round(chopperHz / hz))] as const).reduce(
      (a, b) => (Math.abs(b[1] - chopperHz) < Math.abs(a[1] - chopperHz) ? b : a),
    )
    const distance = Math.abs(harmonic - chopperHz)
    if (distance > thresholds.smallestDistanceHz!) return PASSED
    return fired(this, {
      severity: 'caution',
      message: `The chopper ran at ${chopperHz} Hz, ${distance.toFixed(2)} Hz from ${harmonic} Hz (${harmonic / mains} × ${mains} Hz mains).`,
      numbers: {
        chopper: { value: chopperHz, unit: 'Hz' },
        harmonic: { value: harmonic, unit: 'Hz' },
        distance: { value: distance, unit: 'Hz' },
      },
    })
  },
}
