import type { Parameter } from './parameters.js'

/** One axis of a map: the key, what it means, and its values. */
export interface ResolvedAxis {
  readonly key: string
  readonly parameter: Parameter
  readonly values: Float64Array
}
