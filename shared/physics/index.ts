/**
 * The public surface of the engine: the core by name, each subject as a namespace. The tables of `shared/data` are
 * imported by themselves, so that a page loads only what it shows.
 */
export { gapWavelengthNm, photovoltaicGap, type GapResult, type PhotovoltaicGap } from './bandGap.js'
export * from './constants.js'
export {
  COVERAGE_FROM_NM,
  coverage,
  cumulativeCurrentDensity,
  edgeResponse,
  shortCircuitCurrentDensity,
  type EdgeResponse,
} from './currents.js'
export { makeCurve, rangeNm, valueAt, type Curve } from './curve.js'
export { DomainError } from './errors.js'
export { cumulativeProduct, integrateProduct } from './integration.js'
export {
  defaultLossBands,
  lastEdgeNm,
  LOSS_BUDGET_FROM_NM,
  lossBudget,
  type LossAccount,
  type LossBand,
  type LossBudget,
  type LossBudgetInput,
  type LossCurves,
} from './lossBudget.js'
export {
  matching,
  type IndependentCurrents,
  type JunctionExcess,
  type PairMismatch,
  type SeriesMatching,
  type Wiring,
} from './matching.js'
export { seededRandom, type RandomSource } from './numerics/random.js'
export {
  makeSpectrum,
  photonFluxM2S,
  referenceSpectrum,
  scaleSpectrum,
  totalIrradianceWM2,
  type Spectrum,
} from './spectrum.js'
export {
  fromFraction,
  fromNanometres,
  toFraction,
  toNanometres,
  type EfficiencyUnit,
  type WavelengthUnit,
} from './units.js'
export { ENGINE_VERSION } from './version.js'
export * as absorption from './absorption/index.js'
export * as checks from './checks/index.js'
export * as diode from './diode/index.js'
export * as limits from './limits/index.js'
export * as measurement from './measurement/index.js'
export * as optics from './optics/index.js'
export * as uncertainty from './uncertainty/index.js'
export * as whatIf from './whatIf/index.js'
