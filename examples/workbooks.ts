import { utils, write } from 'xlsx'

export interface Sheet {
  name: string
  cells: (string | number | null)[][]
  /** Number format of the cells from this row and column on. */
  format?: { fromRow: number; fromColumn: number; code: string }
}

/** The bytes of an XLSX workbook, the same in every run. */
export function workbook(sheets: readonly Sheet[]): Buffer {
  const book = utils.book_new()
  for (const { name, cells, format } of sheets) {
    const sheet = utils.aoa_to_sheet(cells)
    if (format)
      for (let r = format.fromRow; r < cells.length; r++)
        for (let c = format.fromColumn; c < cells[r]!.length; c++) {
          const cell = sheet[utils.encode_cell({ r, c })]
          if (cell?.t === 'n') cell.z = format.code
        }
    utils.book_append_sheet(book, sheet, name)
  }
  return write(book, { type: 'buffer', bookType: 'xlsx', compression: true })
}
