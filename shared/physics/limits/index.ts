export {
  deviceLimit,
  idealJunctions,
  shareOfLimit,
  ultimateEfficiency,
  type Connection,
  type DeviceLimit,
  type LimitConditions,
  type ShareOfLimit,
} from './detailedBalance.js'
export { bestGaps, limitMap, type LimitMap } from './limitMap.js'
export { photonCurrent, stepCurrentMaCm2, type PhotonCurrent } from './photonCurrent.js'
export { darkCurrentMaCm2, logDarkCurrentMaCm2, type Emission } from './radiativeCurrent.js'
export { seriesPower, type IdealJunction, type SeriesPower } from './seriesPower.js'
