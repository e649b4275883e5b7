import { assertPositive, DomainError } from '../errors.js'
import { minimiseOnInterval } from '../numerics/minimise.js'
import { assertStack, solveStack, stackCurrent, stackVoltage, type SeriesStack } from './stack.js'

/** The figures of an illuminated current–voltage curve. */
export interface CurrentVoltageFigures {
  readonly shortCircuitCurrentMaCm2: number
  readonly openCircuitVoltageV: number
  readonly fillFactor: number
  readonly maximumPowerMwCm2: number
  readonly voltageAtMaximumPowerV: number
  readonly currentAtMaximumPowerMaCm2: number
  /** Maximum power over incident power. */
  readonly efficiency: number
}

export interface CurrentVoltageCurve {
  readonly voltageV: Float64Array
  readonly currentMaCm2: Float64Array
}

/** 1000 W m⁻² = 100 mW cm⁻², the irradiance of standard test conditions. */
export const STANDARD_IRRADIANCE_W_M2 = 1000

/**
 * J_sc, V_oc, fill factor, maximum power and efficiency of a series stack under light. The maximum power point is the
 * best of a look at 48 voltages, refined; a staircase with several local maxima is not taken at the wrong step.
 * @param irradianceWM2 incident irradiance that the efficiency is counted from, W m⁻².
 * @throws DomainError for a stack outside its domain or one that gives no power (J_sc or V_oc not above zero).
 * Cost: about 100 solutions of the circuit, some milliseconds.
 */
export function currentVoltageFigures(
  stack: SeriesStack,
  irradianceWM2: number = STANDARD_IRRADIANCE_W_M2,
): CurrentVoltageFigures {
  assertStack(stack)
  assertPositive(irradianceWM2, 'irradianceWM2')
  const shortCircuitCurrentMaCm2 = stackCurrent(stack, 0)
  const openCircuitVoltageV = stackVoltage(stack, 0)
  if (!(shortCircuitCurrentMaCm2 > 0) || !(openCircuitVoltageV > 0))
    throw new DomainError(
      'stack',
      `The stack has Jsc = ${shortCircuitCurrentMaCm2} mA/cm² and Voc = ${openCircuitVoltageV} V; both must be above ` +
        'zero for it to give power.',
    )
  const best = minimiseOnInterval((v) => -v * stackCurrent(stack, v), 0, openCircuitVoltageV, {
    tolerance: 1e-8 * openCircuitVoltageV,
  })
  const maximumPowerMwCm2 = -best.value
  return {
    shortCircuitCurrentMaCm2,
    openCircuitVoltageV,
    fillFactor: maximumPowerMwCm2 / (shortCircuitCurrentMaCm2 * openCircuitVoltageV),
    maximumPowerMwCm2,
    voltageAtMaximumPowerV: best.x,
    currentAtMaximumPowerMaCm2: maximumPowerMwCm2 / best.x,
    efficiency: maximumPowerMwCm2 / (irradianceWM2 / 10),
  }
}

/**
 * The curve J(V) of a stack at given voltages, each solved on its own.
 * @param voltageV V, in any order. Errors as `solveStack`. Cost: one solution of the circuit a point.
 */
export function currentVoltageCurve(stack: SeriesStack, voltageV: ArrayLike<number>): CurrentVoltageCurve {
  const voltages = Float64Array.from(voltageV)
  return { voltageV: voltages, currentMaCm2: voltages.map((v) => solveStack(stack, v).currentMaCm2) }
}
