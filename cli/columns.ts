/** Rows of text in aligned columns, two blanks apart; the second column to the left, numbers to the right. */
export function columns(rows: readonly (readonly string[])[]): string {
  const widths = rows[0]!.map((_, column) => Math.max(...rows.map((row) => [...row[column]!].length)))
  return rows
    .map((row) =>
      row
        .map((cell, column) => {
          const blanks = ' '.repeat(widths[column]! - [...cell].length)
          return column <= 1 ? cell + blanks : blanks + cell
        })
        .join('  ')
        .trimEnd(),
    )
    .join('\n')
}
