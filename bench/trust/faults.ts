import { shortCircuitCurrentDensity } from '../../shared/physics/currents.js'
import { makeCurve, valueAt } from '../../shared/physics/curve.js'
import { stackUnderBias, type KnownStack } from '../../shared/physics/measurement/simulateScan.js'
import { smallSignal } from '../../shared/physics/measurement/smallSignal.js'
import type { RandomSource } from '../../shared/physics/numerics/random.js'
import { biasFor, gridNm, voltageFor } from './devices.js'
import { SPECTRUM, type PlannedDevice, type PlannedScan } from './measuring.js'

/** Something that goes wrong on a night: which check should name it, and what else it brings about for real. */
export interface Fault {
  readonly check: string
  readonly entails: readonly string[]
  /** Changes the plan for one junction; false when the device cannot have this fault there. */
  readonly apply: (planned: PlannedDevice, k: number, random: RandomSource) => boolean
}

const PLUS_MINUS = (random: RandomSource): number => (random.uniform() < 0.5 ? -1 : 1)

export const FAULTS: readonly Fault[] = [
  {
    check: 'bias-light-too-weak',
    entails: ['bias-voltage-off', 'not-on-plateau', 'missing-response', 'luminescent-coupling', 'disagrees-with-jv'],
    apply: ({ device, scans }, k, random) => {
      const currents = device.edgesNm.map(() => random.between(8, 12))
      const weakest = (k + 1 + random.below(currents.length - 1)) % currents.length
      currents[k] = random.between(4, 6)
      currents[weakest] = currents[k]! * random.between(0.7, 1.1)
      scans[k]!.biasLight = biasFor(device, currents)
      return true
    },
  },
  {
    check: 'bias-voltage-off',
    entails: ['missing-response', 'not-on-plateau'],
    apply: ({ scans }, k, random) => {
      scans[k]!.voltageErrorV = PLUS_MINUS(random) * random.between(0.23, 0.5)
      return true
    },
  },
  {
    check: 'leakage',
    entails: ['missing-response', 'not-on-plateau', 'disagrees-with-jv'],
    apply: ({ scans }, k, random) => withShunt(scans, k, random.between(0.015, 0.19)),
  },
  {
    check: 'missing-response',
    entails: ['leakage', 'not-on-plateau', 'disagrees-with-jv'],
    apply: ({ scans }, k, random) => withShunt(scans, k, random.between(0.03, 0.15)),
  },
  {
    check: 'luminescent-coupling',
    entails: ['leakage', 'missing-response', 'not-on-plateau', 'disagrees-with-jv'],
    apply: ({ scans }, k, random) => {
      const scan = scans[k]!
      if (k === 0) return false
      const upper = scan.stack.diodes[k - 1]!
      // Recombination with n = 2 that equals the radiative kind at about a milliampere: coupling rises with light.
      const equal = Math.sqrt(upper.saturationCurrentMaCm2 * random.between(0.5, 3))
      scan.stack = {
        ...withDiode(scan.stack, k - 1, { ...upper, secondSaturationCurrentMaCm2: equal }),
        couplingToNext: scan.stack.diodes.slice(1).map((_, i) => (i === k - 1 ? random.between(0.15, 0.4) : 0)),
      }
      scan.series = { factors: [0.01, 0.1, 1], ownIndex: 2 }
      return true
    },
  },
  {
    check: 'not-on-plateau',
    entails: ['leakage', 'missing-response', 'luminescent-coupling'],
    apply: ({ device, scans }, k, random) => {
      const scan = scans[k]!
      const before = { stack: scan.stack, biasLight: scan.biasLight }
      scan.stack = withDiode(scan.stack, k, {
        ...scan.stack.diodes[k]!,
        shuntResistanceKohmCm2: random.between(0.5, 1),
      })
      for (let current = 0.6; current > 0.02; current /= 1.5) {
        scan.biasLight = biasFor(
          device,
          device.edgesNm.map((_, j) => (j === k ? 0 : current)),
        )
        if (smallestTrueStep(scan, k) > 0.01) return true
      }
      Object.assign(scan, before)
      return false
    },
  },
  {
    check: 'sum-above-absorptance',
    entails: ['disagrees-with-jv', 'negative-or-above-one'],
    apply: ({ scans }, k, random) => scaled(scans[k]!, random.between(1.16, 1.25)),
  },
  {
    check: 'truncated-range',
    entails: ['disagrees-with-jv'],
    apply: (planned, k, random) => {
      const edge = planned.device.edgesNm[k]!
      const to = edge - random.between(10, 40)
      planned.scans[k]!.simulation = { ...planned.scans[k]!.simulation, wavelengthNm: gridNm(300, to, 5) }
      return true
    },
  },
  {
    check: 'coarse-step',
    entails: ['disagrees-with-jv', 'sum-above-absorptance', 'phase-wanders', 'filter-step'],
    apply: ({ device, scans }, k) => {
      const eqe = device.stack.eqes[k]!
      const last = device.edgesNm.at(-1)! * 1.08
      for (let step = 35; step <= 80; step += 5) {
        const nm = gridNm(300, last, step)
        const current = (grid: readonly number[]): number =>
          shortCircuitCurrentDensity(
            makeCurve(
              grid,
              grid.map((x) => valueAt(eqe, x)),
            ),
            SPECTRUM,
          )
        const every = nm.filter((_, i) => i % 2 === 0 || i === nm.length - 1)
        if (Math.abs(current(every) / current(nm) - 1) < 0.006) continue
        scans[k]!.simulation = { ...scans[k]!.simulation, wavelengthNm: nm }
        return true
      }
      return false
    },
  },
  {
    check: 'noisy',
    entails: ['negative-or-above-one'],
    apply: ({ scans }, k, random) => {
      scans[k]!.simulation = { ...scans[k]!.simulation, noise: random.between(0.006, 0.015) }
      return true
    },
  },
  {
    check: 'negative-or-above-one',
    entails: ['sum-above-absorptance', 'disagrees-with-jv', 'truncated-range'],
    apply: ({ scans }, k, random) => scaled(scans[k]!, random.uniform() < 0.5 ? 10 : random.between(1.35, 2)),
  },
  {
    check: 'chopper-near-mains',
    entails: [],
    apply: ({ scans }, k, random) => {
      const mains = random.uniform() < 0.5 ? 50 : 60
      const chopperHz = mains * (1 + random.below(5)) + random.between(-0.9, 0.9)
      scans[k]!.recorded = { ...scans[k]!.recorded, chopperHz }
      return true
    },
  },
  {
    check: 'phase-wanders',
    entails: [],
    apply: ({ device, scans }, k, random) => {
      const { simulation } = scans[k]!
      const span = simulation.wavelengthNm[simulation.wavelengthNm.length - 1]! - 300
      const from = k === 0 ? 330 : device.edgesNm[k - 1]!
      const share = (device.edgesNm[k]! - from) / span
      const turnDeg = (PLUS_MINUS(random) * random.between(8, 25)) / share
      scans[k]!.simulation = { ...simulation, phase: { startDeg: random.between(-180, 180), turnDeg } }
      return true
    },
  },
  {
    check: 'filter-step',
    entails: ['disagrees-with-jv', 'sum-above-absorptance', 'missing-response'],
    apply: ({ device, scans }, k, random) => {
      // Where the junction responds well and steadily.
      const atNm = k === 0 ? 500 : Math.round(0.5 * (device.edgesNm[k - 1]! + device.edgesNm[k]!))
      const factor = 1 + PLUS_MINUS(random) * random.between(0.03, 0.08)
      const scan = scans[k]!
      const changes = [580, 1000].filter((nm) => Math.abs(nm - atNm) > 60)
      scan.simulation = { ...scan.simulation, filters: [{ atNm, factor }, ...changes.map((nm) => ({ atNm: nm }))] }
      scan.recorded = { ...scan.recorded, filterChangesNm: [atNm, ...changes].sort((a, b) => a - b) }
      return true
    },
  },
  {
    check: 'second-order-suspected',
    entails: ['leakage', 'truncated-range', 'sum-above-absorptance'],
    apply: ({ device, scans }, k, random) => {
      if (k === device.edgesNm.length - 1) return false
      const scan = scans[k]!
      scan.simulation = { ...scan.simulation, secondOrderShare: random.between(0.02, 0.06), filters: [] }
      scan.recorded = { ...scan.recorded, filterChangesNm: [] }
      return true
    },
  },
  {
    check: 'disagrees-with-jv',
    entails: [],
    apply: (planned, _, random) => {
      planned.jvError = PLUS_MINUS(random) * random.between(0.045, 0.15)
      return true
    },
  },
  {
    check: 'reference-out-of-date',
    entails: [],
    apply: ({ scans }, k, random) => {
      const year = 2022 + random.below(2)
      scans[k]!.recorded = { ...scans[k]!.recorded, referenceCalibrationDate: `${year}-05-10` }
      return true
    },
  },
]

/** Gives junction k the shunt resistance at which the others' share in its scan is the asked one. */
export function withShunt(scans: readonly PlannedScan[], k: number, share: number): boolean {
  const scan = scans[k]!
  const diode = scan.stack.diodes[k]!
  const shareAt = (shuntResistanceKohmCm2: number): number => {
    const stack = withDiode(scan.stack, k, { ...diode, shuntResistanceKohmCm2 })
    const voltage = voltageFor(stack, scan.biasLight, k) + scan.voltageErrorV
    return 1 - smallSignal(stackUnderBias(stack, scan.biasLight), voltage).selectivities[k]!
  }
  let low = 1e-4
  let high = diode.shuntResistanceKohmCm2!
  if (shareAt(high) > share || shareAt(low) < share) return false
  for (let i = 0; i < 60; i++) {
    const middle = Math.sqrt(low * high)
    if (shareAt(middle) > share) low = middle
    else high = middle
  }
  for (const other of scans) other.stack = withDiode(other.stack, k, { ...diode, shuntResistanceKohmCm2: high })
  return true
}

function withDiode(stack: KnownStack, k: number, diode: KnownStack['diodes'][number]): KnownStack {
  return { ...stack, diodes: stack.diodes.map((d, i) => (i === k ? diode : d)) }
}

function scaled(scan: PlannedScan, scale: number): boolean {
  scan.simulation = { ...scan.simulation, scale }
  return true
}

/** How far the noise-free current moves to the nearer neighbour in the series of a scan, relative. */
function smallestTrueStep(scan: PlannedScan, k: number): number {
  const { factors, ownIndex } = scan.series!
  const currents = factors.map((factor) => {
    const biasLight = scan.biasLight.map((s) => ({
      ...s,
      irradianceWM2: (s.irradianceWM2 * factor) / factors[ownIndex]!,
    }))
    const voltage = voltageFor(scan.stack, biasLight, k) + scan.voltageErrorV
    const { selectivities } = smallSignal(stackUnderBias(scan.stack, biasLight), voltage)
    return scan.stack.eqes.reduce(
      (sum, eqe, i) => sum + selectivities[i]! * shortCircuitCurrentDensity(eqe, SPECTRUM),
      0,
    )
  })
  return Math.min(...currents.flatMap((j, i) => (i === ownIndex ? [] : [Math.abs(j / currents[ownIndex]! - 1)])))
}
