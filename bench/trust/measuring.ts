import { shortCircuitCurrentDensity } from '../../shared/physics/currents.js'
import type { ScanInContext, ScanConditions, BiasSeriesMember } from '../../shared/physics/checks/check.js'
import type { Curve } from '../../shared/physics/curve.js'
import type { BandSource } from '../../shared/physics/measurement/biasLight.js'
import {
  simulateScan,
  type KnownStack,
  type SimulatedConditions,
  type SimulatedScan,
} from '../../shared/physics/measurement/simulateScan.js'
import { apparentEqe } from '../../shared/physics/measurement/smallSignal.js'
import type { RandomSource } from '../../shared/physics/numerics/random.js'
import { referenceSpectrum } from '../../shared/physics/spectrum.js'
import { biasFor, gridNm, voltageFor, type RandomDevice } from './devices.js'

/** How one junction is going to be measured; faults change it before the scan is taken. */
export interface PlannedScan {
  stack: KnownStack
  biasLight: BandSource[]
  voltageErrorV: number
  simulation: Omit<SimulatedConditions, 'biasLight' | 'biasVoltageV'>
  recorded: ScanConditions
  hasGoodRepeat: boolean
  /** Factors on the bias light of a series; the scan itself is the member at `ownIndex`. */
  series: { readonly factors: readonly number[]; readonly ownIndex: number } | null
}

export interface PlannedDevice {
  readonly device: RandomDevice
  readonly scans: PlannedScan[]
  /** Error of the J–V's short-circuit current, relative. */
  jvError: number
}

export const SPECTRUM = referenceSpectrum('AM1.5G')

/** A night as it should be: every junction well selected, well away from every threshold. */
export function planNight(device: RandomDevice, random: RandomSource): PlannedDevice {
  const last = Math.ceil((device.edgesNm.at(-1)! * 1.1) / 10) * 10
  const scans = device.stack.eqes.map((_, k): PlannedScan => {
    const currents = device.stack.eqes.map((__, j) => (j === k ? 0 : random.between(6, 14)))
    return {
      stack: device.stack,
      biasLight: biasFor(device, currents),
      voltageErrorV: random.between(-0.04, 0.04),
      simulation: {
        wavelengthNm: gridNm(300, last, 5),
        noise: 10 ** random.between(-4, -3.1),
        seed: random.below(1e9),
        filters: [{ atNm: 580 }, { atNm: 1000 }],
        phase: { startDeg: random.between(-180, 180), turnDeg: random.between(-2, 2) },
      },
      recorded: {
        temperatureC: 25,
        chopperHz: [37, 83, 133, 217, 277][random.below(5)]!,
        filterChangesNm: [580, 1000],
        referenceCalibrationDate: '2025-09-01',
        measuredOn: '2026-10-15',
      },
      hasGoodRepeat: true,
      series: { factors: [0.5, 0.75, 1], ownIndex: 1 },
    }
  })
  return { device, scans, jvError: random.between(-0.008, 0.008) }
}

export interface MeasuredScan {
  readonly context: ScanInContext
  readonly simulated: SimulatedScan
  readonly biasVoltageV: number
  /** Largest Σ EQE + R of the scans of the device as they are without noise. */
  readonly largestTrueSum: number
}

/** Takes the scans of a night and puts each into its context. */
export function measure(planned: PlannedDevice): MeasuredScan[] {
  const { device } = planned
  const taken = planned.scans.map((scan, k) => {
    const biasVoltageV = voltageFor(scan.stack, scan.biasLight, k) + scan.voltageErrorV
    const simulated = simulateScan(scan.stack, { ...scan.simulation, biasLight: scan.biasLight, biasVoltageV })
    return { scan, simulated, biasVoltageV }
  })
  const clean = taken.map(({ scan, simulated }) => ({
    scale: scan.simulation.scale ?? 1,
    curve: apparentEqe(scan.stack.eqes, simulated.truth.selectivities, device.reflectance.wavelengthNm),
  }))
  const largestTrueSum = device.reflectance.values.reduce(
    (most, r, i) =>
      Math.max(
        most,
        clean.reduce((sum, { scale, curve }) => sum + scale * curve.values[i]!, r),
      ),
    0,
  )
  const limiting = Math.min(...device.stack.eqes.map((eqe) => shortCircuitCurrentDensity(eqe, SPECTRUM)))
  return taken.map(({ scan, simulated, biasVoltageV }, k) => ({
    simulated,
    biasVoltageV,
    largestTrueSum,
    context: {
      scan: simulated.scan,
      junctionIndex: k,
      junctions: taken.map((other, j) => ({ scan: other.simulated.scan, diode: scan.stack.diodes[j]! })),
      conditions: { ...scan.recorded, biasLight: scan.biasLight, biasVoltageV },
      noise: simulated.noise ?? null,
      inPhase: simulated.inPhase ?? null,
      quadrature: simulated.quadrature ?? null,
      repeats: scan.hasGoodRepeat ? [goodRepeat(device, scan, k)] : null,
      biasSeries: scan.series ? seriesOf(scan, k, simulated.scan, biasVoltageV) : null,
      reflectance: device.reflectance,
      shortCircuitCurrentMaCm2: limiting * (1 + planned.jvError),
      spectrum: SPECTRUM,
    },
  }))
}

/** Another sample of the same make, measured well. */
function goodRepeat(device: RandomDevice, scan: PlannedScan, k: number): Curve {
  const biasLight = biasFor(
    device,
    device.stack.eqes.map((_, j) => (j === k ? 0 : 10)),
  )
  return simulateScan(device.stack, {
    wavelengthNm: scan.simulation.wavelengthNm,
    noise: 5e-4,
    seed: (scan.simulation.seed ?? 0) + 7,
    biasLight,
    biasVoltageV: voltageFor(device.stack, biasLight, k),
  }).scan
}

function seriesOf(
  scan: PlannedScan,
  k: number,
  own: Curve,
  ownVoltageV: number,
): { members: BiasSeriesMember[]; ownIndex: number } {
  const { factors, ownIndex } = scan.series!
  const ownFactor = factors[ownIndex]!
  const members = factors.map((factor, i): BiasSeriesMember => {
    const biasLight = scan.biasLight.map((s) => ({ ...s, irradianceWM2: (s.irradianceWM2 * factor) / ownFactor }))
    const irradianceWM2 = biasLight.reduce((sum, s) => sum + s.irradianceWM2, 0)
    if (i === ownIndex) return { scan: own, irradianceWM2, biasVoltageV: null }
    const biasVoltageV = ownVoltageV - voltageFor(scan.stack, scan.biasLight, k) + voltageFor(scan.stack, biasLight, k)
    const seed = (scan.simulation.seed ?? 0) + 100 + i
    return {
      scan: simulateScan(scan.stack, { ...scan.simulation, seed, biasLight, biasVoltageV }).scan,
      irradianceWM2,
      biasVoltageV: null,
    }
  })
  return { members, ownIndex }
}
