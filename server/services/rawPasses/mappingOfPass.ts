import type { RawPassInput } from '../../../shared/contract/rawPasses.js'
import type { ReadingMapping } from '../../../shared/contract/scans.js'

/** Where in its file the signal of a raw scan stands, in the words of every other scan. */
export function mappingOfPass({ sheet, tableIndex, wavelength, signal }: RawPassInput): ReadingMapping {
  const column = 'inPhase' in signal ? signal.inPhase : signal.magnitude
  return {
    sheet,
    tableIndex,
    wavelength,
    series: [{ column, quantity: 'eqe', unit: 'fraction', label: 'raw signal' }],
  }
}
