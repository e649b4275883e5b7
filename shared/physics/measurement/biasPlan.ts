import { solve } from 'yalps'
import type { Curve } from '../curve.js'
import { junctionOpenCircuitVoltage, type JunctionDiode } from '../diode/junction.js'
import type { SeriesStack } from '../diode/stack.js'
import { assertNotNegative, assertPositive, DomainError } from '../errors.js'
import { biasPhotocurrents, totalIrradiance, type BiasSource } from './biasLight.js'
import { smallSignal } from './smallSignal.js'

/** The device that a plan is for: measured curves, or curves estimated from gaps. */
export interface BiasPlanDevice {
  readonly eqes: readonly Curve[]
  readonly diodes: readonly JunctionDiode[]
  readonly seriesResistanceKohmCm2?: number
  readonly couplingToNext?: readonly number[]
  readonly temperatureK: number
}

export interface BiasPlanLimits {
  /** Highest total irradiance at the sample plane, W m⁻². Default: only the sources' own limits. */
  readonly largestTotalWM2?: number
}

/** What a set of intensities and a bias voltage does to a device. */
export interface BiasEvaluation {
  readonly irradiancesWM2: number[]
  readonly totalIrradianceWM2: number
  readonly biasVoltageV: number
  readonly photocurrentsMaCm2: number[]
  /** min_{j≠k} J_j − J_k: above zero the junction under test limits, mA cm⁻². */
  readonly marginMaCm2: number
  /** The same over J_k; null when the bias light drives no current in the junction under test. */
  readonly relativeMargin: number | null
  /** w_i of each junction at this operating point, without luminescent coupling and with it. */
  readonly selectivities: number[]
  readonly selectivitiesWithCoupling: number[]
  readonly operatingVoltagesV: number[]
}

export interface BiasPlan extends BiasEvaluation {
  /** Whether the sources make the junction under test limit at all. */
  readonly isPossible: boolean
}

/** Below this the photocurrent of a junction counts as none in a relative margin, mA cm⁻². */
const NO_CURRENT_MA_CM2 = 1e-9

/**
 * The intensities that make a junction limit by the widest margin, `max t` subject to
 * `Σ_s p_s (J_js − J_ks) ≥ t` for every other junction j, `0 ≤ p_s ≤ 1`, `Σ_s p_s I_s ≤ total` (a linear programme; J_js is
 * the photocurrent of junction j under source s at its highest level I_s), and of all such plans the one with the
 * least light. The bias voltage is `Σ_{j≠k} V_oc,j` at those photocurrents.
 * @param sources each with its highest irradiance at the sample plane. @param junctionIndex junction under test, 0 =
 * sunward.
 * @throws DomainError for no source, a device of fewer than two junctions, or an index or limit outside its domain.
 * Cost: one integral per junction and source, a small simplex.
 */
export function planBias(
  device: BiasPlanDevice,
  sources: readonly BiasSource[],
  junctionIndex: number,
  limits: BiasPlanLimits = {},
): BiasPlan {
  assertDevice(device, junctionIndex)
  if (sources.length === 0)
    throw new DomainError('sources', 'There is no light source to plan with; add at least one to the library.')
  const largestTotal = limits.largestTotalWM2 ?? Infinity
  if (!(largestTotal > 0))
    throw new DomainError('largestTotalWM2', `largestTotalWM2 is ${largestTotal}; it must be above zero.`)
  const highest = sources.map((source) => totalIrradiance([source]))
  const currents = sources.map((source) => biasPhotocurrents(device.eqes, [source]))
  const widest = programme(currents, highest, junctionIndex, largestTotal, null)
  // Of all intensities with that margin, the least light: heat and coupling grow with it.
  const shares = programme(currents, highest, junctionIndex, largestTotal, widest.margin).shares
  const evaluation = evaluateBias(
    device,
    sources.map((source, s) => ({ ...source, irradianceWM2: shares[s]! * highest[s]! })),
    junctionIndex,
  )
  return { ...evaluation, isPossible: evaluation.marginMaCm2 > NO_CURRENT_MA_CM2 }
}

/**
 * What a bias light does, be it planned or used in the lab: photocurrents, margin, operating point and selectivities.
 * @param sources with the irradiances used. @param biasVoltageV as used; `Σ_{j≠k} V_oc,j` when left out.
 * @throws DomainError as `planBias`. Cost: two solutions of the circuit.
 */
export function evaluateBias(
  device: BiasPlanDevice,
  sources: readonly BiasSource[],
  junctionIndex: number,
  biasVoltageV?: number,
): BiasEvaluation {
  assertDevice(device, junctionIndex)
  const photocurrentsMaCm2 = biasPhotocurrents(device.eqes, sources)
  const voltage = biasVoltageV ?? bestBiasVoltage(device, photocurrentsMaCm2, junctionIndex)
  const stack: SeriesStack = {
    junctions: device.diodes.map((diode, i) => ({ diode, photocurrentMaCm2: photocurrentsMaCm2[i]! })),
    seriesResistanceKohmCm2: device.seriesResistanceKohmCm2 ?? 0,
    temperatureK: device.temperatureK,
  }
  const plain = smallSignal(stack, voltage)
  const coupled = device.couplingToNext
    ? smallSignal({ ...stack, couplingToNext: device.couplingToNext }, voltage)
    : plain
  const own = photocurrentsMaCm2[junctionIndex]!
  const marginMaCm2 = Math.min(...photocurrentsMaCm2.filter((_, i) => i !== junctionIndex)) - own
  return {
    irradiancesWM2: sources.map((source) => totalIrradianceOf(source)),
    totalIrradianceWM2: sources.reduce((sum, source) => sum + totalIrradianceOf(source), 0),
    biasVoltageV: voltage,
    photocurrentsMaCm2,
    marginMaCm2,
    relativeMargin: own > NO_CURRENT_MA_CM2 ? marginMaCm2 / own : null,
    selectivities: plain.selectivities,
    selectivitiesWithCoupling: coupled.selectivities,
    operatingVoltagesV: coupled.operatingPoint.junctionVoltagesV,
  }
}

/** `V_b = Σ_{j≠k} V_oc,j` at given photocurrents, V. */
export function bestBiasVoltage(
  device: Pick<BiasPlanDevice, 'diodes' | 'temperatureK'>,
  photocurrentsMaCm2: readonly number[],
  junctionIndex: number,
): number {
  return device.diodes.reduce(
    (sum, diode, j) =>
      j === junctionIndex ? sum : sum + junctionOpenCircuitVoltage(diode, photocurrentsMaCm2[j]!, device.temperatureK),
    0,
  )
}

/** The widest margin, or with `margin` given the least total light that still keeps it. Shares of the highest levels. */
function programme(
  currents: readonly (readonly number[])[],
  highest: readonly number[],
  k: number,
  largestTotal: number,
  margin: number | null,
): { shares: number[]; margin: number } {
  const others = currents[0]!.flatMap((_, j) => (j === k ? [] : [j]))
  const scale = Math.max(...currents.flat(), 1e-12)
  const isFinding = margin === null
  const kept = isFinding ? 0 : (margin / scale) * (1 - 1e-9) - 1e-12
  const constraints = new Map<string, { min?: number; max?: number }>()
  for (const j of others) constraints.set(`junction${j}`, { min: kept })
  const totalHighest = highest.reduce((sum, w) => sum + w, 0) || 1
  if (largestTotal < totalHighest) constraints.set('total', { max: largestTotal / totalHighest })
  const variables = new Map<string, Map<string, number>>()
  currents.forEach((row, s) => {
    const column = new Map<string, number>([
      [`highest${s}`, 1],
      ['total', highest[s]! / totalHighest],
      ['light', highest[s]! / totalHighest],
    ])
    for (const j of others) column.set(`junction${j}`, (row[j]! - row[k]!) / scale)
    constraints.set(`highest${s}`, { max: 1 })
    variables.set(`source${s}`, column)
  })
  // The margin may be negative when no plan makes the junction limit: the dark, with a margin of zero, is then best.
  if (isFinding)
    variables.set('margin', new Map([['margin', 1], ...others.map((j): [string, number] => [`junction${j}`, -1])]))
  const found = solve(
    {
      direction: isFinding ? 'maximize' : 'minimize',
      objective: isFinding ? 'margin' : 'light',
      constraints,
      variables,
    },
    { precision: 1e-12 },
  )
  const values = new Map(found.variables)
  return {
    shares: currents.map((_, s) => Math.min(1, Math.max(0, values.get(`source${s}`) ?? 0))),
    margin: (values.get('margin') ?? 0) * scale,
  }
}

function totalIrradianceOf(source: BiasSource): number {
  return source.irradianceWM2 === 0 ? 0 : totalIrradiance([source])
}

function assertDevice(device: BiasPlanDevice, junctionIndex: number): void {
  const count = device.eqes.length
  if (count < 2)
    throw new DomainError('device.eqes', `The device has ${count} junctions; bias light is planned for two or more.`)
  if (device.diodes.length !== count)
    throw new DomainError(
      'device.diodes',
      `There are ${device.diodes.length} diodes for ${count} junctions; each junction needs one.`,
    )
  if (!Number.isInteger(junctionIndex) || junctionIndex < 0 || junctionIndex >= count)
    throw new DomainError(
      'junctionIndex',
      `junctionIndex is ${junctionIndex}; it must be a whole number from 0 to ${count - 1}.`,
    )
  assertPositive(device.temperatureK, 'device.temperatureK')
  assertNotNegative(device.seriesResistanceKohmCm2 ?? 0, 'device.seriesResistanceKohmCm2')
}
