import { shortCircuitCurrentDensity } from '../currents.js'
import { fired, notChecked, PASSED, type Check } from './check.js'
import { percent } from './wording.js'

/** Within a bias series the current of a well selected junction no longer moves from step to step. */
export const notOnPlateau: Check = {
  name: 'not-on-plateau',
  title: 'Not on the plateau',
  inputs: ['bias series of at least two scans', 'spectrum'],
  defaultThresholds: {
    largestChange: { value: 0.005, unit: '', meaning: 'Relative change of Jsc from this scan to the nearest step' },
  },
  advice:
    'Go on in steps of bias intensity, then of bias voltage, until Jsc no longer moves; use a scan from that plateau.',
  run(context, thresholds) {
    const { biasSeries, spectrum } = context
    if (!biasSeries || biasSeries.members.length < 2) return notChecked('no bias series')
    if (!spectrum) return notChecked('no spectrum')
    const own = biasSeries.members[biasSeries.ownIndex]
    if (!own) return notChecked('the scan is not part of its bias series')
    const current = shortCircuitCurrentDensity(own.scan, spectrum)
    if (!(current > 0)) return notChecked('the scan has no response to count a current from')
    const steps = [
      neighbours(
        biasSeries.members,
        own,
        (m) => m.irradianceWM2,
        (m) => m.biasVoltageV,
      ),
      neighbours(
        biasSeries.members,
        own,
        (m) => m.biasVoltageV,
        (m) => m.irradianceWM2,
      ),
    ]
    const changes = steps
      .filter((members) => members.length > 0)
      .map((members) =>
        members
          .map((m) => shortCircuitCurrentDensity(m.scan, spectrum) / current - 1)
          .reduce((a, b) => (Math.abs(b) < Math.abs(a) ? b : a)),
      )
    if (changes.length === 0) return notChecked('the bias series has no neighbouring intensity or voltage')
    const change = changes.reduce((a, b) => (Math.abs(b) > Math.abs(a) ? b : a))
    if (Math.abs(change) <= thresholds.largestChange!) return PASSED
    return fired(this, {
      severity: 'caution',
      message:
        `From this scan to the nearest step of its bias series Jsc still moves by ${percent(change, 2)} ` +
        `(${current.toFixed(3)} mA/cm² here); ${percent(thresholds.largestChange!, 2)} would be a plateau.`,
      numbers: {
        change: { value: change, unit: '' },
        current: { value: current, unit: 'mA/cm²' },
      },
    })
  },
}

/** The members one step below and one above in `along`, at the same `fixed`. */
function neighbours<T>(
  members: readonly T[],
  own: T,
  along: (member: T) => number | null,
  fixed: (member: T) => number | null,
): T[] {
  const at = along(own)
  if (at === null) return []
  const rest = members.filter((m) => m !== own && along(m) !== null && along(m) !== at && fixed(m) === fixed(own))
  const below = rest.filter((m) => along(m)! < at).sort((a, b) => along(b)! - along(a)!)[0]
  const above = rest.filter((m) => along(m)! > at).sort((a, b) => along(a)! - along(b)!)[0]
  return [below, above].filter((m) => m !== undefined)
}
