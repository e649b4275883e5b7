import type { DetectorContent, DetectorInput } from '../../../shared/contract/bench.js'
import { ApiError } from '../../../shared/contract/errors.js'
import { bytesOfSourceFile } from '../../database/repositories/sourceFiles.js'
import type { Work } from '../../database/transaction.js'
import { presentCurve } from '../../presenters/curve.js'
import { findSourceFile } from '../scans/findSourceFile.js'
import { readAsConfirmed } from '../scans/understand.js'

/** A detector's calibration, read from its uploaded file; a responsivity is turned into EQE. */
export async function detectorContent(work: Work, projectId: string, input: DetectorInput): Promise<DetectorContent> {
  const file = await findSourceFile(work, projectId, input.sourceFileId)
  const { scans } = await readAsConfirmed(await bytesOfSourceFile(work, file.id), file.name, input.mapping)
  const [only, second] = scans.filter((scan) => scan.quantity === 'eqe')
  if (!only || second) {
    const message = second
      ? 'The mapping reads several columns of EQE or responsivity; a calibration is one.'
      : 'The mapping reads no column of EQE or responsivity (A/W); say which column holds the calibration.'
    throw new ApiError('INPUT_INVALID', { errors: [{ path: ['content', 'mapping', 'series'], message }] }, message)
  }
  const dark = only.values.findIndex((value) => !(value > 0))
  if (dark >= 0) {
    const message =
      `The calibration is ${only.values[dark]} at ${only.wavelengthNm[dark]} nm; ` +
      'a reference detector must respond at every wavelength of its calibration.'
    throw new ApiError('INPUT_INVALID', { errors: [{ path: ['content', 'mapping'], message }] }, message)
  }
  const { calibratedOn, serialNumber, note, mapping } = input
  return {
    sourceFileId: file.id,
    sourceFileName: file.name,
    mapping,
    curve: presentCurve(only),
    rangeNm: [only.wavelengthNm[0]!, only.wavelengthNm.at(-1)!],
    calibratedOn,
    serialNumber,
    note,
  }
}
