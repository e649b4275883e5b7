import { AG_JIANG_2016 } from './agJiang2016.js'
import { CH3NH3PBI3_PHILLIPS_2015 } from './ch3nh3pbi3Phillips2015.js'
import { GAAS_PAPATRYFONOS_2021 } from './gaasPapatryfonos2021.js'
import { GAINAS_ADACHI_1989 } from './gainasAdachi1989.js'
import { GAINP_SCHUBERT_1995 } from './gainpSchubert1995.js'
import { GE_NUNLEY_2016 } from './geNunley2016.js'
import { ITO_KONIG_2014 } from './itoKonig2014.js'
import { MGF2_RODRIGUEZ_DE_MARCOS_2017 } from './mgf2RodriguezDeMarcos2017.js'
import { SI_GREEN_2008 } from './siGreen2008.js'
import { SODA_LIME_CLEAR_RUBIN_1985 } from './sodaLimeClearRubin1985.js'
import { SODA_LIME_LOW_IRON_RUBIN_1985 } from './sodaLimeLowIronRubin1985.js'
import type { OpticalConstantsTable } from './table.js'

export type { OpticalConstantsTable } from './table.js'

/**
 * Materials that every project has. The tables were entered row by row from the refractiveindex.info database, whose
 * collection is in the public domain (CC0 1.0). A new material is one table and one entry here.
 */
export const OPTICAL_CONSTANT_IDS = [
  'si-green-2008',
  'gaas-papatryfonos-2021',
  'gainp-schubert-1995',
  'ge-nunley-2016',
  'gainas-adachi-1989',
  'ch3nh3pbi3-phillips-2015',
  'ito-konig-2014',
  'ag-jiang-2016',
  'mgf2-rodriguez-de-marcos-2017',
  'soda-lime-clear-rubin-1985',
  'soda-lime-low-iron-rubin-1985',
] as const
export type OpticalConstantsId = (typeof OPTICAL_CONSTANT_IDS)[number]

export const OPTICAL_CONSTANTS: Readonly<Record<OpticalConstantsId, OpticalConstantsTable>> = {
  'si-green-2008': SI_GREEN_2008,
  'gaas-papatryfonos-2021': GAAS_PAPATRYFONOS_2021,
  'gainp-schubert-1995': GAINP_SCHUBERT_1995,
  'ge-nunley-2016': GE_NUNLEY_2016,
  'gainas-adachi-1989': GAINAS_ADACHI_1989,
  'ch3nh3pbi3-phillips-2015': CH3NH3PBI3_PHILLIPS_2015,
  'ito-konig-2014': ITO_KONIG_2014,
  'ag-jiang-2016': AG_JIANG_2016,
  'mgf2-rodriguez-de-marcos-2017': MGF2_RODRIGUEZ_DE_MARCOS_2017,
  'soda-lime-clear-rubin-1985': SODA_LIME_CLEAR_RUBIN_1985,
  'soda-lime-low-iron-rubin-1985': SODA_LIME_LOW_IRON_RUBIN_1985,
}
