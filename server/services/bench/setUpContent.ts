import type { SetUpContent } from '../../../shared/contract/bench.js'
import type { Work } from '../../database/transaction.js'
import { findBenchItem } from './benchItems.js'

/** A set-up as it is kept: name and calibration date of its detector are those of the library. */
export async function setUpContent(work: Work, projectId: string, input: SetUpContent): Promise<SetUpContent> {
  if (input.detectorId === null) return input
  const { name, content } = await findBenchItem(work, projectId, 'detector', input.detectorId)
  return { ...input, referenceDetector: name, referenceCalibrationDate: content.calibratedOn }
}
