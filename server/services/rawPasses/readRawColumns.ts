import { ApiError } from '../../../shared/contract/errors.js'
import type { RawPassInput, RawReduction } from '../../../shared/contract/rawPasses.js'
import type { RawColumns } from '../../database/entities/RawMeasurement.js'
import { bytesOfSourceFile } from '../../database/repositories/sourceFiles.js'
import type { Work } from '../../database/transaction.js'
import { findBenchItem } from '../bench/benchItems.js'
import { findSourceFile } from '../scans/findSourceFile.js'
import { readAsConfirmed } from '../scans/understand.js'
import { columnsOf, type StoredRaw } from './reduce.js'

/** The raw columns of both passes and the detector's calibration of this day. */
export async function readRaw(
  work: Work,
  projectId: string,
  reduction: RawReduction,
): Promise<StoredRaw & { detectorName: string }> {
  const detector = await findBenchItem(work, projectId, 'detector', reduction.detectorId)
  return {
    reduction,
    deviceColumns: await columnsOfPass(work, projectId, reduction.device, 'device'),
    referenceColumns: await columnsOfPass(work, projectId, reduction.reference, 'reference'),
    detectorName: detector.name,
    calibration: detector.content.curve,
  }
}

async function columnsOfPass(
  work: Work,
  projectId: string,
  pass: RawPassInput,
  which: 'device' | 'reference',
): Promise<RawColumns> {
  const file = await findSourceFile(work, projectId, pass.sourceFileId)
  // Voltages need no conversion: the reader gives a column in its base unit as it stands.
  const series = columnsOf(pass).map((column) => ({
    column,
    quantity: 'irradiance' as const,
    unit: 'W/m2/nm' as const,
    label: `column ${column + 1}`,
  }))
  const { scans } = await readAsConfirmed(await bytesOfSourceFile(work, file.id), file.name, {
    sheet: pass.sheet,
    tableIndex: pass.tableIndex,
    wavelength: pass.wavelength,
    series,
  })
  const [first] = scans
  for (const scan of scans)
    if (scan.wavelengthNm.length !== first!.wavelengthNm.length) {
      const message =
        `${file.name}: column ${scan.column + 1} has ${scan.wavelengthNm.length} values and column ` +
        `${first!.column + 1} has ${first!.wavelengthNm.length}; the columns of a pass need a value at each wavelength.`
      throw new ApiError('INPUT_INVALID', { errors: [{ path: ['reduction', which], message }] }, message)
    }
  return {
    wavelengthNm: Array.from(first!.wavelengthNm),
    byColumn: Object.fromEntries(scans.map((scan) => [String(scan.column), Array.from(scan.values)])),
  }
}
