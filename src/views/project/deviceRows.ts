import type { DeviceSummary } from '../../../shared/contract/matching.js'
import type { Severity } from '../../../shared/contract/findings.js'

/** The table of devices as data: what each row says, how rows are found and ordered, and the table as text. */
export type Trust = Severity | 'none' | 'unmeasured'
export interface DeviceRow {
  id: string
  name: string
  sampleId: string
  series: string
  junctions: { position: number; label: string; jscMaCm2: number | null }[]
  limiting: number[]
  limitingText: string
  jLimMaCm2: number | null
  mismatchPercent: number | null
  trust: Trust
  scanCount: number
  lastScanAt: string | null
}

export const TRUST_WORDS: Record<Trust, string> = {
  reject: 'reject',
  caution: 'caution',
  note: 'note',
  none: 'no findings',
  unmeasured: 'no scan',
}

export function rowOf({ device, matching, scanCount, lastScanAt }: DeviceSummary): DeviceRow {
  return {
    id: device.id,
    name: device.name,
    sampleId: device.sampleId,
    series: device.series,
    junctions: matching.junctions.map(({ position, label, jscMaCm2 }) => ({ position, label, jscMaCm2 })),
    limiting: matching.limitingJunctions,
    limitingText: limitingText(matching),
    jLimMaCm2: matching.jLimMaCm2,
    mismatchPercent: matching.mismatchPercent,
    trust: matching.worstFinding ?? (scanCount > 0 ? 'none' : 'unmeasured'),
    scanCount,
    lastScanAt,
  }
}

function limitingText(matching: DeviceSummary['matching']): string {
  if (matching.wiring === 'independent') return 'independent'
  if (!matching.complete) {
    const open = matching.junctions.filter((junction) => junction.jscMaCm2 === null).map((junction) => junction.label)
    return open.length > 0 ? `needs ${open.join(', ')}` : 'incomplete'
  }
  const names = matching.limitingJunctions.map((position) => {
    const junction = matching.junctions.find((one) => one.position === position)
    return `${position} ${junction?.label ?? ''}`.trim()
  })
  return names.length > 1 ? `tie: ${names.join(', ')}` : (names[0] ?? '–')
}

export interface RowFilter {
  search: string
  series: string
  trust: string
  limiting: string
}

export function filteredRows(rows: readonly DeviceRow[], filter: RowFilter): DeviceRow[] {
  const words = filter.search.toLocaleLowerCase().split(/\s+/).filter(Boolean)
  return rows.filter((row) => {
    const text = `${row.name} ${row.sampleId} ${row.series} ${row.limitingText}`.toLocaleLowerCase()
    return (
      words.every((word) => text.includes(word)) &&
      (filter.series === '' || row.series === filter.series) &&
      (filter.trust === '' || row.trust === filter.trust) &&
      (filter.limiting === '' || row.limitingText === filter.limiting)
    )
  })
}

export const SORT_COLUMNS = ['name', 'series', 'current', 'limiting', 'mismatch', 'trust', 'last-scan'] as const
export type SortColumn = (typeof SORT_COLUMNS)[number]
export interface Sorting {
  column: SortColumn
  descending: boolean
}

/** `mismatch` ascending, `-mismatch` descending, as the address keeps it. */
export function sortingOf(text: string): Sorting {
  const descending = text.startsWith('-')
  const column = SORT_COLUMNS.find((one) => one === text.replace(/^-/, ''))
  return column ? { column, descending } : { column: 'name', descending: false }
}

const TRUST_ORDER: Trust[] = ['reject', 'caution', 'note', 'none', 'unmeasured']
const collator = new Intl.Collator('en', { numeric: true, sensitivity: 'base' })
const KEYS: Record<SortColumn, (row: DeviceRow) => string | number | null> = {
  name: (row) => row.name,
  series: (row) => row.series || null,
  current: (row) => row.jLimMaCm2,
  limiting: (row) => row.limitingText,
  mismatch: (row) => row.mismatchPercent,
  trust: (row) => TRUST_ORDER.indexOf(row.trust),
  'last-scan': (row) => row.lastScanAt,
}

/** Rows without a value come last in either direction; equal rows by name, `A2` before `A10`. */
export function sortedRows(rows: readonly DeviceRow[], { column, descending }: Sorting): DeviceRow[] {
  const key = KEYS[column]
  return [...rows].sort((a, b) => {
    const [left, right] = [key(a), key(b)]
    if (left === null || right === null) {
      if (left === right) return collator.compare(a.name, b.name)
      return left === null ? 1 : -1
    }
    const order =
      typeof left === 'number' && typeof right === 'number'
        ? left - right
        : collator.compare(String(left), String(right))
    return (descending ? -order : order) || collator.compare(a.name, b.name)
  })
}

/** The table as a spreadsheet pastes it: tab-separated, decimal points, units in the header. */
export function tableText(rows: readonly DeviceRow[]): string {
  const most = Math.max(0, ...rows.map((row) => row.junctions.length))
  const positions = Array.from({ length: most }, (_, i) => i + 1)
  const header = [
    'Device',
    'Sample',
    'Series',
    ...positions.map((position) => `J junction ${position} (mA/cm²)`),
    'Limiting',
    'J limiting (mA/cm²)',
    'Mismatch (%)',
    'Findings',
    'Scans',
    'Last scan (UTC)',
  ]
  const number = (value: number | null | undefined, digits: number) =>
    value === null || value === undefined ? '' : value.toFixed(digits)
  const lines = rows.map((row) => [
    row.name,
    row.sampleId,
    row.series,
    ...positions.map((position) => number(row.junctions.find((one) => one.position === position)?.jscMaCm2, 3)),
    row.limitingText,
    number(row.jLimMaCm2, 3),
    number(row.mismatchPercent, 2),
    TRUST_WORDS[row.trust],
    String(row.scanCount),
    row.lastScanAt ?? '',
  ])
  return [header, ...lines].map((cells) => cells.map((cell) => cell.replace(/[\t\r\n]+/g, ' ')).join('\t')).join('\n')
}
