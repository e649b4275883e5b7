import { isApiError } from '../../../shared/contract/errors.js'
import { ENGINE_VERSION } from '../../../shared/physics/version.js'
import type { ScenarioRow } from '../../database/repositories/scenarios.js'
import type { Work } from '../../database/transaction.js'
import { chooseSpectrum } from '../spectra/chooseSpectrum.js'
import { curveSha256, type ScenarioBasis } from './scenarioBasis.js'

/** What of a scenario's inputs is no longer what it was made from, as sentences; none while it still holds. */
export async function changedSince(
  work: Work,
  { projectId, inputs, spectrum }: Pick<ScenarioRow, 'projectId' | 'inputs' | 'spectrum'>,
  basis: ScenarioBasis,
): Promise<string[]> {
  const changed: string[] = []
  for (const { position, label } of basis.device.junctions) {
    const before = inputs.scans.find((one) => one.position === position)
    const now = basis.scans.find((one) => one.position === position)
    if (!now) changed.push(`Junction ${position} (${label}) has no scan in use any more.`)
    else if (before?.scanId !== now.scanId)
      changed.push(`Another scan stands for junction ${position} (${label}) than when the scenario was made.`)
    else if (before.sha256 !== now.sha256)
      changed.push(`The scan of junction ${position} (${label}) was computed again since.`)
  }
  if (inputs.descriptionSha256 !== basis.descriptionSha256)
    changed.push(`The optical description of ${basis.device.name} was changed since.`)
  if ((await spectrumSha256(work, projectId, spectrum)) !== inputs.spectrumSha256)
    changed.push(`The spectrum ${spectrum.name} is no longer there as it was.`)
  if (inputs.engineVersion !== ENGINE_VERSION)
    changed.push(`It was computed by engine ${inputs.engineVersion}; this is ${ENGINE_VERSION}.`)
  return changed
}

async function spectrumSha256(
  work: Work,
  projectId: string,
  { id, scaledToWM2 }: ScenarioRow['spectrum'],
): Promise<string | null> {
  const choice = { spectrum: id, ...(scaledToWM2 !== null && { scaleToWM2: scaledToWM2 }) }
  try {
    return curveSha256((await chooseSpectrum(work, projectId, choice)).spectrum.curve)
  } catch (error) {
    if (isApiError(error, 'NOT_FOUND')) return null
    throw error
  }
}
