import { describe, expect, it } from 'vitest'
import { lineChartGeometry, readingAt, unionOfX, type LineSeries } from '../../../shared/charts/lineChart.geometry.js'

const series = (change: Partial<LineSeries> = {}): LineSeries => ({
  id: 'a',
  label: '1 top',
  x: [300, 500, 700],
  y: [0, 80, 0],
  unit: '%',
  paint: { kind: 'junction', position: 1 },
  ...change,
})
const spec = { x: { label: 'Wavelength' }, left: { label: 'EQE (%)' }, width: 600, height: 300 }

describe('lineChartGeometry', () => {
  it('maps the first point to the left edge of the plot and zero to its foot', () => {
    const { plot, drawn, xScale, leftScale } = lineChartGeometry({ ...spec, series: [series()] })
    expect(drawn[0]!.path.startsWith(`M${plot.left},${plot.bottom}`)).toBe(true)
    expect(xScale(700)).toBeCloseTo(plot.right, 9)
    expect(leftScale(0)).toBeCloseTo(plot.bottom, 9)
  })

  it('interrupts a line where a value is missing', () => {
    const { drawn } = lineChartGeometry({ ...spec, series: [series({ x: [1, 2, 3, 4], y: [1, 1, NaN, 1] })] })
    expect(drawn[0]!.path.match(/M/g)).toHaveLength(2)
  })

  it('reads a right-axis series on its own scale', () => {
    const right = series({ id: 'flux', y: [0, 4, 0], axis: 'right' })
    const geometry = lineChartGeometry({ ...spec, right: { label: 'J', domain: [0, 8] }, series: [series(), right] })
    const middle = (geometry.plot.top + geometry.plot.bottom) / 2
    expect(geometry.rightScale!(4)).toBeCloseTo(middle, 9)
    expect(geometry.drawn[1]!.path).toContain(`,${middle}`)
  })

  it('sets the plateau label over the bright part of the curve, inside the plot', () => {
    const { drawn, plot, xScale } = lineChartGeometry({
      ...spec,
      x: { label: 'Wavelength', domain: [300, 1200] },
      series: [series({ x: [300, 400, 700, 740, 1200], y: [0, 90, 90, 0, 0], labelAt: 'plateau' })],
    })
    expect(drawn[0]!.label!.x).toBeCloseTo(xScale(537.84), 1)
    expect(drawn[0]!.label!.y).toBeGreaterThanOrEqual(plot.top)
  })

  it('moves labels apart that would stand on one another', () => {
    const { drawn } = lineChartGeometry({
      ...spec,
      series: [series({ labelAt: 'end' }), series({ id: 'b', label: '2 bottom', labelAt: 'end' })],
    })
    expect(Math.abs(drawn[0]!.label!.y - drawn[1]!.label!.y)).toBeGreaterThanOrEqual(15)
  })

  it('cuts bands to the plot and leaves out those outside', () => {
    const { bands, plot } = lineChartGeometry({
      ...spec,
      series: [series()],
      bands: [
        { from: 200, to: 500, label: 'a', kind: 'finding' },
        { from: 900, to: 1000, label: 'b', kind: 'finding' },
      ],
    })
    expect(bands).toHaveLength(1)
    expect(bands[0]!.x).toBe(plot.left)
  })

  it('stays drawable without any series', () => {
    const geometry = lineChartGeometry({ ...spec, series: [] })
    expect(geometry.drawn).toEqual([])
    expect(geometry.xScale.domain()).toEqual([0, 1])
  })
})

describe('readingAt', () => {
  it('is linear between points and null outside them', () => {
    expect(readingAt(series(), 400)).toBe(40)
    expect(readingAt(series(), 700)).toBe(0)
    expect(readingAt(series(), 299.9)).toBeNull()
    expect(readingAt(series({ x: [], y: [] }), 400)).toBeNull()
  })
})

it('unionOfX gives every wavelength once, ascending', () => {
  expect(unionOfX([series(), series({ x: [400, 500], y: [1, 2] })])).toEqual([300, 400, 500, 700])
})
