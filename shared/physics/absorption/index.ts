export {
  absorptionFromExtinctionPerCm,
  absorptionPerCm,
  assertAbsorber,
  extinctionFromAbsorption,
  gapShiftRangeEv,
  type Absorber,
} from './absorber.js'
export {
  assertDirectGapEdge,
  directGapAbsorptionPerCm,
  directGapSpectrumPerCm,
  joinEnergyEv,
  type DirectGapEdge,
} from './directGapEdge.js'
export {
  assertOpticalConstants,
  materialById,
  opticalColumnAt,
  opticalRangeNm,
  type MaterialLibrary,
  type OpticalConstants,
} from './opticalConstants.js'
