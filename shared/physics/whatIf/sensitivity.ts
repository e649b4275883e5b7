import type { CompiledDevice } from './compiledDevice.js'
import type { Change } from './device.js'
import { parameterKeys, valueIn } from './parameters.js'
import { currentsAlong } from './sweep.js'

/** ∂J/∂p of every junction for one parameter. */
export interface Sensitivity {
  readonly parameter: string
  readonly value: number
  /** mA cm⁻² per unit of the parameter (nm, eV, or 1), one a junction. */
  readonly currentPerUnit: readonly number[]
}

/**
 * Sensitivities of all currents at the measured device (or at `change`), by central differences: the step is 1e-4 of a
 * thickness or path factor and 1 meV of a gap, so that rounding stays below 1e-8 and curvature below 1e-6 of the result.
 * A gap near the end of its material's table is differenced to the side that the table reaches.
 * @param keys default: every parameter of the device. @throws DomainError naming a key. Cost: two evaluations a parameter.
 */
export function sensitivities(
  compiled: CompiledDevice,
  keys: readonly string[] = parameterKeys(compiled.device),
  change: Change = {},
): Sensitivity[] {
  return keys.map((key) => {
    const { at, state, parameter } = currentsAlong(compiled, key, change)
    const value = valueIn(compiled.device, state, parameter)
    const isGap = parameter.kind === 'gap' || parameter.kind === 'gapShift'
    const step = isGap ? 1e-3 : 1e-4 * (value || 1)
    const limits = compiled.parameters().find((p) => p.key === key)
    const low = isGap && limits && value - step < limits.low ? value : Math.max(value - step, isGap ? -Infinity : 0)
    const high = isGap && limits && value + step > limits.high ? value : value + step
    if (high === low) return { parameter: key, value, currentPerUnit: compiled.device.junctions.map(() => 0) }
    const below = at(low).slice()
    const above = at(high)
    return { parameter: key, value, currentPerUnit: Array.from(above, (j, p) => (j - below[p]!) / (high - low)) }
  })
}
