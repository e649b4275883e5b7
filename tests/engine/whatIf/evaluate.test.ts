import { describe, expect, it, test } from 'vitest'
import { absorptionPerCm } from '../../../shared/physics/absorption/index.js'
import { makeCurve } from '../../../shared/physics/curve.js'
import { DomainError } from '../../../shared/physics/errors.js'
import { currentWeights, weightedSum } from '../../../shared/physics/uncertainty/currentWeights.js'
import { compileDevice, evaluate, type Change, type WhatIfInput } from '../../../shared/physics/whatIf/index.js'
import { device, eqe, input, sunlight } from './perovskiteOnSilicon.js'

const models = ['beer-lambert', 'transfer-matrix'] as const
const edge = { kind: 'edge', edge: { bandGapEv: 1.68, alpha0PerCm: 150_000, urbachMev: 15 } } as const

describe.each(models)('anchoring, %s', (model) => {
  const compiled = compileDevice({ ...input, model })

  it('nothing changed: the curves are the measured ones, bit for bit', () => {
    const unchanged: Change[] = [{}, { '1.thicknessNm': 500, '2.pathFactor': 2, '1.bandGapEv': 1.68 }]
    for (const change of unchanged) {
      const result = evaluate(compiled, change)
      result.junctions.forEach((junction, p) => {
        expect(junction.eqe.values).toEqual(eqe[p]!.values)
        expect(junction.continuedPartMaCm2).toBe(0)
        expect(junction.beyond).toBeNull()
        expect(junction.currentMaCm2).toBe(compiled.measuredCurrentsMaCm2[p])
      })
    }
  })

  it('an answer does not depend on those before it', () => {
    const change = { '1.thicknessNm': 430, '1.bandGapEv': 1.64 }
    const fresh = evaluate(compileDevice({ ...input, model }), change)
    evaluate(compiled, { '2.thicknessNm': 9e4, '1.bandGapEv': 1.75 })
    expect(evaluate(compiled, change)).toEqual(fresh)
  })

  it('a thicker top cell takes more and leaves less', () => {
    const before = evaluate(compiled, {})
    const after = evaluate(compiled, { '1.thicknessNm': 900 })
    expect(after.currentsMaCm2[0]).toBeGreaterThan(before.currentsMaCm2[0]!)
    expect(after.currentsMaCm2[1]).toBeLessThan(before.currentsMaCm2[1]!)
  })

  it('lowering a gap and raising it again returns the curve where nothing was continued', () => {
    // Scans that stay below what either model absorbs.
    const scans = eqe.map((c) =>
      makeCurve(
        c.wavelengthNm,
        c.values.map((x) => 0.5 * x),
      ),
    )
    const lowered = evaluate(compileDevice({ ...input, model, eqe: scans }), { '1.gapShiftEv': -0.05 })
    const [top, bottom] = device.junctions
    const again = compileDevice({
      ...input,
      model,
      eqe: lowered.junctions.map((junction) => junction.eqe),
      device: { ...device, junctions: [{ ...top!, gapShiftEv: -0.05 }, bottom!] },
    })
    const back = evaluate(again, { '1.bandGapEv': 1.68 })
    let compared = 0
    for (const p of [0, 1])
      back.junctions[p]!.eqe.values.forEach((value, i) => {
        if (lowered.junctions[p]!.continued[i]! > 0 || back.junctions[p]!.continued[i]! > 0) return
        compared++
        expect(Math.abs(value - scans[p]!.values[i]!)).toBeLessThan(1e-12)
      })
    expect(compared).toBeGreaterThan(200)
    expect(lowered.junctions[0]!.continuedPartMaCm2).toBeGreaterThan(0)
  })
})

describe('Beer–Lambert', () => {
  const compiled = compileDevice(input)

  test.each([60, 400, -120])('the bottom cell changes by exactly e^(−mαΔd): %d nm', (extra) => {
    const result = evaluate(compiled, { '1.thicknessNm': 500 + extra })
    const bottom = eqe[1]!
    const alpha = absorptionPerCm(edge, bottom.wavelengthNm)
    const closed = bottom.values.map((value, i) => value * Math.exp(-alpha[i]! * extra * 1e-7))
    const weights = currentWeights(bottom.wavelengthNm, sunlight)
    const expected = weightedSum(weights, closed) - weightedSum(weights, bottom.values)
    const change = result.currentsMaCm2[1]! - compiled.measuredCurrentsMaCm2[1]!
    expect(Math.abs(change - expected)).toBeLessThan(1e-12)
    expect(result.junctions[1]!.continuedPartMaCm2).toBe(0)
  })

  it('a lowered gap continues beyond the old edge and tells that part apart', () => {
    const result = evaluate(compiled, { '1.bandGapEv': 1.5 })
    const [top] = result.junctions
    expect(top!.continuedPartMaCm2).toBeGreaterThan(0.5)
    expect(top!.beyond!.wavelengthNm[0]).toBe(800)
    expect(top!.measuredPartMaCm2 + top!.continuedPartMaCm2).toBeCloseTo(top!.currentMaCm2, 12)
    // Where the new edge absorbs well, EQE' is the collection efficiency, near 0.9, times a high absorptance.
    expect(top!.eqe.values[top!.eqe.values.length - 1]).toBeGreaterThan(0.6)
    expect(Math.max(...top!.eqe.values)).toBeLessThan(1)
    expect(evaluate(compiled, { '1.bandGapEv': 1.8 }).junctions[0]!.continuedPartMaCm2).toBe(0)
  })

  it('a junction that stays as it was needs no data beyond its table', () => {
    const alpha = absorptionPerCm(edge, Float64Array.from([290, 500, 700, 830]))
    const shortTable = {
      wavelengthNm: [290, 500, 700, 830],
      n: [2, 2, 2, 2],
      k: Array.from(alpha, (a, i) => (a * [290, 500, 700, 830][i]!) / (4e7 * Math.PI)),
    }
    const short = compileDevice({
      ...input,
      device: { junctions: [{ thicknessNm: 500, absorber: shortTable }, device.junctions[1]!] },
    })
    expect(evaluate(short, { '2.thicknessNm': 1e5 }).currentsMaCm2[1]).toBeGreaterThan(1)
    expect(() => evaluate(short, { '1.thicknessNm': 560 })).toThrow(/junction 1 is known from 290 to 830 nm/)
  })
})

describe('a scan that collects more than the model absorbs', () => {
  const generous = compileDevice({
    ...input,
    eqe: eqe.map((c) =>
      makeCurve(
        c.wavelengthNm.map((nm) => nm + 12),
        c.values,
      ),
    ),
  })

  it('does not run above one when its gap is lowered or its path lengthened', () => {
    for (const change of [{ '1.bandGapEv': 1.6 }, { '2.pathFactor': 30 }] as Change[])
      for (const { eqe: curve } of evaluate(generous, change).junctions)
        expect(Math.max(...curve.values)).toBeLessThanOrEqual(1)
  })

  it('keeps the closed form of what passes through the junction above', () => {
    const bottom = evaluate(generous, { '1.thicknessNm': 430 }).junctions[1]!
    const alpha = absorptionPerCm(edge, bottom.eqe.wavelengthNm)
    bottom.eqe.values.forEach((value, i) =>
      expect(Math.abs(value - eqe[1]!.values[i]! * Math.exp(alpha[i]! * 70e-7))).toBeLessThan(1e-13),
    )
  })
})

describe('materials that end before the scan does', () => {
  const coating = { name: 'test coating', wavelengthNm: [340, 900, 1150], n: [1.4, 1.38, 1.38], k: [0, 0, 0] }
  const short: WhatIfInput = {
    ...input,
    model: 'transfer-matrix',
    materials: { coating },
    device: {
      ...device,
      layers: device.layers!.map((l) => ('name' in l && l.name === 'coating' ? { ...l, material: 'coating' } : l)),
    },
  }

  it('are refused with their range', () => {
    expect(() => compileDevice(short)).toThrow(/test coating is known from 340 to 1150 nm; it was asked for at 300 nm/)
  })

  it('or leave the measured EQE as it is where asked to, and tell where', () => {
    const result = evaluate(compileDevice({ ...short, outsideMaterials: 'keep-measured' }), { '1.thicknessNm': 300 })
    const bottom = result.junctions[1]!
    expect(bottom.keptMeasuredNm).toEqual([
      [320, 335],
      [1155, 1190],
    ])
    bottom.eqe.wavelengthNm.forEach((nm, i) => {
      if (nm < 340 || nm > 1150) expect(bottom.eqe.values[i]).toBe(eqe[1]!.values[i])
      else if (nm < 700) expect(bottom.eqe.values[i]).not.toBe(eqe[1]!.values[i])
    })
    expect(result.junctions[0]!.keptMeasuredNm).toEqual([[300, 335]])
  })
})

describe('figures of the stack', () => {
  const compiled = compileDevice(input)

  it('limiting junction, mismatch and the gain still open agree with the currents', () => {
    const result = evaluate(compiled, {})
    const [top, bottom] = result.currentsMaCm2
    expect(result.limitingJunctions).toEqual([top! < bottom! ? 1 : 2])
    expect(result.mismatch).toBeCloseTo(Math.abs(top! - bottom!) / Math.min(top!, bottom!), 14)
    expect(result.gainStillOpenMaCm2).toBeCloseTo(Math.abs(top! - bottom!) / 2, 13)
  })

  it('a wider gap raises the voltage, by somewhat less than the gap itself', () => {
    const before = evaluate(compiled, {}).power!
    const after = evaluate(compiled, { '1.bandGapEv': 1.72 }).power!
    expect(after.openCircuitV - before.openCircuitV).toBeGreaterThan(0.036)
    expect(after.openCircuitV - before.openCircuitV).toBeLessThan(0.04)
    expect(before.fillFactor).toBeGreaterThan(0.8)
    expect(evaluate(compiled, {}).assumptions.join(' ')).toContain('external radiative efficiency 0.001 assumed')
  })
})

test.each<[string, Partial<WhatIfInput>, RegExp]>([
  ['a missing scan', { eqe: [eqe[0]!] }, /1 EQE curves for 2 junctions/],
  [
    'an unknown material',
    { device: { junctions: [{ thicknessNm: 1, absorber: { material: 'x' } }] }, eqe: [eqe[0]!] },
    /1\.absorber\.material is "x"/,
  ],
  [
    'a thickness of zero',
    { device: { junctions: [{ ...device.junctions[0]!, thicknessNm: 0 }] }, eqe: [eqe[0]!] },
    /1\.thicknessNm is 0/,
  ],
  [
    'no layer for a junction',
    { model: 'transfer-matrix', device: { ...device, layers: [{ junction: 1 }] } },
    /"junction": 2/,
  ],
])('%s is refused', (_, change, message) => {
  expect(() => compileDevice({ ...input, ...change })).toThrow(DomainError)
  expect(() => compileDevice({ ...input, ...change })).toThrow(message)
})

test.each([
  ['3.thicknessNm', 1, /no parameter of this device; it has 1\.thicknessNm, 1\.bandGapEv/],
  ['1.colour', 1, /no parameter/],
  ['1.thicknessNm', -5, /1\.thicknessNm is -5/],
  ['layer.coating.thicknessNm', Number.NaN, /layer\.coating\.thicknessNm is NaN/],
])('a change of %s to %d is refused', (key, value, message) => {
  expect(() => evaluate(compileDevice(input), { [key]: value })).toThrow(message)
})

it('a scan with one dark junction is limited by it and has no power', () => {
  const dark = makeCurve(eqe[0]!.wavelengthNm, new Float64Array(eqe[0]!.values.length))
  const result = evaluate(compileDevice({ ...input, eqe: [dark, eqe[1]!] }), { '1.thicknessNm': 600 })
  expect(result.limitingJunctions).toEqual([1])
  expect(result.limitingCurrentMaCm2).toBe(0)
  expect(result.mismatch).toBe(Infinity)
  expect(result.power).toBeNull()
})
