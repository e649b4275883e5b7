import { cp, mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { PHOTON_ENERGY_NM_EV } from '../../shared/physics/constants.js'
import { ROOT, tierlight } from './launch.js'

let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'tierlight-measuring-'))
  await cp(join(ROOT, 'examples/files/tandem'), folder, { recursive: true })
})
afterAll(() => rm(folder, { recursive: true }))

const BLUE = { name: 'Blue', centreNm: 470, fwhmNm: 25, maxIrradianceWM2: 300 }
const INFRARED = { name: 'Infrared', centreNm: 940, fwhmNm: 50, maxIrradianceWM2: 200 }

async function deviceWith(sources: object[], name = 'planned.json'): Promise<string> {
  const described = JSON.parse(await readFile(join(folder, 'device.json'), 'utf8'))
  await writeFile(join(folder, name), JSON.stringify({ ...described, sources }))
  return join(folder, name)
}

describe('bias-plan', () => {
  it.each([
    [1, 'Infrared', 200],
    [2, 'Blue', 300],
  ])('lights the other junction of junction %i', async (junction, lit, irradiance) => {
    const path = await deviceWith([BLUE, INFRARED], `plan-${junction}.json`)
    const { code, out, err } = await tierlight('bias-plan', path, '--junction', String(junction), '--json')
    expect({ code, err }).toEqual({ code: 0, err: '' })
    const plan = JSON.parse(out)
    expect(plan).toMatchObject({ device: 'Split 480 nm', junction, isPossible: true })
    for (const { name, irradianceWM2 } of plan.sources)
      expect(irradianceWM2).toBeCloseTo(name === lit ? irradiance : 0, 4)
    expect(plan.marginMaCm2).toBeGreaterThan(5)
    expect(plan.junctions[junction - 1].selectivity).toBeGreaterThan(0.99)
    expect(plan.biasVoltageV).toBeGreaterThan(0.5)
  })

  it('prints a bench sheet, keeps a total, and says when no source helps', async () => {
    const sheet = await tierlight('bias-plan', await deviceWith([BLUE, INFRARED]), '--junction', '2', '--total', '60')
    expect(sheet.out).toMatch(/^Blue +60\.0 +300\.0$/m)
    expect(sheet.out).toMatch(/Bias voltage \d\.\d{3} V; total 60\.0 W\/m²/)
    expect(sheet.out).toMatch(/reverse-bias limit/)
    const none = await tierlight('bias-plan', await deviceWith([BLUE], 'blue-only.json'), '--junction', '1')
    expect(none.out).toContain('These sources cannot make junction 1 limit.')
  })

  it.each([
    [['--junction', '3'], 1, /There is no junction 3; the device has 2/],
    [[], 2, /--junction needs a number/],
  ])('refuses %j', async (options, exit, sentence) => {
    const { code, err } = await tierlight('bias-plan', await deviceWith([BLUE], 'refused.json'), ...options)
    expect(code).toBe(exit)
    expect(err).toMatch(sentence)
  })

  it('needs sources', async () => {
    const { code, err } = await tierlight('bias-plan', join(folder, 'device.json'), '--junction', '1')
    expect(code).toBe(1)
    expect(err).toMatch(/device\.json has no "sources"/)
  })
})

describe('reduce', () => {
  const grid = Array.from({ length: 61 }, (_, i) => 400 + 10 * i)
  const truth = (nm: number) => 0.8 / (1 + Math.exp((nm - 750) / 12))
  const responsivity = (nm: number) => 0.2 + nm / 5000
  const lamp = (nm: number) => 1e-6 * (1 + 0.4 * Math.cos(nm / 70))
  const rows = (headers: string, row: (nm: number) => number[]) =>
    [`Wavelength (nm),${headers}`, ...grid.map((nm) => [nm, ...row(nm)].join(',')), ''].join('\n')
  const raw = {
    device: {
      file: 'dut.csv',
      wavelength: 'Wavelength (nm)',
      signal: { x: 'X (V)', y: 'Y (V)' },
      dark: { x: 4, y: 5 },
      gainVA: 1e6,
    },
    reference: { file: 'ref.csv', wavelength: 1, signal: { magnitude: 'R (V)' }, shuntOhm: 1e5 },
    calibration: 'calibration.csv',
    areas: { referenceCm2: 1, deviceCm2: 0.25 },
  }
  beforeAll(async () => {
    const signal = (nm: number) => (1e6 * lamp(nm) * 0.25 * truth(nm) * nm) / PHOTON_ENERGY_NM_EV
    await writeFile(
      join(folder, 'dut.csv'),
      rows('X (V),Y (V),Dark X (V),Dark Y (V)', (nm) => [
        0.6 * signal(nm) + 1e-4,
        0.8 * signal(nm) - 2e-4,
        1e-4,
        -2e-4,
      ]),
    )
    await writeFile(
      join(folder, 'ref.csv'),
      rows('R (V)', (nm) => [1e5 * lamp(nm) * responsivity(nm)]),
    )
    await writeFile(
      join(folder, 'calibration.csv'),
      rows('Responsivity (A/W)', (nm) => [responsivity(nm)]),
    )
    await writeFile(
      join(folder, 'r.csv'),
      rows('Reflectance', () => [0.1]),
    )
  })
  const written = async (name: string, content: object): Promise<string> => {
    await writeFile(join(folder, name), JSON.stringify(content))
    return join(folder, name)
  }

  it('gives the truth back to 1e-6 as a table that analyse can read', async () => {
    const { code, out, err } = await tierlight('reduce', await written('raw.json', raw))
    expect(code).toBe(0)
    expect(err).toMatch(/No monitor signal/)
    const [header, ...lines] = out.trimEnd().split('\n')
    expect(header).toBe('Wavelength (nm),EQE')
    expect(lines).toHaveLength(grid.length)
    lines.forEach((line, i) => {
      const [nm, eqe] = line.split(',').map(Number)
      expect(nm).toBe(grid[i])
      expect(Math.abs(eqe! - truth(grid[i]!))).toBeLessThan(1e-6)
    })
    await writeFile(join(folder, 'reduced.csv'), out)
    const device = { device: 'Reduced', junctions: [{ name: 'top', scan: 'reduced.csv' }] }
    const analysed = await tierlight('analyse', await written('reduced.json', device), '--json')
    expect(JSON.parse(analysed.out).junctions[0].points).toBe(grid.length)
  })

  it('gives every factor with --json, and IQE with a reflectance', async () => {
    const path = await written('with-r.json', { ...raw, reflectance: 'r.csv', corrections: { shadow: 1.02 } })
    const { out } = await tierlight('reduce', path, '--json')
    const { eqe, iqe, factors } = JSON.parse(out)
    expect(factors).toMatchObject({ deviceGainVA: 1e6, referenceGainVA: 1e5, areaRatio: 4, correction: 1.02 })
    expect(eqe[0]).toBeCloseTo(1.02 * truth(400), 6)
    expect(iqe.values[0]).toBeCloseTo((1.02 * truth(400)) / 0.9, 6)
  })

  it.each([
    [{ ...raw, device: { ...raw.device, shuntOhm: 5 } }, /at device: Give either "gainVA" or "shuntOhm"/],
    [
      { ...raw, device: { ...raw.device, signal: { magnitude: 'Z' } } },
      /dut\.csv has no column "Z"; it has "Wavelength/,
    ],
    [{ ...raw, calibration: 'none.csv' }, /none\.csv: there is no such file/],
    [{ ...raw, reference: { ...raw.reference, dark: { magnitude: 2 } } }, /the reference detector must see light/],
  ])('says what is wrong: %#', async (content, sentence) => {
    const { code, out, err } = await tierlight('reduce', await written('wrong.json', content))
    expect({ code, out }).toEqual({ code: 1, out: '' })
    expect(err).toMatch(sentence)
    expect(err.trimEnd().split('\n')).toHaveLength(1)
  })
})
