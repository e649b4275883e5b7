import { scaleLinear } from 'd3'
import type { Tick } from './lineChart.geometry.js'

/**
 * The ladder: one horizontal bar a junction from the sunward side down, as long as its current; the limiting bar
 * carries the accent, and a line at its end shows by how much the others exceed it.
 */
export interface LadderJunction {
  position: number
  label: string
  jscMaCm2: number | null
  /** Expanded uncertainty (k = 2), drawn as a whisker. */
  expandedUncertaintyMaCm2?: number | null
}

export interface LadderBar {
  junction: LadderJunction
  limiting: boolean
  x: number
  y: number
  width: number
  height: number
  whisker: { from: number; to: number } | null
  text: string
}

export interface LadderGeometry {
  bars: LadderBar[]
  limitX: number | null
  ticks: Tick[]
  plot: { left: number; right: number; top: number; bottom: number }
}

export interface LadderSpec {
  junctions: readonly LadderJunction[]
  limiting: readonly number[]
  width: number
  rowHeight: number
  /** Space for the junctions' labels on the left, px; none in the small ladder of a table row. */
  labelWidth: number
  /** Space for the numbers on the right, px. */
  valueWidth: number
  /** Longest bar, mA/cm²; of the ladder itself unless several ladders share one scale. */
  maximumMaCm2?: number
}

export function ladderGeometry(spec: LadderSpec): LadderGeometry {
  const currents = spec.junctions.flatMap((junction) => (junction.jscMaCm2 === null ? [] : [junction.jscMaCm2]))
  const whiskers = spec.junctions.map((j) => (j.jscMaCm2 ?? 0) + (j.expandedUncertaintyMaCm2 ?? 0))
  const maximum = spec.maximumMaCm2 ?? Math.max(0, ...currents, ...whiskers)
  const plot = {
    left: spec.labelWidth,
    right: Math.max(spec.labelWidth + 10, spec.width - spec.valueWidth),
    top: 0,
    bottom: spec.junctions.length * spec.rowHeight,
  }
  const scale = scaleLinear([0, maximum > 0 ? maximum : 1], [plot.left, plot.right])
  const gap = Math.max(1, Math.round(spec.rowHeight * 0.22))
  const bars = spec.junctions.map((junction, i): LadderBar => {
    const u = junction.expandedUncertaintyMaCm2 ?? null
    return {
      junction,
      limiting: spec.limiting.includes(junction.position),
      x: plot.left,
      y: i * spec.rowHeight + gap / 2,
      width: junction.jscMaCm2 === null ? 0 : Math.max(0, scale(junction.jscMaCm2) - plot.left),
      height: spec.rowHeight - gap,
      whisker:
        junction.jscMaCm2 === null || u === null
          ? null
          : { from: scale(Math.max(0, junction.jscMaCm2 - u)), to: scale(junction.jscMaCm2 + u) },
      text: junction.jscMaCm2 === null ? 'no scan' : junction.jscMaCm2.toFixed(2),
    }
  })
  const limitingBar = bars.find((bar) => bar.limiting && bar.junction.jscMaCm2 !== null)
  return {
    bars,
    limitX: limitingBar ? limitingBar.x + limitingBar.width : null,
    ticks: scale.ticks(4).map((value) => ({ at: scale(value), text: String(value) })),
    plot,
  }
}
