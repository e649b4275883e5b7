import { describe, expect, test } from 'vitest'
import {
  filteredRows,
  rowOf,
  sortedRows,
  sortingOf,
  tableText,
  type DeviceRow,
} from '../../../src/views/project/deviceRows.js'
import { trendOf } from '../../../src/views/project/seriesTrend.js'
import { device, idOf, summary } from '../samples.js'

const none = { search: '', series: '', trust: '', limiting: '' }
const namesOf = (rows: readonly DeviceRow[]) => rows.map((row) => row.name)
const withThickness = (name: string, n: number, thicknessNm: number, currents: [number | null, number | null]) =>
  summary(
    {
      id: idOf(n),
      name,
      junctions: device().junctions.map((one, i) => (i === 0 ? { ...one, thicknessNm } : one)),
    },
    currents,
  )
const rows = [
  rowOf(summary({ id: idOf(1), name: 'T-10', series: 'thickness' }, [18.2, 20.4], { worstFinding: 'caution' })),
  rowOf(summary({ id: idOf(2), name: 'T-2', series: 'thickness' }, [20.0, 18.0])),
  rowOf(
    summary({ id: idOf(3), name: 'G-1', series: 'gap', sampleId: 'W 44' }, [null, null], {
      scanCount: 0,
      lastScanAt: null,
    }),
  ),
]

describe('a row', () => {
  test('names the junction that limits', () =>
    expect(rows.map((row) => row.limitingText)).toEqual(['1 top', '2 bottom', 'needs top, bottom']))
  test('an exact tie names both', () => expect(rowOf(summary({}, [19, 19])).limitingText).toBe('tie: 1 top, 2 bottom'))
  test('independent junctions limit nothing', () => {
    const four = summary({ terminals: '4-terminal' }, [18, 20])
    expect(
      rowOf({ ...four, matching: { ...four.matching, wiring: 'independent', limitingJunctions: [] } }).limitingText,
    ).toBe('independent')
  })
  test('no scan is not the same as no finding', () =>
    expect(rows.map((row) => row.trust)).toEqual(['caution', 'none', 'unmeasured']))
})

describe('finding rows', () => {
  test('every word has to be found, in any column', () => {
    expect(namesOf(filteredRows(rows, { ...none, search: 'thick TOP' }))).toEqual(['T-10'])
    expect(namesOf(filteredRows(rows, { ...none, search: 'w 44' }))).toEqual(['G-1'])
  })
  test('filters narrow each other', () =>
    expect(namesOf(filteredRows(rows, { ...none, series: 'thickness', trust: 'none' }))).toEqual(['T-2']))
})

describe('order', () => {
  test('names count as people do', () =>
    expect(namesOf(sortedRows(rows, sortingOf('name')))).toEqual(['G-1', 'T-2', 'T-10']))
  test.each([
    ['mismatch', ['T-2', 'T-10', 'G-1']],
    ['-mismatch', ['T-10', 'T-2', 'G-1']],
    ['last-scan', ['T-2', 'T-10', 'G-1']],
    ['trust', ['T-10', 'T-2', 'G-1']],
  ])('by %s, rows without a value last', (sorting, names) =>
    expect(namesOf(sortedRows(rows, sortingOf(sorting)))).toEqual(names),
  )
  test('an unknown column falls back to the name', () =>
    expect(sortingOf('-colour')).toEqual({ column: 'name', descending: false }))
})

test('the copied table has units in its header, decimal points and one line a device', () => {
  const [header, first, , third] = tableText(rows)
    .split('\n')
    .map((line) => line.split('\t'))
  expect(header?.slice(3, 5)).toEqual(['J junction 1 (mA/cm²)', 'J junction 2 (mA/cm²)'])
  expect(first?.slice(0, 8)).toEqual(['T-10', 'S-17', 'thickness', '18.200', '20.400', '1 top', '18.200', '12.09'])
  expect(third?.slice(3, 8)).toEqual(['', '', 'needs top, bottom', '', ''])
})
test('a tab in a name does not shift the columns', () => {
  const line = tableText([rowOf(summary({ name: 'a\tb' }, [18, 20]))]).split('\n')[1]
  expect(line?.split('\t')[0]).toBe('a b')
})

describe('the trend of a series', () => {
  const split = [
    withThickness('c', 3, 550, [19.6, 18.6]),
    withThickness('a', 1, 350, [17.1, 21.0]),
    withThickness('b', 2, 450, [18.5, 19.7]),
  ]
  test('is drawn over what was varied, in its order', () => {
    const trend = trendOf(split)
    expect(trend?.label).toBe('Thickness of 1 top')
    expect(trend?.unit).toBe('nm')
    expect(trend?.lines.map((line) => [line.id, Array.from(line.x), Array.from(line.y)])).toEqual([
      ['junction-1', [350, 450, 550], [17.1, 18.5, 19.6]],
      ['junction-2', [350, 450, 550], [21.0, 19.7, 18.6]],
    ])
    expect(trend!.domain[0]).toBeLessThan(17.1)
    expect(trend!.domain[1]).toBeGreaterThan(21)
  })
  test('leaves a junction without a scan out', () =>
    expect(
      trendOf(split.map((one, i) => (i === 0 ? withThickness('c', 3, 550, [19.6, null]) : one)))?.lines[1]?.x,
    ).toEqual([350, 450]))
  test('is null when nothing was varied or nothing measured', () => {
    expect(trendOf([summary({}, [18, 20]), summary({ id: idOf(9) }, [18, 20])])).toBeNull()
    expect(trendOf([350, 450].map((nm, i) => withThickness('x', i, nm, [null, null])))).toBeNull()
    expect(trendOf([])).toBeNull()
  })
})
