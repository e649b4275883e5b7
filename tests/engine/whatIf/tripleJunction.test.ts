import { describe, expect, it } from 'vitest'
import { absorptionPerCm } from '../../../shared/physics/absorption/index.js'
import { makeCurve } from '../../../shared/physics/curve.js'
import { beerLambertStack } from '../../../shared/physics/optics/index.js'
import {
  compileDevice,
  computeMap,
  evaluate,
  matchedLine,
  optimise,
  sweep,
  type WhatIfInput,
} from '../../../shared/physics/whatIf/index.js'
import { sunlight } from './perovskiteOnSilicon.js'

const edges = [
  { bandGapEv: 1.9, alpha0PerCm: 150_000, urbachMev: 15 },
  { bandGapEv: 1.5, alpha0PerCm: 120_000, urbachMev: 15 },
  { bandGapEv: 1.12, alpha0PerCm: 2000, urbachMev: 30 },
]
const thicknessNm = [300, 500, 150_000]
const wavelengthNm = Float64Array.from({ length: 300 }, (_, i) => 310 + 3 * i)
const { absorptance } = beerLambertStack(
  edges.map((edge, p) => ({
    alphaPerCm: absorptionPerCm({ kind: 'edge', edge }, wavelengthNm),
    thicknessNm: thicknessNm[p]!,
  })),
)
const input: WhatIfInput = {
  device: {
    junctions: edges.map((absorber, p) => ({ absorber, thicknessNm: thicknessNm[p]! })),
    layers: [
      { name: 'coating', thicknessNm: 90, material: 1.38 },
      { junction: 1 },
      { junction: 2 },
      { junction: 3, coherent: false },
    ],
    exit: 1.5,
    angleDeg: 30,
  },
  eqe: absorptance.map((a) =>
    makeCurve(
      wavelengthNm,
      a.map((x) => 0.9 * x),
    ),
  ),
  spectrum: sunlight,
  materials: {},
}
const compiled = compileDevice(input)

describe('three junctions', () => {
  it('a thicker middle cell takes from the bottom cell and leaves the top cell as it is', () => {
    const [before, after] = [evaluate(compiled, {}), evaluate(compiled, { '2.thicknessNm': 800 })]
    expect(after.junctions[0]!.eqe.values).toEqual(input.eqe[0]!.values)
    expect(after.currentsMaCm2[1]).toBeGreaterThan(before.currentsMaCm2[1]!)
    expect(after.currentsMaCm2[2]).toBeLessThan(before.currentsMaCm2[2]!)
  })

  it('a collection efficiency that is flat gives back the model at any thickness', () => {
    const changed = beerLambertStack(
      edges.map((edge, p) => ({
        alphaPerCm: absorptionPerCm({ kind: 'edge', edge }, wavelengthNm),
        thicknessNm: [350, 700, 100_000][p]!,
      })),
    )
    const result = evaluate(compiled, { '1.thicknessNm': 350, '2.thicknessNm': 700, '3.thicknessNm': 100_000 })
    result.junctions.forEach((junction, p) =>
      junction.eqe.values.forEach((value, i) =>
        expect(Math.abs(value - 0.9 * changed.absorptance[p]![i]!)).toBeLessThan(1e-12),
      ),
    )
  })

  it('maps with a third junction changed, and each pair has its own line', () => {
    const request = {
      x: { parameter: '1.thicknessNm', from: 50, to: 1200, points: 40 },
      y: { parameter: '2.thicknessNm', from: 100, to: 1500, points: 40 },
      change: { '3.pathFactor': 6 },
    }
    const map = computeMap(compiled, request)
    const index = 17 * 40 + 23
    const here = evaluate(compiled, {
      '3.pathFactor': 6,
      '1.thicknessNm': map.x.values[23]!,
      '2.thicknessNm': map.y.values[17]!,
    })
    map.currentsMaCm2.forEach((currents, p) => expect(currents[index]).toBeCloseTo(here.currentsMaCm2[p]!, 11))
    for (const pair of [
      [1, 2],
      [2, 3],
    ] as const) {
      const line = matchedLine(compiled, request, map, pair)
      expect(line.length).toBeGreaterThan(10)
      const { x, y } = line[Math.floor(line.length / 2)]!
      const { currentsMaCm2 } = evaluate(compiled, { '3.pathFactor': 6, '1.thicknessNm': x, '2.thicknessNm': y })
      expect(Math.abs(currentsMaCm2[pair[0] - 1]! - currentsMaCm2[pair[1] - 1]!)).toBeLessThan(1e-10)
    }
    expect(() => matchedLine(compiled, request, map, [1, 4])).toThrow(/the map has 3/)
  })

  it('the optimum over three thicknesses beats the sweep of each', () => {
    const parameters = ['1.thicknessNm', '2.thicknessNm', '3.thicknessNm'].map((parameter, p) => ({
      parameter,
      low: thicknessNm[p]! / 4,
      high: thicknessNm[p]! * 3,
    }))
    const found = optimise(compiled, { parameters, objective: 'limitingCurrent' })
    for (const { parameter, low, high } of parameters) {
      const along = sweep(compiled, { parameter, from: low, to: high, change: found.change })
      expect(found.objective).toBeGreaterThanOrEqual(along.optimum.limitingCurrentMaCm2 - 1e-6)
    }
  })

  it('with the transfer matrix at 30° a coating that is left out costs current in all', () => {
    const matrix = compileDevice({ ...input, model: 'transfer-matrix' })
    const bare = evaluate(matrix, { 'layer.coating.thicknessNm': 0 })
    expect(bare.currentsMaCm2.every((j, p) => j < matrix.measuredCurrentsMaCm2[p]!)).toBe(true)
    expect(matrix.parameters().map(({ key }) => key)).toContain('layer.coating.thicknessNm')
  })
})
