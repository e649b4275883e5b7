import { v7 as uuid } from 'uuid'
import type { CheckReport, ThresholdSettings } from '../../../shared/physics/checks/index.js'
import type { Finding } from '../../database/entities/Finding.js'
import { lockedDevice } from '../../database/repositories/devices.js'
import {
  findingRowsOfScans,
  inputsHashesOfScans,
  replaceFindings,
  saveScanChecks,
  scansOfDeviceToCheck,
  type FindingRow,
} from '../../database/repositories/scanChecks.js'
import { thresholdSettings } from '../../database/repositories/thresholds.js'
import type { Work } from '../../database/transaction.js'
import { vectorsOfScans } from '../rawPasses/lockInVector.js'
import { checkScan, type ScanToCheck } from './checkedScan.js'
import { scansToCheck, type PreparedCheck } from './scansToCheck.js'

/** Runs the checks of some scans: here, or in a worker where there are many. */
export type RunChecks = (
  scans: readonly ScanToCheck[],
  thresholds: ThresholdSettings,
) => CheckReport[] | Promise<CheckReport[]>

const here: RunChecks = (scans, thresholds) => scans.map((scan) => checkScan(scan, thresholds))

/**
 * Checks again those scans of a device of which something that the checks look at has changed, and keeps what they
 * find. Called in the transaction of every deed that may change it, so that a reply shows the findings that follow from
 * the deed. An answer stays while its finding is the same.
 */
export async function recheckDevice(
  work: Work,
  projectId: string,
  deviceId: string,
  run: RunChecks = here,
): Promise<void> {
  const device = await lockedDevice(work, projectId, deviceId)
  if (!device) return
  const thresholds = await thresholdSettings(work, projectId)
  const scans = await scansOfDeviceToCheck(work, deviceId)
  const vectors = await vectorsOfScans(
    work,
    scans.filter((scan) => scan.origin === 'raw').map((scan) => scan.id),
  )
  const prepared = scansToCheck(device, scans, vectors, thresholds)
  const known = await inputsHashesOfScans(
    work,
    prepared.map((one) => one.scanId),
  )
  const due = prepared.filter((one) => known.get(one.scanId) !== one.inputsHash)
  if (due.length === 0) return
  const reports = await run(
    due.map((one) => one.scan),
    thresholds,
  )
  await keep(work, due, reports)
}

export async function recheckDevices(work: Work, projectId: string, deviceIds: Iterable<string>): Promise<void> {
  for (const deviceId of [...new Set(deviceIds)].sort()) await recheckDevice(work, projectId, deviceId)
}

async function keep(work: Work, checked: readonly PreparedCheck[], reports: readonly CheckReport[]): Promise<void> {
  const at = new Date()
  const scanIds = checked.map((one) => one.scanId)
  const before = new Map((await findingRowsOfScans(work, scanIds)).map((row) => [`${row.scanId} ${row.check}`, row]))
  const rows = checked.flatMap(({ scanId, junctionPosition }, i) =>
    reports[i]!.findings.map((finding, rank): FindingRow => {
      const found = {
        scanId,
        check: finding.check,
        rank,
        severity: finding.severity,
        title: finding.title,
        message: finding.message,
        advice: finding.advice,
        bandsNm: finding.bandsNm.map(([from, to]): [number, number] => [from, to]),
        numbers: { ...finding.numbers },
        junctionPosition,
      }
      const earlier = before.get(`${scanId} ${finding.check}`)
      return earlier && isSame(earlier, found)
        ? { ...earlier, ...found }
        : { id: uuid(), foundAt: at, ...found, ...NO_ANSWER }
    }),
  )
  await replaceFindings(work, scanIds, rows)
  await saveScanChecks(
    work,
    checked.map(({ scanId, inputsHash }, i) => ({
      scanId,
      inputsHash,
      passed: reports[i]!.passed,
      notChecked: reports[i]!.notChecked.map((one) => ({ ...one })),
      checkedAt: at,
    })),
  )
}

const NO_ANSWER = {
  answerKind: null,
  repeatedAsScanId: null,
  answerReason: '',
  answeredById: null,
  answeredAt: null,
} satisfies Partial<Finding>

/** The message holds the numbers as a person read them: with those the finding is another one. */
function isSame(earlier: FindingRow, now: Pick<FindingRow, 'severity' | 'message'>): boolean {
  return earlier.severity === now.severity && earlier.message === now.message
}
