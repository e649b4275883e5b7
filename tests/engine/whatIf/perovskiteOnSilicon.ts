import { absorptionPerCm } from '../../../shared/physics/absorption/index.js'
import { makeCurve, type Curve } from '../../../shared/physics/curve.js'
import { beerLambertStack } from '../../../shared/physics/optics/index.js'
import type { DeviceModel, WhatIfInput } from '../../../shared/physics/whatIf/index.js'

/** Light of a 5800 K black body at about one sun, 280 to 1400 nm. */
export const sunlight: Curve = makeCurve(
  Array.from({ length: 561 }, (_, i) => 280 + 2 * i),
  Array.from({ length: 561 }, (_, i) => {
    const nm = 280 + 2 * i
    return 8.2e15 / nm ** 5 / Math.expm1(14_387_769 / (nm * 5800))
  }),
)

const topEdge = { bandGapEv: 1.68, alpha0PerCm: 150_000, urbachMev: 15 }
/** An edge of our own with the strength of a wafer: the forms matter here, not silicon's own numbers. */
const waferEdge = { bandGapEv: 1.12, alpha0PerCm: 2_000, urbachMev: 30 }

export const device: DeviceModel = {
  junctions: [
    { thicknessNm: 500, absorber: topEdge },
    { thicknessNm: 150_000, pathFactor: 2, absorber: waferEdge },
  ],
  layers: [
    { name: 'coating', thicknessNm: 100, material: 1.38 },
    { junction: 1 },
    { name: 'contact', thicknessNm: 20, material: 1.9 },
    { junction: 2, coherent: false },
  ],
  exit: 1.5,
}

const grid = (from: number, to: number, step: number): Float64Array =>
  Float64Array.from({ length: Math.floor((to - from) / step) + 1 }, (_, i) => from + i * step)

/** Scans that the Beer–Lambert model itself would give, times a collection efficiency that varies with wavelength. */
function scan(junction: 0 | 1, wavelengthNm: Float64Array): Curve {
  const { absorptance } = beerLambertStack([
    { alphaPerCm: absorptionPerCm({ kind: 'edge', edge: topEdge }, wavelengthNm), thicknessNm: 500 },
    {
      alphaPerCm: absorptionPerCm({ kind: 'edge', edge: waferEdge }, wavelengthNm),
      thicknessNm: 150_000,
      pathFactor: 2,
    },
  ])
  return makeCurve(
    wavelengthNm,
    absorptance[junction]!.map((a, i) => a * (0.93 - 0.05 * Math.sin(wavelengthNm[i]! / 90))),
  )
}

export const eqe: readonly Curve[] = [scan(0, grid(300, 800, 5)), scan(1, grid(320, 1190, 5))]

export const input: WhatIfInput = { device, eqe, spectrum: sunlight, materials: {} }
