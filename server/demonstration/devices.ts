import type { Terminals } from '../../shared/contract/devices.js'
import { directGapAbsorptionPerCm, type DirectGapEdge } from '../../shared/physics/absorption/directGapEdge.js'
import { PHOTON_ENERGY_NM_EV } from '../../shared/physics/constants.js'
import { makeCurve, type Curve } from '../../shared/physics/curve.js'
import { radiativeSaturationCurrent } from '../../shared/physics/diode/reciprocity.js'
import { biasPhotocurrents, type BandSource } from '../../shared/physics/measurement/biasLight.js'
import { bestBiasVoltage } from '../../shared/physics/measurement/biasPlan.js'
import { simulateScan, type KnownStack } from '../../shared/physics/measurement/simulateScan.js'

/**
 * The invented devices of the demonstration, with their truth. Curves come from simple optics (a direct-gap edge with
 * its tail, a ripple of reflection, losses in the front layers); scans come from the engine's own model of the
 * measurement, so that what a bad scan hides is known.
 */
export interface InventedDevice {
  name: string
  sampleId: string
  series: string
  description: string
  terminals: Terminals
  deviceAreaCm2: number
  apertureAreaCm2: number
  junctions: { label: string; absorber: string; nominalGapEv: number; thicknessNm: number }[]
  layers: { name: string; material: string; thicknessNm: number | null; junctionIndex: number | null }[]
  truth: KnownStack
  reflectance: Curve
  /** How each junction is measured, from the sunward side. */
  measurements: InventedMeasurement[]
}

export interface InventedMeasurement {
  biasLight: BandSource[]
  biasVoltageV: number
  chopperHz: number
  seed: number
}

export interface InventedScan {
  curve: Curve
  measurement: InventedMeasurement
}

const TEMPERATURE_K = 298.15
const logistic = (x: number): number => 1 / (1 + Math.exp(-x))
const nmPerCm = 1e7

export const gridNm = (fromNm: number, toNm: number, stepNm: number): number[] =>
  Array.from({ length: Math.round((toNm - fromNm) / stepNm) + 1 }, (_, i) => fromNm + i * stepNm)

const curveOn = (wavelengthNm: readonly number[], value: (nm: number) => number): Curve =>
  makeCurve(wavelengthNm, wavelengthNm.map(value))

// ---- Perovskite on silicon: a split of the top cell's thickness ------------------------------------------------------

const PEROVSKITE: DirectGapEdge = { bandGapEv: 1.68, alpha0PerCm: 150_000, urbachMev: 15 }
/** Absorption of the perovskite, cm⁻¹: its edge, and a second transition that adds to it in the blue. */
function perovskiteAbsorptionPerCm(nm: number): number {
  const energyEv = PHOTON_ENERGY_NM_EV / nm
  return directGapAbsorptionPerCm(PEROVSKITE, energyEv) * (1 + 2 * logistic((energyEv - 2.35) / 0.09))
}
export const SPLIT_THICKNESSES_NM = [360, 420, 480, 540] as const
const SILICON_GRID_NM = gridNm(300, 1200, 5)
const TANDEM_TRUTH_GRID_NM = gridNm(290, 1250, 1)
const BLUE_LED: BandSource = { name: 'LED 470 nm', centreNm: 470, fwhmNm: 25, irradianceWM2: 200 }
const INFRARED_LED: BandSource = { name: 'LED 940 nm', centreNm: 940, fwhmNm: 50, irradianceWM2: 120 }

/** Reflection of the tandem: about 5 %, a ripple from the front layers, and what escapes beyond 1000 nm. */
function tandemReflectance(nm: number, thicknessNm: number): number {
  const ripple = 0.018 * Math.cos((2 * Math.PI * 2 * 2.3 * (thicknessNm + 150)) / nm) * logistic((nm - 420) / 40)
  return 0.05 + ripple + 0.07 * Math.exp(-(((nm - 300) / 45) ** 2)) + 0.22 * logistic((nm - 1120) / 22)
}

/** What reaches the absorbers: front contact and transport layers take the ultraviolet and a little everywhere. */
const frontTransmittance = (nm: number): number =>
  logistic((nm - 336) / 6) * (0.965 - 0.03 * logistic((nm - 1000) / 60))

function tandemTruth(thicknessNm: number, shuntOfBottomKohmCm2: number): { stack: KnownStack; reflectance: Curve } {
  const absorbed = (nm: number): number => 1 - Math.exp((-perovskiteAbsorptionPerCm(nm) * thicknessNm * 1.25) / nmPerCm)
  const light = (nm: number): number => (1 - tandemReflectance(nm, thicknessNm)) * frontTransmittance(nm)
  const eqes = [
    curveOn(TANDEM_TRUTH_GRID_NM, (nm) => 0.955 * light(nm) * absorbed(nm)),
    curveOn(TANDEM_TRUTH_GRID_NM, (nm) => 0.97 * light(nm) * (1 - absorbed(nm)) * logistic((1092 - nm) / 17)),
  ]
  return {
    stack: {
      eqes,
      diodes: [
        {
          saturationCurrentMaCm2: radiativeSaturationCurrent(eqes[0]!, TEMPERATURE_K) / 2e-4,
          shuntResistanceKohmCm2: 1000,
        },
        {
          saturationCurrentMaCm2: radiativeSaturationCurrent(eqes[1]!, TEMPERATURE_K) / 2e-3,
          shuntResistanceKohmCm2: shuntOfBottomKohmCm2,
        },
      ],
      seriesResistanceKohmCm2: 1e-4,
      temperatureK: TEMPERATURE_K,
    },
    reflectance: curveOn(SILICON_GRID_NM, (nm) => tandemReflectance(nm, thicknessNm)),
  }
}

function tandem(thicknessNm: number, index: number): InventedDevice {
  const { stack, reflectance } = tandemTruth(thicknessNm, 500)
  return {
    ...tandemDescription(thicknessNm),
    name: `Split ${thicknessNm} nm`,
    sampleId: `FT-24-${String(index + 1).padStart(2, '0')}`,
    description: `Perovskite on textured silicon, top cell ${thicknessNm} nm; one of four thicknesses made in one run.`,
    truth: stack,
    reflectance,
    measurements: [
      measurement(stack, 0, [INFRARED_LED], 133, 100 + 10 * index),
      measurement(stack, 1, [BLUE_LED], 133, 101 + 10 * index),
    ],
  }
}

function tandemDescription(thicknessNm: number) {
  return {
    series: 'Top-cell thickness',
    terminals: '2-terminal' as const,
    deviceAreaCm2: 1.21,
    apertureAreaCm2: 1.05,
    junctions: [
      { label: 'Top', absorber: 'halide perovskite', nominalGapEv: 1.68, thicknessNm },
      { label: 'Bottom', absorber: 'crystalline silicon', nominalGapEv: 1.12, thicknessNm: 160_000 },
    ],
    layers: [
      { name: 'Antireflection', material: 'MgF2', thicknessNm: 100, junctionIndex: null },
      { name: 'Front contact', material: 'ITO', thicknessNm: 60, junctionIndex: null },
      { name: 'Electron contact', material: 'SnO2 / C60', thicknessNm: 30, junctionIndex: null },
      { name: 'Perovskite', material: 'halide perovskite', thicknessNm, junctionIndex: 0 },
      { name: 'Recombination contact', material: 'ITO', thicknessNm: 20, junctionIndex: null },
      { name: 'Silicon', material: 'c-Si', thicknessNm: 160_000, junctionIndex: 1 },
      { name: 'Rear contact', material: 'ITO / Ag', thicknessNm: null, junctionIndex: null },
    ],
  }
}

/** The measurement a careful person takes: others well lit, and the voltage that holds the junction near short circuit. */
function measurement(
  stack: KnownStack,
  junctionIndex: number,
  biasLight: BandSource[],
  chopperHz: number,
  seed: number,
): InventedMeasurement {
  const voltage = bestBiasVoltage(stack, biasPhotocurrents(stack.eqes, biasLight), junctionIndex)
  return { biasLight, biasVoltageV: Math.round(voltage * 100) / 100, chopperHz, seed }
}

/** Bad on purpose: a leaky bottom cell, too little infrared bias light for the top, a chopper near mains. */
function badTandem(): InventedDevice {
  const { stack, reflectance } = tandemTruth(500, 0.03)
  return {
    ...tandemDescription(500),
    name: 'Repeat 500 nm',
    sampleId: 'FT-24-09',
    description: 'Measured in a hurry on the evening before a holiday; look at the findings before you believe it.',
    truth: stack,
    reflectance,
    measurements: [
      {
        biasLight: [
          { ...INFRARED_LED, irradianceWM2: 40 },
          { ...BLUE_LED, irradianceWM2: 78 },
        ],
        biasVoltageV: 0.68,
        chopperHz: 150.4,
        seed: 190,
      },
      { biasLight: [BLUE_LED], biasVoltageV: 1.17, chopperHz: 150.4, seed: 191 },
    ],
  }
}

// ---- III–V triple junction -------------------------------------------------------------------------------------------

const TRIPLE_GRID_NM = gridNm(300, 2000, 5)
const TRIPLE_TRUTH_GRID_NM = gridNm(290, 2060, 1)
const TRIPLE_EDGES_EV = [1.88, 1.41, 0.67] as const
const TRIPLE_EDGE_WIDTHS_EV = [0.012, 0.009, 0.009] as const

function tripleReflectance(nm: number): number {
  const ripple = 0.012 * Math.cos((2 * Math.PI * 900) / nm)
  return 0.04 + ripple + 0.08 * Math.exp(-(((nm - 300) / 50) ** 2)) + 0.12 * logistic((nm - 1500) / 120)
}

function triple(): InventedDevice {
  const absorbed = (i: number, nm: number): number =>
    logistic((PHOTON_ENERGY_NM_EV / nm - TRIPLE_EDGES_EV[i]!) / TRIPLE_EDGE_WIDTHS_EV[i]!) *
    (i === 0 ? 1 - 0.09 * logistic((nm - 560) / 25) : 1)
  const collection = [0.95, 0.955, 0.93]
  const eqes = TRIPLE_EDGES_EV.map((_, i) =>
    curveOn(TRIPLE_TRUTH_GRID_NM, (nm) => {
      let light = (1 - tripleReflectance(nm)) * logistic((nm - 336) / 6) * (i === 0 ? 1 : 0.985)
      for (let j = 0; j < i; j++) light *= 1 - absorbed(j, nm)
      return collection[i]! * light * absorbed(i, nm)
    }),
  )
  const stack: KnownStack = {
    eqes,
    diodes: eqes.map((eqe, i) => ({
      saturationCurrentMaCm2: radiativeSaturationCurrent(eqe, TEMPERATURE_K) / [5e-3, 2e-2, 1e-2][i]!,
      shuntResistanceKohmCm2: [2000, 1000, 40][i]!,
    })),
    seriesResistanceKohmCm2: 5e-5,
    temperatureK: TEMPERATURE_K,
  }
  const green: BandSource = { name: 'LED 525 nm', centreNm: 525, fwhmNm: 30, irradianceWM2: 160 }
  const deepRed: BandSource = { name: 'LED 780 nm', centreNm: 780, fwhmNm: 35, irradianceWM2: 160 }
  const shortWaveInfrared: BandSource = { name: 'Laser diode 1310 nm', centreNm: 1310, fwhmNm: 12, irradianceWM2: 160 }
  return {
    name: 'Triple A7',
    sampleId: 'FX-11-A7',
    series: 'Lattice-matched triple',
    description: 'GaInP / GaAs / Ge with a double-layer antireflection coating.',
    terminals: '3-junction',
    deviceAreaCm2: 4,
    apertureAreaCm2: 3.96,
    junctions: [
      { label: 'Top', absorber: 'GaInP', nominalGapEv: 1.88, thicknessNm: 680 },
      { label: 'Middle', absorber: 'GaAs', nominalGapEv: 1.41, thicknessNm: 3200 },
      { label: 'Bottom', absorber: 'Ge', nominalGapEv: 0.67, thicknessNm: 150_000 },
    ],
    layers: [
      { name: 'Antireflection', material: 'MgF2 / TiO2', thicknessNm: 150, junctionIndex: null },
      { name: 'Top cell', material: 'GaInP', thicknessNm: 680, junctionIndex: 0 },
      { name: 'Upper tunnel junction', material: 'AlGaAs / GaInP', thicknessNm: 40, junctionIndex: null },
      { name: 'Middle cell', material: 'GaAs', thicknessNm: 3200, junctionIndex: 1 },
      { name: 'Lower tunnel junction', material: 'GaAs', thicknessNm: 40, junctionIndex: null },
      { name: 'Bottom cell', material: 'Ge', thicknessNm: 150_000, junctionIndex: 2 },
    ],
    truth: stack,
    reflectance: curveOn(TRIPLE_GRID_NM, tripleReflectance),
    measurements: [
      measurement(stack, 0, [deepRed, shortWaveInfrared], 217, 301),
      measurement(stack, 1, [green, shortWaveInfrared], 217, 302),
      measurement(stack, 2, [green, deepRed], 217, 303),
    ],
  }
}

/** The thickness split, the bad repeat, the triple: in the order in which a newcomer should meet them. */
export function inventedDevices(): { split: InventedDevice[]; bad: InventedDevice; triple: InventedDevice } {
  return { split: SPLIT_THICKNESSES_NM.map(tandem), bad: badTandem(), triple: triple() }
}

/** The scans that the instrument would have written, one a junction; seeded, so always the same. */
export function inventedScans(device: InventedDevice): InventedScan[] {
  const wavelengthNm = device.terminals === '3-junction' ? TRIPLE_GRID_NM : SILICON_GRID_NM
  return device.measurements.map((one) => ({
    measurement: one,
    curve: simulateScan(device.truth, {
      wavelengthNm,
      biasLight: one.biasLight,
      biasVoltageV: one.biasVoltageV,
      noise: 3e-4,
      seed: one.seed,
    }).scan,
  }))
}
