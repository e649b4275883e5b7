import type { CompiledDevice } from './compiledDevice.js'
import type { DeviceState } from './parameters.js'
import { leastOf, mismatchOf } from './seriesFigures.js'

/** What a sweep, map or search looks at. `current` is of one junction, counted from 1. */
export type Quantity = 'limitingCurrent' | 'mismatch' | 'efficiency' | { readonly current: number }

/** Value of a quantity from the currents: mA cm⁻², or a fraction; NaN never: where no power is known it is 0. */
export function quantityOf(
  compiled: CompiledDevice,
  quantity: Quantity,
  currents: ArrayLike<number>,
  state: DeviceState,
): number {
  if (quantity === 'limitingCurrent') return leastOf(currents)
  if (quantity === 'mismatch') return mismatchOf(currents)
  if (quantity === 'efficiency') return compiled.power.estimate(currents, state.gapShiftEv)?.efficiency ?? 0
  return currents[quantity.current - 1]!
}
