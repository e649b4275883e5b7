import type { ScanCheckReport } from '../../../shared/contract/scanChecks.js'
import { ApiError } from '../../../shared/contract/errors.js'
import { CHECKS } from '../../../shared/physics/checks/index.js'
import { scanCheckOf } from '../../database/repositories/scanChecks.js'
import { scanOfProject } from '../../database/repositories/scans.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { requireMember } from '../rights.js'
import { foundScan } from '../scans/findScan.js'
import { CHECK_SPECTRUM } from './checkedScan.js'
import { findingsOfScans } from './findingsOfScans.js'

export async function readScanChecks(
  { work }: Database,
  actor: Actor,
  projectId: string,
  scanId: string,
): Promise<ScanCheckReport> {
  await requireMember(work, actor, projectId, 'read')
  const scan = foundScan(await scanOfProject(work, projectId, scanId))
  const checked = await scanCheckOf(work, scan.id)
  if (!checked)
    throw new ApiError(
      'NOT_FOUND',
      { what: 'check report' },
      scan.quantity === 'eqe'
        ? `The scan ${scan.label} has not been checked yet; the server is about to.`
        : `The scan ${scan.label} is a reflectance; the checks are for EQE scans.`,
    )
  const titles = new Map(CHECKS.map(({ name, title }) => [name, title]))
  return {
    scanId,
    findings: (await findingsOfScans(work, [scanId])).get(scanId) ?? [],
    passed: checked.passed.map((check) => ({ check, title: titles.get(check) ?? check })),
    notChecked: checked.notChecked,
    spectrum: CHECK_SPECTRUM,
    checkedAt: checked.checkedAt.toISOString(),
  }
}
