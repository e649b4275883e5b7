import type { WorkingTable } from './foundTables.js'
import type { ColumnChoice } from './readingResult.js'

/** The table with the roles that a person gave by name; units are still proposed as usual. */
export function withChoice(table: WorkingTable, choice: ColumnChoice): WorkingTable {
  const { wavelengthColumn, valueColumns, quantity } = choice
  const columns = table.columns.map((column) => {
    const { index, role } = column
    const isWavelength = wavelengthColumn === undefined ? role === 'wavelength' : index === wavelengthColumn
    if (isWavelength) return { ...column, role: 'wavelength' as const }
    const isValue = valueColumns === undefined ? role !== 'wavelength' : valueColumns.includes(index)
    if (!isValue) return { ...column, role: 'ignored' as const }
    const isOwnRole = valueColumns === undefined || (quantity === 'eqe' && role === 'responsivity')
    return isOwnRole ? column : { ...column, role: quantity }
  })
  return { ...table, columns }
}
