import XLSX from 'xlsx'

/** Files of a two-junction device as a laboratory might write them, made here so that their truth is known. */
const logistic = (x: number) => 1 / (1 + Math.exp(-x))
export const topEqe = (nm: number) => 0.9 * logistic((745 - nm) / 6) * logistic((nm - 335) / 5)
export const bottomEqe = (nm: number) => 0.9 * logistic((nm - 745) / 6) * logistic((1095 - nm) / 16)
export const wavelengthsNm = Array.from({ length: 181 }, (_, i) => 300 + 5 * i)

/** Comma-separated, nm and percent. */
export function topCsv(): Buffer {
  const rows = wavelengthsNm.map((nm) => `${nm},${(100 * topEqe(nm)).toFixed(4)}`)
  return Buffer.from(['Wavelength (nm),EQE (%)', ...rows].join('\r\n'))
}

/** Semicolons, decimal commas, a fraction, from long waves to short. */
export function bottomCsv(): Buffer {
  const rows = [...wavelengthsNm].reverse().map((nm) => `${nm};${bottomEqe(nm).toFixed(6).replace('.', ',')}`)
  return Buffer.from(['Wellenlänge / nm;EQE', ...rows].join('\n'), 'latin1')
}

/** A workbook with the reflectance on its second sheet. */
export function reflectanceWorkbook(): Buffer {
  const book = XLSX.utils.book_new()
  XLSX.utils.book_append_sheet(book, XLSX.utils.aoa_to_sheet([['Notes'], ['integrating sphere']]), 'about')
  const rows = wavelengthsNm.map((nm) => [nm, 0.05 + 0.02 * logistic((nm - 1000) / 40)])
  XLSX.utils.book_append_sheet(book, XLSX.utils.aoa_to_sheet([['Wavelength (nm)', 'Reflectance'], ...rows]), 'R')
  return XLSX.write(book, { type: 'buffer', bookType: 'xlsx' }) as Buffer
}

/** A measured lamp, W m⁻² nm⁻¹. */
export function lampTsv(): Buffer {
  const rows = Array.from({ length: 181 }, (_, i) => 300 + 5 * i).map(
    (nm) => `${nm}\t${(0.9 + 0.4 * logistic((nm - 600) / 80)).toFixed(5)}`,
  )
  return Buffer.from(['Wavelength (nm)\tIrradiance (W/m2/nm)', ...rows].join('\n'))
}
