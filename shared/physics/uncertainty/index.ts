export * from './budget.js'
export * from './budgetProblems.js'
export { currentWeights, weightedSum } from './currentWeights.js'
export { deviceErrors } from './errorSources.js'
export type { DeviceErrors, ErrorEffect, ErrorSource, MeasuredJunction, OmittedComponent } from './errorSources.js'
export * from './limitingProbability.js'
export * from './linearPropagation.js'
export { coverageFactor, normalProbabilityBelow } from './normalDistribution.js'
export { EXPANSION_K, propagateDevice } from './propagation.js'
export type {
  ComponentContribution,
  CurrentUncertainty,
  DeviceUncertainty,
  MismatchUncertainty,
} from './propagation.js'
export { DEFAULT_DRAWS, runMonteCarlo, startMonteCarlo } from './monteCarlo.js'
export type { MonteCarloControl, MonteCarloOptions, MonteCarloResult, MonteCarloRun } from './monteCarlo.js'
export * from './repeatNoise.js'
export type { SampleSummary } from './sampleStatistics.js'
