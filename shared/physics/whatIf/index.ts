export { CompiledDevice, compileDevice, type ParameterInfo } from './compiledDevice.js'
export {
  LIBRARY_GAPS_EV,
  statedGapEv,
  type AbsorberModel,
  type Change,
  type ContinuationLimits,
  type DeviceModel,
  type DiodeModel,
  type JunctionModel,
  type LayerModel,
  type OpticalModelName,
  type WhatIfInput,
} from './device.js'
export { evaluate, type ChangedJunction, type WhatIfResult } from './evaluate.js'
export {
  computeMap,
  mapProgress,
  matchedLine,
  type MapAxis,
  type MapAxisRequest,
  type MapOptimum,
  type MapProgress,
  type MapRequest,
  type WhatIfMap,
} from './map.js'
export {
  optimise,
  type Constraint,
  type FreeParameter,
  type OptimiseRequest,
  type Optimum,
  type OptimumStep,
} from './optimise.js'
export { parameterKeys } from './parameters.js'
export { type PowerEstimate } from './powerEstimate.js'
export { type Quantity } from './quantities.js'
export { sensitivities, type Sensitivity } from './sensitivity.js'
export { seriesFigures, type SeriesFigures } from './seriesFigures.js'
export { sweep, type MatchingPoint, type ProcessWindow, type Sweep, type SweepRequest } from './sweep.js'
