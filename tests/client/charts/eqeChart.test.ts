import { describe, expect, it } from 'vitest'
import { absorbableSeries, eqeSeries, junctionDash, sumSeries } from '../../../shared/charts/eqeChart.js'
import { ladderGeometry } from '../../../shared/charts/ladder.geometry.js'
import { chartTable, delimited } from '../../../shared/charts/table.js'

const top = { position: 1, label: 'top', wavelengthNm: [300, 700], eqe: [0.8, 0.6] }
const bottom = { position: 2, label: 'bottom', wavelengthNm: [600, 1000], eqe: [0, 0.8] }

describe('series of the device chart', () => {
  it('shows fractions as percent and gives each junction its own dash', () => {
    expect(Array.from(eqeSeries(top).y)).toEqual([80, 60])
    expect(new Set([1, 2, 3, 4].map(junctionDash)).size).toBe(4)
  })

  it('adds the curves up on all their wavelengths, each as zero outside its range', () => {
    const sum = sumSeries([top, bottom])
    expect(Array.from(sum.x)).toEqual([300, 600, 700, 1000])
    expect(Array.from(sum.y).map((y) => Math.round(y * 1e6) / 1e6)).toEqual([80, 65, 80, 80])
  })

  it('turns reflectance into what could be absorbed', () => {
    expect(Array.from(absorbableSeries([400, 500], [0.1, 0.25]).y)).toEqual([90, 75])
  })
})

describe('ladder', () => {
  const spec = { limiting: [2], width: 300, rowHeight: 20, labelWidth: 100, valueWidth: 50 }

  it('draws bars in proportion to the currents and marks the one that limits', () => {
    const { bars, limitX } = ladderGeometry({
      ...spec,
      junctions: [
        { position: 1, label: 'top', jscMaCm2: 20 },
        { position: 2, label: 'bottom', jscMaCm2: 15 },
      ],
    })
    expect(bars[1]!.width / bars[0]!.width).toBeCloseTo(0.75, 9)
    expect(bars.map((bar) => bar.limiting)).toEqual([false, true])
    expect(limitX).toBeCloseTo(100 + bars[1]!.width, 9)
  })

  it('says where a junction has no scan, and draws no limit without one', () => {
    const { bars, limitX } = ladderGeometry({
      ...spec,
      limiting: [],
      junctions: [{ position: 1, label: 'top', jscMaCm2: null }],
    })
    expect(bars[0]).toMatchObject({ text: 'no scan', width: 0 })
    expect(limitX).toBeNull()
  })

  it('draws the whisker of an expanded uncertainty', () => {
    const { bars } = ladderGeometry({
      ...spec,
      junctions: [{ position: 1, label: 'top', jscMaCm2: 10, expandedUncertaintyMaCm2: 1 }],
    })
    const { from, to } = bars[0]!.whisker!
    expect((to - from) / (bars[0]!.width / 10)).toBeCloseTo(2, 9)
  })
})

describe('table twin', () => {
  it('has a row for each wavelength and nothing where a curve ends', () => {
    const table = chartTable([eqeSeries(top), eqeSeries(bottom)], 'Wavelength (nm)')
    expect(table.headers).toEqual(['Wavelength (nm)', '1 top (%)', '2 bottom (%)'])
    expect(table.rows[0]).toEqual([300, 80, null])
    expect(delimited(table, ',').split('\r\n')[1]).toBe('300,80,')
  })

  it('quotes what a delimiter would break', () => {
    expect(delimited({ headers: ['a, "b"'], rows: [[1]] }, ',')).toBe('"a, ""b"""\r\n1\r\n')
  })
})
