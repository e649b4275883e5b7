export {
  biasPhotocurrents,
  sourceSpectrum,
  totalIrradiance,
  type BandSource,
  type BiasSource,
  type SpectrumSource,
} from './biasLight.js'
export {
  bestBiasVoltage,
  evaluateBias,
  planBias,
  type BiasEvaluation,
  type BiasPlan,
  type BiasPlanDevice,
  type BiasPlanLimits,
} from './biasPlan.js'
export { analyseBiasSeries, type BiasSeries, type BiasSeriesScan, type BiasSeriesStep } from './biasSeries.js'
export { foreignShare, longWaveEdgeNm, type ForeignShare } from './exclusiveBand.js'
export { pointNoise } from './pointNoise.js'
export {
  internalQuantumEfficiency,
  peakToPeakCurrentA,
  reduceRawSignals,
  SQUARE_WAVE_RMS_FRACTION,
  squareWaveFundamental,
  type CurrentToVoltage,
  type LockInReading,
  type OverfilledAreas,
  type RawMeasurement,
  type RawPass,
  type ReducedFactors,
  type ReducedScan,
  type ReferenceCalibration,
} from './rawSignals.js'
export {
  simulateScan,
  stackUnderBias,
  type KnownStack,
  type SimulatedConditions,
  type SimulatedScan,
} from './simulateScan.js'
export { apparentEqe, smallSignal, type SmallSignal } from './smallSignal.js'
export { unmixScans, unmixWith, type MixingWeight, type Unmixed, type UnmixingOptions } from './unmixing.js'
