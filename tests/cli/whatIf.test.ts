import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { WhatIfAnswer } from '../../cli/whatIf.js'
import { directGapAbsorptionPerCm } from '../../shared/physics/absorption/index.js'
import { PHOTON_ENERGY_NM_EV } from '../../shared/physics/constants.js'
import { shortCircuitCurrentDensity } from '../../shared/physics/currents.js'
import { makeCurve } from '../../shared/physics/curve.js'
import { referenceSpectrum } from '../../shared/physics/spectrum.js'
import { tierlight } from './launch.js'

const EDGE = { bandGapEv: 1.68, alpha0PerCm: 150000, urbachMev: 15 }
const topNm = Array.from({ length: 91 }, (_, i) => 300 + 5 * i)
const bottomNm = Array.from({ length: 141 }, (_, i) => 500 + 5 * i)
const alphaAt = (nm: number) => directGapAbsorptionPerCm(EDGE, PHOTON_ENERGY_NM_EV / nm)
const topEqe = topNm.map((nm) => 0.9 * (1 - Math.exp(-alphaAt(nm) * 500e-7)))
const bottomEqe = bottomNm.map((nm) => 0.85 * Math.exp(-alphaAt(nm) * 500e-7))
const csv = (nm: number[], eqe: number[]) =>
  ['Wavelength (nm),EQE', ...nm.map((x, i) => `${x},${eqe[i]}`), ''].join('\n')

const DEVICE = {
  device: 'D',
  terminals: '2-terminal',
  junctions: [
    { name: 'top', scan: 'top.csv', thicknessNm: 500, absorber: EDGE },
    { name: 'bottom', scan: 'bottom.csv', thicknessNm: 160000, absorber: { material: 'si-green-2008' } },
  ],
}
const LAYERS = [
  { name: 'Coating', thicknessNm: 100, material: 1.38 },
  { junction: 1 },
  { junction: 2, coherent: false },
]

let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'tierlight-what-if-'))
  await writeFile(join(folder, 'top.csv'), csv(topNm, topEqe))
  await writeFile(join(folder, 'bottom.csv'), csv(bottomNm, bottomEqe))
})
afterAll(() => rm(folder, { recursive: true }))

async function deviceFile(content: object = DEVICE): Promise<string> {
  const path = join(folder, 'device.json')
  await writeFile(path, JSON.stringify(content))
  return path
}
async function answered(...args: string[]): Promise<WhatIfAnswer> {
  const { code, out, err } = await tierlight('what-if', ...args, '--json')
  expect({ code, err }).toEqual({ code: 0, err: '' })
  return JSON.parse(out) as WhatIfAnswer
}

describe('what-if', () => {
  it('takes light from the bottom cell by the closed Beer–Lambert form', async () => {
    const { measured, changed } = await answered(await deviceFile(), '--set', '1.thicknessNm=560')
    const spectrum = referenceSpectrum('AM1.5G')
    const bottom = makeCurve(
      bottomNm,
      bottomEqe.map((eqe, i) => eqe * Math.exp(-alphaAt(bottomNm[i]!) * 60e-7)),
    )
    expect(changed.junctions[1]!.jscMaCm2).toBeCloseTo(shortCircuitCurrentDensity(bottom, spectrum), 10)
    expect(changed.junctions[0]!.jscMaCm2).toBeGreaterThan(measured.junctions[0]!.jscMaCm2 + 0.1)
    const currents = changed.junctions.map((one) => one.jscMaCm2)
    const least = Math.min(...currents)
    expect(changed.limitingJunction).toBe(currents.indexOf(least) + 1)
    expect(changed.mismatchPercent).toBeCloseTo((100 * (Math.max(...currents) - least)) / least, 9)
    expect(Object.keys(changed)).toEqual(Object.keys(measured))
  })

  it('gives the measured device, bit for bit, when nothing is set', async () => {
    const { measured, changed } = await answered(await deviceFile({ ...DEVICE, layers: LAYERS }))
    expect(changed.junctions.map((one) => one.jscMaCm2)).toEqual(measured.junctions.map((one) => one.jscMaCm2))
    expect(changed.mismatchPercent).toBe(measured.mismatchPercent)
  })

  it('changes a coating by the transfer matrix, and a path by Beer–Lambert', async () => {
    const file = await deviceFile({ ...DEVICE, layers: LAYERS })
    const coated = await answered(file, '--model', 'transfer-matrix', '--set', 'layer.Coating.thicknessNm=10')
    expect(coated.changed.junctions[0]!.jscMaCm2).not.toBe(coated.measured.junctions[0]!.jscMaCm2)
    const rough = await answered(file, '--set', '2.pathFactor=4')
    expect(rough.changed.junctions[0]!.jscMaCm2).toBe(rough.measured.junctions[0]!.jscMaCm2)
    expect(rough.changed.junctions[1]!.jscMaCm2).toBeGreaterThan(rough.measured.junctions[1]!.jscMaCm2)
  })

  it('prints both devices with their limiting junctions', async () => {
    const { code, out } = await tierlight('what-if', await deviceFile(), '--set', '1.thicknessNm=560')
    expect(code).toBe(0)
    expect(out).toContain('D under AM1.5G, beer-lambert: 1.thicknessNm = 560')
    expect(out).toMatch(/Measured: junction [12] \(\w+\) limits; mismatch \d+\.\d\d %/)
    expect(out).toMatch(/Changed: junction [12] \(\w+\) limits; mismatch \d+\.\d\d %/)
  })

  const without = (key: string) => ({
    ...DEVICE,
    junctions: [
      Object.fromEntries(Object.entries(DEVICE.junctions[0]!).filter(([name]) => name !== key)),
      DEVICE.junctions[1],
    ],
  })
  it.each<[object, string[], number, RegExp]>([
    [DEVICE, ['--set', '1.thickness=560'], 1, /"1\.thickness" is no parameter of this device; it has 1\.thicknessNm/],
    [DEVICE, ['--set', '1.thicknessNm=thick'], 2, /write a key and a number/],
    [DEVICE, ['--set', '1.thicknessNm=1', '--set', '1.thicknessNm=2'], 2, /gives 1\.thicknessNm twice/],
    [DEVICE, ['--set', '1.thicknessNm=-5'], 1, /1\.thicknessNm/],
    [DEVICE, ['--model', 'rays'], 2, /There is no model "rays"; there are: beer-lambert, transfer-matrix/],
    [DEVICE, ['--model', 'transfer-matrix'], 1, /has no "layers"/],
    [without('thicknessNm'), [], 1, /Junction 1 \("top"\) has no "thicknessNm"/],
    [without('absorber'), [], 1, /Junction 1 \("top"\) has no "absorber"; give/],
    [{ ...DEVICE, layers: [{ name: 'x' }] }, [], 1, /Layer 1 cannot be used; give/],
  ])('says in one sentence what is wrong: %#', async (content, args, exitCode, sentence) => {
    const { code, out, err } = await tierlight('what-if', await deviceFile(content), ...args)
    expect({ code, out }).toEqual({ code: exitCode, out: '' })
    expect(err).toMatch(sentence)
    expect(err.trimEnd().split('\n')).toHaveLength(1)
  })
})
