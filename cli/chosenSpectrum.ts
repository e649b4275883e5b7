import { isReferenceSpectrumId, REFERENCE_SPECTRUM_IDS } from '../shared/data/spectra/index.js'
import { makeSpectrum, referenceSpectrum, type Spectrum } from '../shared/physics/spectrum.js'
import { CommandError } from './commandError.js'
import { readScan } from './readScan.js'

/** The spectrum of `--spectrum`: a reference by name, otherwise a file with wavelengths and irradiances. */
export async function chosenSpectrum(nameOrFile: string): Promise<Spectrum> {
  const name = REFERENCE_SPECTRUM_IDS.find((id) => id.toLowerCase() === nameOrFile.toLowerCase())
  if (name && isReferenceSpectrumId(name)) return referenceSpectrum(name)
  const reference = { file: nameOrFile, sheet: undefined, columns: {}, units: {} }
  try {
    const curve = await readScan('.', reference, 'irradiance', '')
    return makeSpectrum({ id: nameOrFile, name: nameOrFile, curve })
  } catch (error) {
    if (error instanceof CommandError && error.message.endsWith('there is no such file.'))
      throw new CommandError(
        `There is no spectrum "${nameOrFile}": give ${REFERENCE_SPECTRUM_IDS.join(', ')} or a file that exists.`,
      )
    throw error
  }
}
