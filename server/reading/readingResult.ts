import type { Quantity, ReadTable, ReadingMapping, ValueUnit, WavelengthUnit } from '../../shared/contract/scans.js'

/** What a column may hold, as far as the reader can tell. */
export const COLUMN_ROLES = [
  'wavelength',
  'eqe',
  'responsivity',
  'reflectance',
  'transmittance',
  'noise',
  'irradiance',
  'signal-x',
  'signal-y',
  'magnitude',
  'phase',
  'reference',
  'monitor',
  'dark',
  'ignored',
] as const
export type ColumnRole = (typeof COLUMN_ROLES)[number]

export interface FoundColumn {
  /** Place in the line or the sheet, from 0; a mapping names columns by it. */
  index: number
  header: string
  role: ColumnRole
  unit: string | null
  /** 0…1 */
  confidence: number
  /** One sentence: from what the role was taken. */
  why: string
}

export interface FoundTable extends Omit<ReadTable, 'columns'> {
  columns: FoundColumn[]
}

/** A curve as the mapping reads it. EQE, reflectance, transmittance, noise: fraction. Irradiance: W m⁻² nm⁻¹. */
export interface ReadScan {
  label: string
  quantity: Exclude<Quantity, 'noise'>
  column: number
  /** nm, strictly increasing */
  wavelengthNm: Float64Array
  values: Float64Array
  /** Standard uncertainty of each value, from the file's own column, in the unit of `values`. */
  noise?: Float64Array
}

/** Columns and units that a person names where the table alone does not tell them; what is left out is proposed. */
export interface ColumnChoice {
  tableIndex: number
  wavelengthColumn?: number
  valueColumns?: number[]
  quantity: 'eqe' | 'reflectance' | 'irradiance'
  wavelengthUnit?: WavelengthUnit
  valueUnit?: ValueUnit
}

export interface ReadingOptions {
  /** A person's mapping, or a remembered one, in place of the proposal. */
  mapping?: ReadingMapping
  /** Propose a mapping of these columns. */
  choice?: ColumnChoice
  /** What the file is uploaded for: columns whose headers say nothing are taken for it. */
  expected?: 'eqe' | 'reflectance' | 'irradiance'
  /** Rows of each table given as raw text for the preview. Default 40. */
  previewRows?: number
}

export interface ReadingResult {
  kind: 'text' | 'workbook'
  /** Every table of the file; `tableIndex` counts through the whole file. */
  tables: FoundTable[]
  /** What was applied: the given mapping, or the proposal. */
  mapping: ReadingMapping
  mappingOrigin: 'proposed' | 'given'
  /** What was decided, and what remains ambiguous, one sentence each. */
  notes: string[]
  scans: ReadScan[]
  /** Further tables in which the same columns go on with the same wavelengths: a scan was appended. */
  appendedTables: number[]
  /** Fingerprint of headers, columns and separator; files of one shape can share a mapping. */
  shape: string
}
