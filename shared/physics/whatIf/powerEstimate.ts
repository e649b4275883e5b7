import { thermalVoltage } from '../constants.js'
import { radiativeSaturationCurrent } from '../diode/reciprocity.js'
import { assertPositive, assertWithin } from '../errors.js'
import { logDarkCurrentMaCm2, photonCurrent, seriesPower, type IdealJunction } from '../limits/index.js'
import { statedGapEv, type WhatIfInput } from './device.js'

/** Voltage, fill factor and efficiency of a stack in series, with what was taken for granted. */
export interface PowerEstimate {
  readonly openCircuitV: number
  readonly fillFactor: number
  readonly powerMwCm2: number
  /** Fraction of the spectrum's irradiance. */
  readonly efficiency: number
}

const USUAL_RADIATIVE_EFFICIENCY = 0.001

/** Share of a scan's maximum below which it counts as noise when J_0,rad is taken from it. */
const NOISE_SHARE = 0.02

interface Diode {
  readonly logDark: number
  readonly slopeV: number
  readonly ideality: number
  readonly gapEv: number | undefined
}

/**
 * Estimates the power of a device in series from its photocurrents: one diode a junction, no shunt, the stated series
 * resistance. J_0 of the measured device is the stated one, or J_0,rad of its scan by reciprocity over the external
 * radiative efficiency; a changed gap moves ln J_0 by what detailed balance moves it by, divided by the ideality.
 */
export class PowerEstimator {
  readonly assumptions: readonly string[]
  private readonly diodes: readonly (Diode | undefined)[]
  private readonly irradianceWM2: number
  private readonly seriesResistance: number

  /** @throws DomainError naming the junction and member. */
  constructor(
    input: WhatIfInput,
    private readonly temperatureK: number,
  ) {
    this.irradianceWM2 = photonCurrent(input.spectrum).irradianceWM2
    this.seriesResistance = input.device.seriesResistanceOhmCm2 ?? 0
    const assumptions = [
      `One diode a junction at ${Number((temperatureK - 273.15).toFixed(2))} °C, no shunt, series resistance ${this.seriesResistance} Ω cm².`,
    ]
    this.diodes = input.device.junctions.map((junction, p) => {
      const { ideality = 1, darkCurrentMaCm2, externalRadiativeEfficiency } = junction.diode ?? {}
      assertPositive(ideality, `${p + 1}.diode.ideality`)
      const gapEv = statedGapEv(junction)
      const slopeV = ideality * thermalVoltage(temperatureK)
      if (darkCurrentMaCm2 !== undefined) {
        assertPositive(darkCurrentMaCm2, `${p + 1}.diode.darkCurrentMaCm2`)
        assumptions.push(`Junction ${p + 1}: J0 = ${darkCurrentMaCm2} mA cm⁻² as stated, ideality ${ideality}.`)
        return { logDark: Math.log(darkCurrentMaCm2), slopeV, ideality, gapEv }
      }
      const efficiency = externalRadiativeEfficiency ?? USUAL_RADIATIVE_EFFICIENCY
      assertPositive(efficiency, `${p + 1}.diode.externalRadiativeEfficiency`)
      assertWithin(efficiency, 0, 1, `${p + 1}.diode.externalRadiativeEfficiency`)
      const scan = input.eqe[p]!
      const noiseFloor = NOISE_SHARE * Math.max(0, ...scan.values)
      const radiative = radiativeSaturationCurrent(scan, temperatureK, { noiseFloor })
      if (!(radiative > 0)) {
        assumptions.push(`Junction ${p + 1}: its scan gives no J0, so no power is estimated.`)
        return undefined
      }
      assumptions.push(
        `Junction ${p + 1}: J0,rad from the scan by reciprocity (above ${100 * NOISE_SHARE} % of its maximum), external radiative ` +
          `efficiency ${efficiency}${externalRadiativeEfficiency === undefined ? ' assumed' : ' as stated'}, ideality ${ideality}.`,
      )
      return { logDark: Math.log(radiative / efficiency) / ideality, slopeV, ideality, gapEv }
    })
    assumptions.push('A changed gap moves ln J0 as in detailed balance; a changed thickness leaves J0 as it is.')
    this.assumptions = assumptions
  }

  /** The estimate, or null where a junction's J_0 is not known. @param gapShiftEv of each junction, eV. */
  estimate(currentsMaCm2: ArrayLike<number>, gapShiftEv: readonly number[]): PowerEstimate | null {
    const junctions: IdealJunction[] = []
    for (let p = 0; p < this.diodes.length; p++) {
      const diode = this.diodes[p]
      if (!diode) return null
      const logDarkCurrent = diode.logDark + this.logShift(diode, gapShiftEv[p]!)
      junctions.push({ currentMaCm2: currentsMaCm2[p]!, logDarkCurrent, slopeV: diode.slopeV })
    }
    const series = seriesPower(junctions, this.seriesResistance)
    return {
      openCircuitV: series.openCircuitV,
      fillFactor: series.fillFactor,
      powerMwCm2: series.powerMwCm2,
      efficiency: (10 * series.powerMwCm2) / this.irradianceWM2,
    }
  }

  private logShift(diode: Diode, gapShiftEv: number): number {
    if (gapShiftEv === 0) return 0
    const change =
      diode.gapEv === undefined
        ? -gapShiftEv / thermalVoltage(this.temperatureK)
        : logDarkCurrentMaCm2(diode.gapEv + gapShiftEv, this.temperatureK) -
          logDarkCurrentMaCm2(diode.gapEv, this.temperatureK)
    return change / diode.ideality
  }
}
