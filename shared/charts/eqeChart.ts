import type { LineSeries } from './lineChart.geometry.js'

/** Series of the device's main chart, in percent for the eye; the numbers come as fractions. */
export interface EqeCurve {
  position: number
  label: string
  wavelengthNm: ArrayLike<number>
  eqe: ArrayLike<number>
  /** Names the variant when several are overlaid, for example "measured". */
  variant?: { suffix: string; dash: string }
}

/** Line style of each junction beside its colour, so that colour never carries the meaning alone. */
export const JUNCTION_DASHES = ['', '7 3', '2 3', '9 3 2 3'] as const

export function junctionDash(position: number): string {
  return JUNCTION_DASHES[(position - 1) % JUNCTION_DASHES.length]!
}

export function eqeSeries(curve: EqeCurve): LineSeries {
  return {
    id: `eqe-${curve.position}${curve.variant ? `-${curve.variant.suffix}` : ''}`,
    label: `${curve.position} ${curve.label}${curve.variant ? `, ${curve.variant.suffix}` : ''}`,
    x: curve.wavelengthNm,
    y: percent(curve.eqe),
    unit: '%',
    digits: 1,
    paint: { kind: 'junction', position: curve.position },
    dash: curve.variant?.dash ?? junctionDash(curve.position),
    labelAt: curve.variant ? 'none' : 'plateau',
  }
}

/** 1 − R of a reflectance scan: what the stack could use at most. */
export function absorbableSeries(wavelengthNm: ArrayLike<number>, reflectance: ArrayLike<number>): LineSeries {
  return {
    id: 'one-minus-r',
    label: '1 − R',
    x: wavelengthNm,
    y: Float64Array.from(reflectance, (r) => 100 * (1 - r)),
    unit: '%',
    digits: 1,
    paint: { kind: 'ink-soft' },
    strokeWidth: 1,
    labelAt: 'end',
  }
}

/** Σ EQE on the union of the junctions' wavelengths; each curve counts as zero outside its range. */
export function sumSeries(curves: readonly EqeCurve[]): LineSeries {
  const grid = [...new Set(curves.flatMap((curve) => Array.from(curve.wavelengthNm)))].sort((a, b) => a - b)
  const y = new Float64Array(grid.length)
  for (const curve of curves) {
    let k = 0
    const n = curve.wavelengthNm.length
    grid.forEach((x, i) => {
      if (n < 2 || x < curve.wavelengthNm[0]! || x > curve.wavelengthNm[n - 1]!) return
      while (k < n - 2 && curve.wavelengthNm[k + 1]! < x) k++
      const t = (x - curve.wavelengthNm[k]!) / (curve.wavelengthNm[k + 1]! - curve.wavelengthNm[k]!)
      y[i] = y[i]! + 100 * (curve.eqe[k]! + t * (curve.eqe[k + 1]! - curve.eqe[k]!))
    })
  }
  return {
    id: 'sum',
    label: 'Σ EQE',
    x: grid,
    y,
    unit: '%',
    digits: 1,
    paint: { kind: 'ink' },
    strokeWidth: 1,
    dash: '1 3',
    labelAt: 'start',
  }
}

function percent(fraction: ArrayLike<number>): Float64Array {
  return Float64Array.from(fraction, (value) => 100 * value)
}
