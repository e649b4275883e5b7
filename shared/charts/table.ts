import { readingAt, unionOfX, type LineSeries } from './lineChart.geometry.js'

/** The table twin of a chart: one row for each x, one column a series; empty where a series has no value. */
export interface ChartTable {
  headers: string[]
  rows: (number | null)[][]
}

export function chartTable(series: readonly LineSeries[], xLabel: string): ChartTable {
  return {
    headers: [xLabel, ...series.map((one) => (one.unit ? `${one.label} (${one.unit})` : one.label))],
    rows: unionOfX(series).map((x) => [x, ...series.map((one) => readingAt(one, x))]),
  }
}

/** RFC 4180 with a decimal point; `\t` gives what spreadsheets paste. */
export function delimited(table: ChartTable, delimiter: ',' | '\t'): string {
  const cell = (text: string) => (/[",\n\t]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text)
  return [
    table.headers.map(cell).join(delimiter),
    ...table.rows.map((row) => row.map((value) => (value === null ? '' : String(value))).join(delimiter)),
  ]
    .join('\r\n')
    .concat('\r\n')
}
