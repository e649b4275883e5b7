import { E490_IRRADIANCE_W_M2_NM, E490_WAVELENGTH_NM } from './astmE490.js'
import { G173_DIRECT_W_M2_NM, G173_GLOBAL_W_M2_NM, G173_WAVELENGTH_NM } from './astmG173.js'

/** The reference spectra that every project has. A new one is one table and one entry here. */
export const REFERENCE_SPECTRUM_IDS = ['AM1.5G', 'AM1.5D', 'AM0'] as const
export type ReferenceSpectrumId = (typeof REFERENCE_SPECTRUM_IDS)[number]

export interface ReferenceSpectrumTable {
  readonly id: ReferenceSpectrumId
  readonly name: string
  readonly standard: string
  readonly note: string
  readonly wavelengthNm: readonly number[]
  readonly irradianceWM2Nm: readonly number[]
}

export const REFERENCE_SPECTRA: Readonly<Record<ReferenceSpectrumId, ReferenceSpectrumTable>> = {
  'AM1.5G': {
    id: 'AM1.5G',
    name: 'AM1.5G',
    standard: 'ASTM G173-03',
    note: 'hemispherical on a plane tilted by 37°, 280–4000 nm',
    wavelengthNm: G173_WAVELENGTH_NM,
    irradianceWM2Nm: G173_GLOBAL_W_M2_NM,
  },
  'AM1.5D': {
    id: 'AM1.5D',
    name: 'AM1.5D',
    standard: 'ASTM G173-03',
    note: 'direct normal and circumsolar, 280–4000 nm',
    wavelengthNm: G173_WAVELENGTH_NM,
    irradianceWM2Nm: G173_DIRECT_W_M2_NM,
  },
  AM0: {
    id: 'AM0',
    name: 'AM0',
    standard: 'ASTM E490-00a',
    note: 'outside the atmosphere, 200.5–4000 nm of the table',
    wavelengthNm: E490_WAVELENGTH_NM,
    irradianceWM2Nm: E490_IRRADIANCE_W_M2_NM,
  },
}

export function isReferenceSpectrumId(id: string): id is ReferenceSpectrumId {
  return (REFERENCE_SPECTRUM_IDS as readonly string[]).includes(id)
}
