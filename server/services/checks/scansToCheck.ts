import { createHash } from 'node:crypto'
import type { ThresholdSettings } from '../../../shared/physics/checks/index.js'
import { makeCurve, type Curve } from '../../../shared/physics/curve.js'
import type { DeviceWithStack } from '../../database/repositories/devices.js'
import type { CheckedScanRow } from '../../database/repositories/scanChecks.js'
import type { LockInVector } from '../rawPasses/lockInVector.js'
import { scansInUse } from '../matching/scansInUse.js'
import { recordedConditions, totalBiasIrradiance, type ScanToCheck } from './checkedScan.js'

export interface PreparedCheck {
  scanId: string
  junctionPosition: number
  scan: ScanToCheck
  /** Of everything that the checks look at: scans by id and version, wiring, thresholds. */
  inputsHash: string
}

/** Of many repeats the latest; each costs a comparison. */
const MOST_REPEATS = 8

/** Counts up when the checks themselves change, so that scans are checked again. */
const CHECKS_EDITION = 1

type Device = Pick<DeviceWithStack, 'id' | 'terminals' | 'junctions'>

/** Every EQE scan of a device with what its checks look at. Pure. */
export function scansToCheck(
  device: Device,
  scans: readonly CheckedScanRow[],
  vectors: ReadonlyMap<string, LockInVector>,
  thresholds: ThresholdSettings,
): PreparedCheck[] {
  const curves = new Map(scans.map((scan) => [scan.id, makeCurve(scan.wavelengthNm, scan.values)]))
  const curveOf = (scan: CheckedScanRow): Curve => curves.get(scan.id)!
  const inUse = scansInUse(scans)
  const reflectance = inUse.find((scan) => scan.quantity === 'reflectance') ?? null
  const standing = device.junctions.map(({ id }) => inUse.find((scan) => scan.junctionId === id) ?? null)
  return scans.flatMap((scan) => {
    const junctionIndex = device.junctions.findIndex(({ id }) => id === scan.junctionId)
    if (scan.quantity !== 'eqe' || junctionIndex < 0) return []
    const repeats = scans
      .filter(
        (other) =>
          other !== scan &&
          other.junctionId === scan.junctionId &&
          other.quantity === 'eqe' &&
          other.state !== 'excluded' &&
          other.origin !== 'corrected',
      )
      .slice(-MOST_REPEATS)
    const members = scan.biasSeriesId === null ? [] : scans.filter((one) => one.biasSeriesId === scan.biasSeriesId)
    const vector = vectors.get(scan.id) ?? null
    const others = standing.map((one, i) => (i === junctionIndex ? null : one))
    return [
      {
        scanId: scan.id,
        junctionPosition: junctionIndex + 1,
        scan: {
          scan: curveOf(scan),
          junctionIndex,
          junctions: standing.map((one) => ({ scan: one && curveOf(one) })),
          connection: device.terminals === '4-terminal' ? 'independent' : 'series',
          conditions: recordedConditions(scan.conditions),
          reflectance: reflectance && curveOf(reflectance),
          shortCircuitCurrentMaCm2: jvJscOf(scan, ...standing),
          repeats: repeats.map(curveOf),
          inPhase: vector?.inPhaseV ?? null,
          quadrature: vector?.quadratureV ?? null,
          biasSeries: members.length === 0 ? null : seriesOf(members, scan, curveOf),
        },
        inputsHash: hashOf([
          CHECKS_EDITION,
          device.terminals,
          junctionIndex,
          ...[scan, ...others, reflectance].map(keyOf),
          repeats.map(keyOf).sort(),
          members.map(keyOf).sort(),
          thresholds,
        ]),
      },
    ]
  })
}

function seriesOf(
  members: readonly CheckedScanRow[],
  own: CheckedScanRow,
  curveOf: (scan: CheckedScanRow) => Curve,
): NonNullable<ScanToCheck['biasSeries']> {
  return {
    members: members.map((one) => ({
      scan: curveOf(one),
      irradianceWM2: totalBiasIrradiance(one.conditions),
      biasVoltageV: one.conditions.biasVoltageV,
    })),
    ownIndex: members.indexOf(own),
  }
}

/** The J–V is of the whole device: any scan that stands for a junction may have it written down. */
function jvJscOf(...scans: readonly (CheckedScanRow | null)[]): number | null {
  for (const scan of scans) {
    const jsc = scan?.conditions.jvJscMaCm2 ?? null
    if (jsc !== null) return jsc
  }
  return null
}

const keyOf = (scan: CheckedScanRow | null) => scan && `${scan.id} ${scan.version}`

/** Keys are sorted, so that settings which say the same give the same hash. */
function hashOf(inputs: unknown): string {
  const text = JSON.stringify(inputs, (_, value: unknown) =>
    value !== null && typeof value === 'object' && !Array.isArray(value)
      ? Object.fromEntries(Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1)))
      : value,
  )
  return createHash('sha256').update(text).digest('hex')
}
