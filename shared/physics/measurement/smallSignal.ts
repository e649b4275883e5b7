import { makeCurve, valueAt, type Curve } from '../curve.js'
import { DomainError } from '../errors.js'
import { darkConductance, emissionCurrent } from '../diode/junction.js'
import { solveStack, type SeriesStack, type StackState } from '../diode/stack.js'

/** What the chopped probe sees at one operating point. */
export interface SmallSignal {
  readonly operatingPoint: StackState
  /** r_i = dV_i/dJ_d,i, kΩ cm². */
  readonly differentialResistancesKohmCm2: number[]
  /** w_i = dJ/dJ_ph,i at constant terminal voltage: the share of junction i's own response in the signal. */
  readonly selectivities: number[]
}

/**
 * Small-signal response of a series stack to a weak chopped probe, at the operating point of the full non-linear
 * circuit under bias light and bias voltage.
 *
 * The linear system is `δJ = δJ_i + c_{i−1} δV_{i−1} − g_i δV_i` with `c_i = η_i g_rad,i`, and `Σ δV_i = R_s δJ`.
 * Eliminating the voltages from the bottom gives the weights `S_n = r_n`, `S_i = r_i (1 + c_i S_{i+1})` and
 * `w_i = S_i/(Σ S + R_s)`; without coupling S_i = r_i.
 * Sources: Meusel et al., Prog. Photovolt. 11 (2003) 499; Burdick & Glatfelter, Solar Cells 18 (1986) 301; Steiner &
 * Geisz, Appl. Phys. Lett. 100 (2012) 251106; Siefer et al., IEEE J. Photovolt. 4 (2014) 1264.
 * @throws DomainError as `solveStack`. Cost: one solution of the circuit.
 */
export function smallSignal(stack: SeriesStack, terminalVoltageV: number): SmallSignal {
  const operatingPoint = solveStack(stack, terminalVoltageV)
  const { junctions, temperatureK } = stack
  const resistances = junctions.map(
    ({ diode }, i) => 1 / darkConductance(diode, operatingPoint.junctionVoltagesV[i]!, temperatureK),
  )
  const effective = [...resistances]
  for (let i = junctions.length - 2; i >= 0; i--) {
    const eta = stack.couplingToNext?.[i] ?? 0
    if (eta === 0) continue
    const { slopeMaCm2V } = emissionCurrent(junctions[i]!.diode, operatingPoint.junctionVoltagesV[i]!, temperatureK)
    effective[i] = resistances[i]! * (1 + eta * slopeMaCm2V * effective[i + 1]!)
  }
  const total = effective.reduce((sum, s) => sum + s, stack.seriesResistanceKohmCm2 ?? 0)
  return {
    operatingPoint,
    differentialResistancesKohmCm2: resistances,
    selectivities: effective.map((s) => s / total),
  }
}

/**
 * The EQE that the measurement shows, `EQE_app(λ) = Σ w_i EQE_i(λ)`, at the wavelengths of the scan.
 * @param eqes true EQE of each junction, zero outside its range. @param selectivities one w a junction.
 * @throws DomainError when the numbers of junctions differ.
 */
export function apparentEqe(
  eqes: readonly Curve[],
  selectivities: readonly number[],
  wavelengthNm: ArrayLike<number>,
): Curve {
  if (eqes.length !== selectivities.length)
    throw new DomainError(
      'selectivities',
      `There are ${selectivities.length} selectivities for ${eqes.length} junctions; each junction needs one.`,
    )
  const grid = Float64Array.from(wavelengthNm)
  return makeCurve(
    grid,
    grid.map((nm) => eqes.reduce((sum, eqe, i) => sum + selectivities[i]! * valueAt(eqe, nm), 0)),
  )
}
