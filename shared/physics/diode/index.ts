export {
  currentVoltageCurve,
  currentVoltageFigures,
  STANDARD_IRRADIANCE_W_M2,
  type CurrentVoltageCurve,
  type CurrentVoltageFigures,
} from './currentVoltage.js'
export {
  darkConductance,
  darkCurrent,
  emissionCurrent,
  junctionCurrent,
  junctionOpenCircuitVoltage,
  junctionVoltage,
  voltageAtDarkCurrent,
  type JunctionDiode,
  type ReverseBreakdown,
} from './junction.js'
export { radiativeSaturationCurrent, saturationCurrentFromRadiative, type ReciprocityOptions } from './reciprocity.js'
export {
  differentialResistances,
  solveStack,
  stackCurrent,
  stackVoltage,
  type SeriesStack,
  type StackJunction,
  type StackState,
} from './stack.js'
