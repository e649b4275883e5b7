import { assertFinite, DomainError } from '../errors.js'
import { minimiseInBounds } from '../numerics/boundedSearch.js'
import type { CompiledDevice } from './compiledDevice.js'
import type { Change } from './device.js'
import { evaluate, type WhatIfResult } from './evaluate.js'
import { parseParameter, setIn, valueIn } from './parameters.js'
import { quantityOf, type Quantity } from './quantities.js'

/** A parameter that may move, and how far. */
export interface FreeParameter {
  readonly parameter: string
  readonly low: number
  readonly high: number
}

/** A quantity that must keep to a bound: mA cm⁻² for currents, a fraction otherwise. */
export interface Constraint {
  readonly quantity: Quantity
  readonly atLeast?: number
  readonly atMost?: number
}

export interface OptimiseRequest {
  readonly parameters: readonly FreeParameter[]
  /** Largest limiting current or efficiency, or smallest mismatch. */
  readonly objective: 'limitingCurrent' | 'efficiency' | 'mismatch'
  readonly constraints?: readonly Constraint[]
  /** What else is changed. */
  readonly change?: Change
}

export interface OptimumStep {
  readonly values: readonly number[]
  readonly objective: number
}

export interface Optimum {
  /** The whole change, ready for a scenario. */
  readonly change: Change
  readonly objective: number
  /** Every improvement in the order found; values in the order of the parameters. */
  readonly path: readonly OptimumStep[]
  readonly evaluations: number
  readonly result: WhatIfResult
}

/**
 * The best values of chosen parameters within their bounds, under constraints. The search begins at the present value of
 * each parameter where that lies within its bounds, and is deterministic.
 * @throws DomainError naming a parameter, or saying that no point meets the constraints.
 * Cost: some hundred evaluations a parameter.
 */
export function optimise(compiled: CompiledDevice, request: OptimiseRequest): Optimum {
  const base = request.change ?? {}
  if (request.parameters.length === 0)
    throw new DomainError('parameters', 'parameters is empty; name at least one that may move.')
  const state = compiled.state(base)
  const free = request.parameters.map(({ parameter: key, low, high }) => {
    assertFinite(low, `${key}.low`)
    assertFinite(high, `${key}.high`)
    const parameter = parseParameter(compiled.device, key)
    const present = valueIn(compiled.device, state, parameter)
    return { key, parameter, low, high, start: Math.min(high, Math.max(low, present)) }
  })
  for (const constraint of request.constraints ?? []) assertConstraint(compiled, constraint)
  const currents = new Float64Array(compiled.device.junctions.length)
  const sign = request.objective === 'mismatch' ? 1 : -1
  const found = minimiseInBounds(
    (point) => {
      free.forEach(({ key, parameter }, i) => setIn(compiled.device, state, parameter, point[i]!, key))
      compiled.currents(state, currents)
      for (const { quantity, atLeast, atMost } of request.constraints ?? []) {
        const value = quantityOf(compiled, quantity, currents, state)
        if (value < (atLeast ?? -Infinity) || value > (atMost ?? Infinity)) return Infinity
      }
      return sign * quantityOf(compiled, request.objective, currents, state)
    },
    free.map(({ low, high }) => ({ low, high })),
    { start: free.map(({ start }) => start) },
  )
  const change = { ...base, ...Object.fromEntries(free.map(({ key }, i) => [key, found.point[i]!])) }
  return {
    change,
    objective: sign * found.value,
    path: found.path.map(({ point, value }) => ({ values: point, objective: sign * value })),
    evaluations: found.evaluations,
    result: evaluate(compiled, change),
  }
}

function assertConstraint(compiled: CompiledDevice, { quantity, atLeast, atMost }: Constraint): void {
  if (atLeast === undefined && atMost === undefined)
    throw new DomainError('constraints', 'A constraint has neither atLeast nor atMost; it needs one of them.')
  if (atLeast !== undefined) assertFinite(atLeast, 'constraints.atLeast')
  if (atMost !== undefined) assertFinite(atMost, 'constraints.atMost')
  const count = compiled.device.junctions.length
  if (typeof quantity === 'object' && !(quantity.current >= 1 && quantity.current <= count))
    throw new DomainError(
      'constraints',
      `A constraint speaks of junction ${quantity.current}; the device has 1 to ${count}.`,
    )
}
