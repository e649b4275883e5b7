import { describe, expect, it } from 'vitest'
import {
  compileDevice,
  computeMap,
  evaluate,
  mapProgress,
  matchedLine,
  optimise,
  sensitivities,
  sweep,
  type MapRequest,
} from '../../../shared/physics/whatIf/index.js'
import { input } from './perovskiteOnSilicon.js'

const compiled = compileDevice(input)
const matrix = compileDevice({ ...input, model: 'transfer-matrix' })
const thicknessSweep = sweep(compiled, { parameter: '1.thicknessNm', from: 150, to: 1500 })
const thicknesses = (points: number): MapRequest => ({
  x: { parameter: '1.thicknessNm', from: 150, to: 1500, points },
  y: { parameter: '2.thicknessNm', from: 40_000, to: 300_000, points },
})

describe('sweep', () => {
  it('currents are those of the evaluation', () => {
    const i = 37
    const { currentsMaCm2 } = evaluate(compiled, { '1.thicknessNm': thicknessSweep.values[i]! })
    expect(thicknessSweep.currentsMaCm2.map((j) => j[i])).toEqual(currentsMaCm2)
  })

  it('the matching point is where the currents cross, and the optimum lies there', () => {
    expect(thicknessSweep.matchingPoints).toHaveLength(1)
    const [point] = thicknessSweep.matchingPoints
    const { currentsMaCm2 } = evaluate(compiled, { '1.thicknessNm': point!.value })
    expect(Math.abs(currentsMaCm2[0]! - currentsMaCm2[1]!)).toBeLessThan(1e-11)
    expect(thicknessSweep.optimum.value).toBeCloseTo(point!.value, 5)
    expect(thicknessSweep.optimum.limitingCurrentMaCm2).toBeGreaterThanOrEqual(
      Math.max(...thicknessSweep.limitingCurrentMaCm2),
    )
  })

  it('the process window ends where J_lim has lost one percent', () => {
    const { window, optimum } = thicknessSweep
    const at = (value: number): number => evaluate(compiled, { '1.thicknessNm': value }).limitingCurrentMaCm2
    expect(window.isOpenBelow || window.isOpenAbove).toBe(false)
    for (const end of [window.low, window.high]) expect(at(end) / optimum.limitingCurrentMaCm2).toBeCloseTo(0.99, 9)
    expect(window.low).toBeLessThan(optimum.value)
    expect(window.high).toBeGreaterThan(optimum.value)
  })

  it('refuses what is no sweep', () => {
    expect(() => sweep(compiled, { parameter: '1.thicknessNm', from: 5, to: 5 })).toThrow(/to is 5/)
    expect(() => sweep(compiled, { parameter: '1.thicknessNm', from: 1, to: 5, points: 2 })).toThrow(/points is 2/)
  })
})

describe('sensitivities', () => {
  it('are the slopes of the evaluation', () => {
    const all = sensitivities(compiled)
    expect(all.map(({ parameter }) => parameter)).toEqual(compiled.parameters().map(({ key }) => key))
    const top = all.find(({ parameter }) => parameter === '1.thicknessNm')!
    const slope = (p: number): number =>
      (evaluate(compiled, { '1.thicknessNm': 501 }).currentsMaCm2[p]! -
        evaluate(compiled, { '1.thicknessNm': 499 }).currentsMaCm2[p]!) /
      2
    for (const p of [0, 1]) expect(top.currentPerUnit[p]! / slope(p)).toBeCloseTo(1, 4)
    const gap = all.find(({ parameter }) => parameter === '1.bandGapEv')!
    expect(gap.currentPerUnit[0]).toBeLessThan(0)
    expect(gap.currentPerUnit[1]).toBeGreaterThan(0)
  })
})

describe('map', () => {
  const map = computeMap(compiled, { ...thicknesses(200), withEfficiency: true })

  it.each([
    ['two junctions', compiled, thicknesses(7)],
    ['with other changes', compiled, { ...thicknesses(7), change: { '1.bandGapEv': 1.7, '2.pathFactor': 4 } }],
    [
      'a gap that is lowered, against a thickness',
      compiled,
      {
        x: { parameter: '1.bandGapEv', from: 1.5, to: 1.8, points: 7 },
        y: { parameter: '2.thicknessNm', from: 5e4, to: 3e5, points: 5 },
      },
    ],
    [
      'two parameters of one junction',
      compiled,
      {
        x: { parameter: '1.bandGapEv', from: 1.55, to: 1.8, points: 5 },
        y: { parameter: '1.thicknessNm', from: 200, to: 900, points: 4 },
      },
    ],
    [
      'the transfer matrix with a coating',
      matrix,
      {
        x: { parameter: '1.thicknessNm', from: 300, to: 900, points: 4 },
        y: { parameter: 'layer.coating.thicknessNm', from: 0, to: 200, points: 3 },
      },
    ],
  ] as const)('equals the evaluation at every point: %s', (_, of, request: MapRequest) => {
    const small = computeMap(of, request)
    small.y.values.forEach((y, row) =>
      small.x.values.forEach((x, column) => {
        const change = { ...request.change, [small.x.parameter]: x, [small.y.parameter]: y }
        evaluate(of, change).currentsMaCm2.forEach((expected, p) => {
          const found = small.currentsMaCm2[p]![row * small.x.values.length + column]!
          expect(Math.abs(found - expected)).toBeLessThan(1e-11)
        })
      }),
    )
  })

  it.each([
    ['two thicknesses', map],
    [
      'a gap and a thickness',
      computeMap(compiled, {
        x: { parameter: '1.bandGapEv', from: 1.55, to: 1.8, points: 90 },
        y: { parameter: '2.thicknessNm', from: 5e4, to: 3e5, points: 80 },
      }),
    ],
    [
      'a thickness and a path factor',
      computeMap(compiled, {
        x: { parameter: '2.pathFactor', from: 1, to: 50, points: 120 },
        y: { parameter: '1.thicknessNm', from: 100, to: 2000, points: 70 },
      }),
    ],
  ])('a large one too, though its sums are shortened: %s', (_, large) => {
    const width = large.x.values.length
    for (let index = 0; index < large.mismatch.length; index += 631) {
      const [x, y] = [large.x.values[index % width]!, large.y.values[Math.floor(index / width)]!]
      const { currentsMaCm2 } = evaluate(compiled, { [large.x.parameter]: x, [large.y.parameter]: y })
      currentsMaCm2.forEach((expected, p) =>
        expect(Math.abs(large.currentsMaCm2[p]![index]! - expected)).toBeLessThan(1e-11),
      )
    }
  })

  it('comes from coarse to fine, can be stopped, and ends as the whole map', () => {
    const strides: number[] = []
    const passes = mapProgress(compiled, thicknesses(60))
    let step = passes.next()
    while (!step.done) {
      strides.push(step.value.stride)
      step = passes.next()
    }
    expect(strides[0]).toBe(16)
    expect([...strides]).toEqual([...strides].sort((a, b) => b - a))
    expect(step.value.currentsMaCm2).toEqual(computeMap(compiled, thicknesses(60)).currentsMaCm2)
    const stopped = mapProgress(compiled, thicknesses(60))
    stopped.next()
    stopped.return(step.value)
    expect(stopped.next().done).toBe(true)
  })

  it('the matched line passes through the matching point of the sweep', () => {
    const request = thicknesses(60)
    const line = matchedLine(compiled, request, computeMap(compiled, request))
    expect(line.length).toBeGreaterThan(30)
    for (const { x, y } of line.filter((_, i) => i % 9 === 0)) {
      const alongX = sweep(compiled, {
        parameter: '1.thicknessNm',
        from: 150,
        to: 1500,
        points: 41,
        change: { '2.thicknessNm': y },
      })
      expect(alongX.matchingPoints.some((point) => Math.abs(point.value - x) < 1e-8)).toBe(true)
    }
  })

  it.each(['limitingCurrent', 'efficiency', 'mismatch'] as const)('the optimum beats every point: %s', (objective) => {
    const found = optimise(compiled, {
      parameters: [
        { parameter: '1.thicknessNm', low: 150, high: 1500 },
        { parameter: '2.thicknessNm', low: 40_000, high: 300_000 },
      ],
      objective,
    })
    if (objective === 'mismatch') return expect(found.objective).toBeLessThanOrEqual(Math.min(...map.mismatch))
    const values = objective === 'efficiency' ? map.efficiency! : map.limitingCurrentMaCm2
    expect(found.objective).toBeGreaterThanOrEqual(values.reduce((a, b) => Math.max(a, b)))
    expect(found.path.at(-1)!.values).toEqual([found.change['1.thicknessNm'], found.change['2.thicknessNm']])
  })

  it('keeps to constraints', () => {
    const found = optimise(compiled, {
      parameters: [{ parameter: '1.thicknessNm', low: 150, high: 1500 }],
      objective: 'limitingCurrent',
      constraints: [{ quantity: { current: 2 }, atLeast: 1.05 * thicknessSweep.optimum.limitingCurrentMaCm2 }],
    })
    expect(found.result.currentsMaCm2[1]).toBeGreaterThanOrEqual(1.05 * thicknessSweep.optimum.limitingCurrentMaCm2)
    expect(found.objective).toBeLessThan(thicknessSweep.optimum.limitingCurrentMaCm2)
    expect(() =>
      optimise(compiled, {
        parameters: [{ parameter: '1.thicknessNm', low: 150, high: 1500 }],
        objective: 'limitingCurrent',
        constraints: [{ quantity: 'limitingCurrent', atLeast: 90 }],
      }),
    ).toThrow(/constraints/)
  })

  it('refuses one parameter on both axes', () => {
    const { x } = thicknesses(5)
    expect(() => computeMap(compiled, { x, y: x })).toThrow(/two parameters/)
  })
})
