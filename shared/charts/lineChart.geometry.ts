import { area, line, scaleLinear, type ScaleLinear } from 'd3'

/**
 * Geometry of every chart with a continuous x axis: data → scales, ticks, paths, labels. Pure; drawn as SVG by the
 * client and as vectors in reports. Lengths are pixels (points in a PDF), y grows downwards.
 */

/** How a series is painted; the drawing side maps it to colours. */
export type Paint = { kind: 'junction'; position: number } | { kind: 'ink' | 'ink-soft' | 'limiting' | 'backdrop' }

export interface LineSeries {
  id: string
  label: string
  x: ArrayLike<number>
  y: ArrayLike<number>
  paint: Paint
  /** Unit of y, shown wherever a value is. */
  unit: string
  axis?: 'left' | 'right'
  shape?: 'line' | 'area'
  dash?: string
  strokeWidth?: number
  /** Where the direct label stands: above the curve's plateau, at either end, or nowhere. */
  labelAt?: 'plateau' | 'end' | 'start' | 'none'
  /** Digits after the point in readings; 3 unless said. */
  digits?: number
  /** Marks each point with a dot. */
  dots?: boolean
}

export interface ChartBand {
  from: number
  to: number
  label: string
  kind: 'finding' | 'selection' | 'window'
}

export interface ChartMark {
  x: number
  label: string
  kind: 'measured' | 'optimum' | 'matched'
}

export interface AxisSpec {
  label: string
  domain?: [number, number]
  /** Ticks wanted; the scale chooses round values near it. */
  ticks?: number
}

export interface LineChartSpec {
  series: readonly LineSeries[]
  x: AxisSpec
  left: AxisSpec
  right?: AxisSpec
  bands?: readonly ChartBand[]
  marks?: readonly ChartMark[]
  width: number
  height: number
}

export interface Tick {
  at: number
  text: string
}

export interface DrawnSeries {
  series: LineSeries
  path: string
  dots: { x: number; y: number }[]
  label: { x: number; y: number; anchor: 'start' | 'middle' | 'end'; text: string } | null
}

export interface LineChartGeometry {
  plot: { left: number; top: number; right: number; bottom: number }
  xScale: ScaleLinear<number, number>
  leftScale: ScaleLinear<number, number>
  rightScale: ScaleLinear<number, number> | null
  xTicks: Tick[]
  leftTicks: Tick[]
  rightTicks: Tick[]
  drawn: DrawnSeries[]
  bands: { band: ChartBand; x: number; width: number }[]
  marks: { mark: ChartMark; x: number }[]
}

const MARGIN = { top: 18, bottom: 44, left: 58, withoutRightAxis: 18, withRightAxis: 62 }
/** Mean advance of a character in labels of 12 px, in px. */
const CHARACTER_PX = 6.6
const LABEL_HEIGHT_PX = 15

export function lineChartGeometry(spec: LineChartSpec): LineChartGeometry {
  const plot = {
    left: MARGIN.left,
    top: MARGIN.top,
    right: Math.max(MARGIN.left + 40, spec.width - (spec.right ? MARGIN.withRightAxis : MARGIN.withoutRightAxis)),
    bottom: Math.max(MARGIN.top + 40, spec.height - MARGIN.bottom),
  }
  const onAxis = (axis: 'left' | 'right') => spec.series.filter((series) => (series.axis ?? 'left') === axis)
  const xScale = scaleLinear(spec.x.domain ?? extentOf(spec.series, 'x', false), [plot.left, plot.right])
  const leftScale = scaleLinear(spec.left.domain ?? extentOf(onAxis('left'), 'y', true), [plot.bottom, plot.top])
  const rightScale = spec.right
    ? scaleLinear(spec.right.domain ?? extentOf(onAxis('right'), 'y', true), [plot.bottom, plot.top])
    : null

  const drawn = spec.series.map((series) =>
    drawSeries(series, xScale, rightScale && series.axis === 'right' ? rightScale : leftScale, plot),
  )
  spreadLabels(drawn, plot)
  return {
    plot,
    xScale,
    leftScale,
    rightScale,
    xTicks: ticksOf(xScale, spec.x.ticks ?? Math.max(2, Math.floor((plot.right - plot.left) / 80))),
    leftTicks: ticksOf(leftScale, spec.left.ticks ?? 5),
    rightTicks: rightScale ? ticksOf(rightScale, spec.right?.ticks ?? 5) : [],
    drawn,
    bands: (spec.bands ?? []).flatMap((band) => {
      const from = clamp(xScale(band.from), plot.left, plot.right)
      const to = clamp(xScale(band.to), plot.left, plot.right)
      const outside =
        Math.max(band.from, band.to) < xScale.domain()[0]! || Math.min(band.from, band.to) > xScale.domain()[1]!
      return outside ? [] : [{ band, x: Math.min(from, to), width: Math.max(2, Math.abs(to - from)) }]
    }),
    marks: (spec.marks ?? [])
      .filter((mark) => mark.x >= xScale.domain()[0]! && mark.x <= xScale.domain()[1]!)
      .map((mark) => ({ mark, x: xScale(mark.x) })),
  }
}

/** Value of a series at x, linear between its points; null outside them. Works for ascending x. */
export function readingAt(series: LineSeries, x: number): number | null {
  const n = series.x.length
  if (n === 0 || !(x >= series.x[0]! && x <= series.x[n - 1]!)) return null
  let low = 0
  let high = n - 1
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (series.x[middle]! <= x) low = middle
    else high = middle
  }
  const x0 = series.x[low]!
  const x1 = series.x[high]!
  const y0 = series.y[low]!
  const y1 = series.y[high]!
  return x1 === x0 ? y0 : y0 + ((x - x0) / (x1 - x0)) * (y1 - y0)
}

/** All distinct x of the series, ascending: the rows of the table twin and the stops of the keyboard cursor. */
export function unionOfX(series: readonly LineSeries[]): number[] {
  const all = new Set<number>()
  for (const one of series) for (let i = 0; i < one.x.length; i++) all.add(one.x[i]!)
  return [...all].sort((a, b) => a - b)
}

function drawSeries(
  series: LineSeries,
  xScale: ScaleLinear<number, number>,
  yScale: ScaleLinear<number, number>,
  plot: LineChartGeometry['plot'],
): DrawnSeries {
  const indices = Array.from({ length: series.x.length }, (_, i) => i)
  const defined = (i: number) => Number.isFinite(series.y[i]!)
  const x = (i: number) => round(xScale(series.x[i]!))
  const y = (i: number) => round(yScale(series.y[i]!))
  const path =
    series.shape === 'area'
      ? area<number>()
          .defined(defined)
          .x(x)
          .y0(round(yScale(0)))
          .y1(y)(indices)
      : line<number>().defined(defined).x(x).y(y)(indices)
  return {
    series,
    path: path ?? '',
    dots: series.dots ? indices.filter(defined).map((i) => ({ x: x(i), y: y(i) })) : [],
    label: labelOf(series, xScale, yScale, plot),
  }
}

function labelOf(
  series: LineSeries,
  xScale: ScaleLinear<number, number>,
  yScale: ScaleLinear<number, number>,
  plot: LineChartGeometry['plot'],
): DrawnSeries['label'] {
  const place = series.labelAt ?? 'end'
  const n = series.x.length
  if (place === 'none' || n === 0) return null
  const half = (series.label.length * CHARACTER_PX) / 2
  if (place === 'plateau') {
    const centre = plateauCentre(series)
    const x = clamp(xScale(centre), plot.left + half + 2, plot.right - half - 2)
    const top = clamp(yScale(readingAt(series, centre) ?? 0) - 8, plot.top + 10, plot.bottom - 4)
    return { x: round(x), y: round(top), anchor: 'middle', text: series.label }
  }
  const i = place === 'start' ? 0 : n - 1
  const x = clamp(xScale(series.x[i]!), plot.left + 4, plot.right - 4)
  const y = clamp(yScale(series.y[i]!) - 6, plot.top + 10, plot.bottom - 4)
  return { x: round(x), y: round(y), anchor: place === 'start' ? 'start' : 'end', text: series.label }
}

/** Wavelength in the middle of the part of a curve that lies above 70 % of its maximum, weighted by value. */
function plateauCentre(series: LineSeries): number {
  let maximum = -Infinity
  for (let i = 0; i < series.y.length; i++) maximum = Math.max(maximum, series.y[i]!)
  let weight = 0
  let sum = 0
  for (let i = 0; i < series.y.length; i++) {
    const y = series.y[i]!
    if (y < 0.7 * maximum) continue
    const w = Math.max(y, 0) * ((series.x[Math.min(i + 1, series.x.length - 1)]! - series.x[Math.max(i - 1, 0)]!) / 2)
    weight += w
    sum += w * series.x[i]!
  }
  return weight > 0 ? sum / weight : series.x[0]!
}

/** Moves labels that would stand on one another apart, upwards first, staying inside the plot. */
function spreadLabels(drawn: DrawnSeries[], plot: LineChartGeometry['plot']): void {
  const placed: NonNullable<DrawnSeries['label']>[] = []
  for (const { label } of drawn) {
    if (!label) continue
    const preferred = label.y
    const candidates = [0, -1, 1, -2, 2, -3, 3].map((step) => preferred + step * LABEL_HEIGHT_PX)
    const free = candidates.find(
      (y) => y >= plot.top + 8 && y <= plot.bottom - 2 && !placed.some((other) => overlaps({ ...label, y }, other)),
    )
    if (free !== undefined) label.y = round(free)
    placed.push(label)
  }
}

function overlaps(a: NonNullable<DrawnSeries['label']>, b: NonNullable<DrawnSeries['label']>): boolean {
  const span = (label: NonNullable<DrawnSeries['label']>): [number, number] => {
    const width = label.text.length * CHARACTER_PX
    if (label.anchor === 'middle') return [label.x - width / 2, label.x + width / 2]
    return label.anchor === 'start' ? [label.x, label.x + width] : [label.x - width, label.x]
  }
  const [aFrom, aTo] = span(a)
  const [bFrom, bTo] = span(b)
  return aFrom < bTo && bFrom < aTo && Math.abs(a.y - b.y) < LABEL_HEIGHT_PX
}

function ticksOf(scale: ScaleLinear<number, number>, count: number): Tick[] {
  const format = scale.tickFormat(count)
  return scale.ticks(count).map((value) => ({ at: round(scale(value)), text: format(value).replaceAll(',', '') }))
}

function extentOf(series: readonly LineSeries[], key: 'x' | 'y', fromZero: boolean): [number, number] {
  let low = Infinity
  let high = -Infinity
  for (const one of series) {
    const values = one[key]
    for (let i = 0; i < values.length; i++) {
      const value = values[i]!
      if (!Number.isFinite(value)) continue
      if (value < low) low = value
      if (value > high) high = value
    }
  }
  if (!(low <= high)) return [0, 1]
  if (fromZero) low = Math.min(0, low)
  if (low === high) return [low - 0.5, high + 0.5]
  return fromZero ? [low, high + (high - low) * 0.08] : [low, high]
}

function clamp(value: number, low: number, high: number): number {
  return Math.min(Math.max(value, low), high)
}

function round(value: number): number {
  return Math.round(value * 100) / 100
}
