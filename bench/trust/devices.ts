import { makeCurve, type Curve } from '../../shared/physics/curve.js'
import { radiativeSaturationCurrent } from '../../shared/physics/diode/reciprocity.js'
import { biasPhotocurrents, type BandSource } from '../../shared/physics/measurement/biasLight.js'
import { bestBiasVoltage } from '../../shared/physics/measurement/biasPlan.js'
import type { KnownStack } from '../../shared/physics/measurement/simulateScan.js'
import type { RandomSource } from '../../shared/physics/numerics/random.js'

/** An invented device with its truth: two-junction perovskite/silicon or three-junction III–V, at random. */
export interface RandomDevice {
  readonly stack: KnownStack
  readonly reflectance: Curve
  /** Long-wave edge of each junction, nm. */
  readonly edgesNm: readonly number[]
}

const TEMPERATURE_K = 298.15
const logistic = (x: number): number => 1 / (1 + Math.exp(-x))

export const gridNm = (from: number, to: number, step: number): number[] =>
  Array.from({ length: Math.floor((to - from) / step + 1e-9) + 1 }, (_, i) => from + i * step)

export function randomDevice(random: RandomSource): RandomDevice {
  const isTriple = random.uniform() < 0.4
  const edgesNm = isTriple
    ? [random.between(655, 690), random.between(860, 900), random.between(1600, 1750)]
    : [random.between(700, 790), random.between(1080, 1120)]
  const collection = edgesNm.map(() => random.between(0.88, 0.97))
  const width = edgesNm.map((edge) => 0.009 * edge)
  const leftover = edgesNm.map(() => random.between(0.05, 0.2))
  const base = random.between(0.03, 0.07)
  const fine = gridNm(290, edgesNm.at(-1)! * 1.12, 1)
  const reflected = (nm: number): number =>
    base + 0.06 * Math.exp(-(((nm - 300) / 60) ** 2)) + 0.02 * logistic((nm - 900) / 80)
  const absorbed = (i: number, nm: number): number => {
    const isLast = i === edgesNm.length - 1
    const clear = isLast ? 0 : leftover[i]! * logistic((nm - (edgesNm[i]! - 70)) / 18)
    return logistic((edgesNm[i]! - nm) / width[i]!) * (1 - clear)
  }
  const eqes = edgesNm.map((_, i) =>
    makeCurve(
      fine,
      fine.map((nm) => {
        let light = (1 - reflected(nm)) * logistic((nm - 328) / 5)
        for (let j = 0; j < i; j++) light *= 1 - absorbed(j, nm)
        return collection[i]! * light * absorbed(i, nm)
      }),
    ),
  )
  const diodes = eqes.map((eqe) => ({
    saturationCurrentMaCm2: radiativeSaturationCurrent(eqe, TEMPERATURE_K) / 10 ** random.between(-4, -1.5),
    shuntResistanceKohmCm2: 10 ** random.between(0.8, 2.5),
  }))
  return {
    stack: { eqes, diodes, seriesResistanceKohmCm2: random.between(1e-4, 1e-3), temperatureK: TEMPERATURE_K },
    reflectance: makeCurve(fine, fine.map(reflected)),
    edgesNm,
  }
}

/** A light-emitting diode in the middle of the band of each junction, at 1 W/m². */
export function bandSources({ edgesNm }: RandomDevice): BandSource[] {
  return edgesNm.map((edge, i) => ({
    name: `band ${i + 1}`,
    centreNm: i === 0 ? 450 : 0.5 * (edgesNm[i - 1]! + edge),
    fwhmNm: 30,
    irradianceWM2: 1,
  }))
}

/** Bias light that drives each junction with the asked photocurrent (mA/cm²) through its own band. */
export function biasFor(device: RandomDevice, currentsMaCm2: readonly number[]): BandSource[] {
  return bandSources(device).map((source, i) => {
    const perWatt = biasPhotocurrents(device.stack.eqes, [source])[i]!
    return { ...source, irradianceWM2: currentsMaCm2[i]! / perWatt }
  })
}

/** Σ V_oc of the other junctions under a bias light. */
export function voltageFor(stack: KnownStack, biasLight: readonly BandSource[], junctionIndex: number): number {
  return bestBiasVoltage(stack, biasPhotocurrents(stack.eqes, biasLight), junctionIndex)
}
