import { junctionDash } from '../../../shared/charts/eqeChart.js'
import type { LineSeries } from '../../../shared/charts/lineChart.geometry.js'
import type { DeviceSummary } from '../../../shared/contract/matching.js'

/** What was varied in a series, and the currents over it. */
export interface SeriesTrend {
  label: string
  unit: string
  lines: LineSeries[]
  /** A little wider than what was varied. */
  range: [number, number]
  /** From a little below the smallest current to a little above the largest, mA/cm². */
  domain: [number, number]
}

interface Parameter {
  label: string
  unit: string
  of: (summary: DeviceSummary) => number | null
}

/**
 * The thickness or gap split of a series: of all nominal thicknesses and gaps the one with the most different values
 * is the axis. Null when nothing was varied, or fewer than two devices have currents.
 */
export function trendOf(summaries: readonly DeviceSummary[]): SeriesTrend | null {
  const first = summaries[0]
  if (!first) return null
  const parameters = first.device.junctions.flatMap((junction, i): Parameter[] => [
    {
      label: `Thickness of ${junction.position} ${junction.label}`,
      unit: 'nm',
      of: ({ device }) => device.junctions[i]?.thicknessNm ?? null,
    },
    {
      label: `Nominal gap of ${junction.position} ${junction.label}`,
      unit: 'eV',
      of: ({ device }) => device.junctions[i]?.nominalGapEv ?? null,
    },
  ])
  const measured = summaries.filter(({ matching }) => matching.junctions.some((one) => one.jscMaCm2 !== null))
  const spread = parameters
    .map((parameter) => ({ parameter, values: new Set(measured.map(parameter.of).filter((one) => one !== null)).size }))
    .sort((a, b) => b.values - a.values)[0]
  if (!spread || spread.values < 2) return null
  const { parameter } = spread
  const lines = first.device.junctions.map(({ position, label }): LineSeries => {
    const points = measured
      .flatMap((summary) => {
        const x = parameter.of(summary)
        const y = summary.matching.junctions.find((one) => one.position === position)?.jscMaCm2 ?? null
        return x === null || y === null ? [] : [{ x, y }]
      })
      .sort((a, b) => a.x - b.x)
    return {
      id: `junction-${position}`,
      label: `${position} ${label}`,
      x: points.map((point) => point.x),
      y: points.map((point) => point.y),
      unit: 'mA/cm²',
      paint: { kind: 'junction', position },
      dash: junctionDash(position),
      digits: 2,
      labelAt: 'end',
      dots: true,
    }
  })
  const drawn = lines.filter((line) => line.x.length > 1)
  const currents = drawn.flatMap((line) => Array.from(line.y))
  if (currents.length === 0) return null
  const [low, high] = [Math.min(...currents), Math.max(...currents)]
  const varied = drawn.flatMap((line) => Array.from(line.x))
  const [from, to] = [Math.min(...varied), Math.max(...varied)]
  const aside = 0.03 * (to - from)
  const margin = Math.max(0.15 * (high - low), 0.05)
  return {
    label: parameter.label,
    unit: parameter.unit,
    lines: drawn,
    range: [from - aside, to + aside],
    domain: [Math.max(0, low - margin), high + margin],
  }
}
