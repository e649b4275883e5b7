import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { analyseDevice } from '../../cli/analyse.js'
import { readDeviceFile } from '../../cli/deviceFile.js'
import { measuredDevice } from '../../cli/measuredDevice.js'
import { truthOfDevices, truthOfShapes } from '../../examples/truth.js'
import { referenceSpectrum } from '../../shared/physics/spectrum.js'
import { ROOT, tierlight } from './launch.js'

const EXAMPLES = join(ROOT, 'examples/files')
const wavelengths = Array.from({ length: 51 }, (_, i) => 300 + 10 * i)
const step = (edgeNm: number, from = 0) =>
  ['Wavelength (nm),EQE', ...wavelengths.map((nm) => `${nm},${nm >= from && nm <= edgeNm ? 0.8 : 0}`), ''].join('\n')

let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'tierlight-cli-'))
})
afterAll(() => rm(folder, { recursive: true }))

/** Writes files beside a device file with two junctions, and gives its path. */
async function device(files: Record<string, string>, change: object = {}): Promise<string> {
  const path = join(folder, 'device.json')
  const junctions = [
    { name: 'top', scan: 'top.csv' },
    { name: 'bottom', scan: 'bottom.csv' },
  ]
  await writeFile(path, JSON.stringify({ device: 'D', terminals: '2-terminal', junctions, ...change }))
  for (const [name, text] of Object.entries({ 'top.csv': step(600), 'bottom.csv': step(790, 610), ...files }))
    await writeFile(join(folder, name), text)
  return path
}

const analysed = async (path: string) =>
  analyseDevice(await measuredDevice(await readDeviceFile(path)), referenceSpectrum('AM1.5G'))

describe('analyse over the examples', () => {
  const shapes = truthOfShapes().map((truth) => ({
    ...truth,
    deviceFile: truth.file.replace(/\.[^.]*$/, '.device.json'),
  }))
  const devices = truthOfDevices().map((truth) => ({ ...truth, deviceFile: truth.file }))

  it.each([...shapes, ...devices])('$deviceFile gives the true currents', async (truth) => {
    const analysis = await analysed(join(EXAMPLES, truth.deviceFile))
    expect(analysis.junctions).toHaveLength(truth.jscMaCm2.length)
    analysis.junctions.forEach(({ jscMaCm2 }, i) =>
      expect(Math.abs(jscMaCm2 - truth.jscMaCm2[i]!)).toBeLessThan(truth.toleranceMaCm2),
    )
    expect(analysis.limitingJunction).toBe(truth.limitingJunction)
    if (truth.mismatchPercent === null) expect(analysis.mismatchPercent).toBeNull()
    else expect(analysis.mismatchPercent).toBeCloseTo(truth.mismatchPercent, 2)
  })

  it('names the faults of the device that was measured badly', async () => {
    const { findings } = await analysed(join(EXAMPLES, 'measured-badly/device.json'))
    const names = findings.map((finding) => `${finding.check} ${finding.junction}`)
    expect(names).toEqual(
      expect.arrayContaining(['chopper-near-mains 1', 'chopper-near-mains 2', 'bias-light-too-weak 1', 'leakage 2']),
    )
  })
})

describe('the launcher', () => {
  it('prints a table for people', async () => {
    const { code, out, err } = await tierlight('analyse', join(EXAMPLES, 'tandem/device.json'))
    expect({ code, err }).toEqual({ code: 0, err: '' })
    expect(out).toContain('under AM1.5G, 1000.37 W/m²')
    expect(out).toMatch(/^2 +bottom +18\.38\d/m)
    expect(out).toContain('Junction 2 (bottom) limits; mismatch 3.65 %.')
  })

  it('prints one object with --json, and counts under a spectrum from a file', async () => {
    const path = join(EXAMPLES, 'tandem/device.json')
    const [named, fromFile] = await Promise.all([
      tierlight('analyse', path, '--spectrum', 'AM1.5D', '--json'),
      tierlight('analyse', path, '--json', '--spectrum', join(EXAMPLES, 'spectrum/direct.txt')),
    ])
    const direct = JSON.parse(named.out)
    expect(Object.keys(direct)).toEqual(['spectrum', 'junctions', 'limitingJunction', 'mismatchPercent', 'findings'])
    expect(Object.keys(direct.junctions[0])).toEqual(['name', 'jscMaCm2', 'bandGapEv', 'rangeNm', 'points'])
    expect(direct).toMatchObject({ spectrum: 'AM1.5D', limitingJunction: 1 })
    const other = JSON.parse(fromFile.out)
    other.junctions.forEach((junction: { jscMaCm2: number }, i: number) =>
      expect(junction.jscMaCm2 / direct.junctions[i].jscMaCm2).toBeCloseTo(1, 5),
    )
  })

  it('says what is wrong with a bad file in one sentence with file, line and reason, and exits with 1', async () => {
    const path = await device({ 'bottom.csv': step(790, 610).replace('400,0', '400,NaN') })
    const { code, out, err } = await tierlight('analyse', path)
    expect({ code, out }).toEqual({ code: 1, out: '' })
    expect(err).toMatch(/^[^\n]*bottom\.csv, line 12: Line 12 has “NaN” in column “EQE” where a number should be\.\n$/)
  })

  it.each([
    [['analise', 'x.json'], /There is no command "analise"; there are: analyse/],
    [['analyse', 'x.json', '--colour'], /--colour/],
    [['analyse'], /One file is wanted, 0 were given/],
  ])('refuses %j with exit code 2', async (args, sentence) => {
    const { code, err } = await tierlight(...args)
    expect(code).toBe(2)
    expect(err).toMatch(sentence)
  })

  it('shows its commands with --help', async () => {
    const { code, out } = await tierlight('--help')
    expect(code).toBe(0)
    expect(out).toContain('tierlight analyse device.json [--spectrum AM1.5G|AM1.5D|AM0|FILE] [--json]')
  })
})

describe('what a device file may say', () => {
  it('independent junctions are not matched', async () => {
    const analysis = await analysed(await device({}, { terminals: '4-terminal' }))
    expect(analysis).toMatchObject({ limitingJunction: null, mismatchPercent: null })
    expect(analysis.junctions).toHaveLength(2)
  })

  it('a stated unit holds against the header', async () => {
    const micrometres = step(600).replace(/^\d+/gm, (nm) => String(Number(nm) / 1000))
    const files = { 'top.csv': micrometres }
    const plain = await analysed(await device({}))
    await expect(analysed(await device(files))).rejects.toThrow(/top\.csv, line 2: .*0\.3 nm/)
    const junctions = [
      { name: 'top', scan: 'top.csv', units: { wavelength: 'um' } },
      { name: 'bottom', scan: 'bottom.csv' },
    ]
    const stated = await analysed(await device(files, { junctions }))
    expect(stated.junctions[0]!.jscMaCm2).toBeCloseTo(plain.junctions[0]!.jscMaCm2, 10)
  })

  it('a column that nobody could guess is named', async () => {
    const text = step(600).replace('Wavelength (nm),EQE', 'Axis,Flag')
    const junctions = [
      { name: 'top', scan: 'top.csv', columns: { wavelength: 'Axis', eqe: 'flag' } },
      { name: 'bottom', scan: 'bottom.csv' },
    ]
    const plain = await analysed(await device({}))
    const named = await analysed(await device({ 'top.csv': text }, { junctions }))
    expect(named.junctions[0]!.jscMaCm2).toBe(plain.junctions[0]!.jscMaCm2)
  })

  it('scans one after the other in a file are refused, with the line where the second begins', async () => {
    const twice = step(600) + step(600).split('\n').slice(1).join('\n')
    await expect(analysed(await device({ 'top.csv': twice }))).rejects.toThrow(/top\.csv, line 53: .*2 scans/)
  })

  it('an unknown key, a missing file and broken JSON each get their sentence', async () => {
    await expect(analysed(await device({}, { junction: [] }))).rejects.toThrow(/device\.json.*junction/)
    const gone = { junctions: [{ name: 'top', scan: 'gone.csv' }] }
    await expect(analysed(await device({}, gone))).rejects.toThrow(/gone\.csv: there is no such file\./)
    await writeFile(join(folder, 'broken.json'), '{\n  "device": }')
    await expect(analysed(join(folder, 'broken.json'))).rejects.toThrow(/broken\.json, line 2: this is not valid JSON/)
  })
})
