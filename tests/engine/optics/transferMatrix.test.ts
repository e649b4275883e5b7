import { describe, expect, it, test } from 'vitest'
import { DomainError } from '../../../shared/physics/errors.js'
import {
  fresnelReflectance,
  incoherentSlab,
  StackSolver,
  transferMatrix,
  type OpticalStack,
  type Polarisation,
  type StackLayer,
} from '../../../shared/physics/optics/index.js'
import { seededRandom } from '../whatIf/seededRandom.js'

const at = (nm: number): Float64Array => Float64Array.of(nm)
const reflectance = (stack: OpticalStack): number => transferMatrix(stack).reflectance[0]!

describe('single interfaces (checks 11.1 to 11.8)', () => {
  test.each([
    ['11.1 air to glass', 1, 1.5, 0.04, 12],
    ['11.2 air to a semiconductor', 1, 3.5, 0.308642, 6],
    ['11.3 glass to a semiconductor', 1.5, 3.5, 0.16, 12],
    ['11.4 encapsulated silicon', 1.5, 3.435, 0.1537, 4],
  ])('%s', (_, n1, n2, expected, digits) => {
    expect(fresnelReflectance(n1, n2).unpolarised).toBeCloseTo(expected, digits)
    const bare = { wavelengthNm: at(550), incidentIndex: n1, layers: [], exit: { n: n2, k: 0 } }
    expect(reflectance(bare)).toBeCloseTo(expected, digits)
  })

  test.each([
    ['11.6', 45, 0.0920134, 0.0084665, 7],
    ['11.7 at the Brewster angle', 56.309932474, 0.147929, 0, 6],
    ['11.8', 75, 0.399356, 0.1067651, 7],
  ])('%s oblique on glass', (_, angleDeg, s, p, digits) => {
    const fresnel = fresnelReflectance(1, 1.5, 0, angleDeg)
    expect(fresnel.s).toBeCloseTo(s, digits)
    expect(fresnel.p).toBeCloseTo(p, p === 0 ? 9 : digits)
    const stack = (polarisation: Polarisation): OpticalStack => ({
      wavelengthNm: at(500),
      layers: [],
      exit: { n: 1.5, k: 0 },
      angleDeg,
      polarisation,
    })
    expect(reflectance(stack('s'))).toBeCloseTo(fresnel.s, 12)
    expect(reflectance(stack('p'))).toBeCloseTo(fresnel.p, 12)
    expect(reflectance(stack('unpolarised'))).toBeCloseTo(fresnel.unpolarised, 12)
  })
})

describe('thin films (checks 11.9 to 11.20)', () => {
  const film = (n: number, thicknessNm: number, nm: number, substrate: number, k = 0): OpticalStack => ({
    wavelengthNm: at(nm),
    layers: [{ n, k, thicknessNm }],
    exit: { n: substrate, k: 0 },
  })

  it('11.9 a perfect quarter wave reflects nothing', () => {
    const n = Math.sqrt(3.5)
    expect(reflectance(film(n, 600 / (4 * n), 600, 3.5))).toBeLessThan(1e-12)
  })

  test.each([
    ['11.10', 2, 75, 600, 3.5, 0.0044444, 7],
    ['11.11 at 400 nm', 2, 75, 400, 3.5, 0.183971, 6],
    ['11.11 at 1000 nm', 2, 75, 1000, 3.5, 0.135815, 6],
    ['11.13 on 1.52', 1.38, 99.638, 550, 1.52, 0.012601, 6],
    ['11.13 on 1.50', 1.38, 99.638, 550, 1.5, 0.01411, 6],
  ])('%s', (_, n, thicknessNm, nm, substrate, expected, digits) => {
    expect(reflectance(film(n, thicknessNm, nm, substrate))).toBeCloseTo(expected, digits)
  })

  it('11.15 a free-standing absorbing film', () => {
    const optics = transferMatrix(film(2, 200, 600, 1, 0.1))
    expect(optics.reflectance[0]).toBeCloseTo(0.213923, 6)
    expect(optics.transmittance[0]).toBeCloseTo(0.474588, 6)
    expect(optics.absorptance[0]![0]).toBeCloseTo(0.311489, 6)
  })

  it('11.16 a tandem-like stack', () => {
    const optics = transferMatrix({
      wavelengthNm: at(550),
      layers: [
        { n: 1.38, k: 0, thicknessNm: 100 },
        { n: 2, k: 0, thicknessNm: 60 },
        { n: 2.4, k: 0.3, thicknessNm: 450 },
        { n: 1.9, k: 0, thicknessNm: 20 },
      ],
      exit: { n: 3.9, k: 0.02 },
    })
    expect(optics.reflectance[0]).toBeCloseTo(0.009929, 7)
    expect(optics.transmittance[0]).toBeCloseTo(0.0406246, 7)
    expect(optics.absorptance[2]![0]).toBeCloseTo(0.9494464, 7)
    for (const transparent of [0, 1, 3]) expect(Math.abs(optics.absorptance[transparent]![0]!)).toBeLessThan(1e-12)
  })

  it('11.20 a half-wave layer changes nothing', () => {
    expect(reflectance(film(2.3, 600 / (2 * 2.3), 600, 3.5))).toBeCloseTo(fresnelReflectance(1, 3.5).s, 12)
  })
})

describe('thick layers', () => {
  it('equal the closed form of an incoherent slab', () => {
    for (const [nm, k] of [
      [500, 0],
      [900, 1e-6],
      [1100, 2e-5],
    ] as const) {
      const optics = transferMatrix({
        wavelengthNm: at(nm),
        layers: [{ n: 1.5, k, thicknessNm: 3e6, coherent: false }],
      })
      const face = fresnelReflectance(1, 1.5, k).s
      const slab = incoherentSlab(face, face, Math.exp((-4 * Math.PI * k * 3e6) / nm))
      const within = k === 0 ? 1e-14 : 1e-9
      expect(Math.abs(optics.reflectance[0]! - slab.reflectance)).toBeLessThan(within)
      expect(Math.abs(optics.transmittance[0]! - slab.transmittance)).toBeLessThan(within)
      expect(Math.abs(optics.absorptance[0]![0]! - slab.absorptance)).toBeLessThan(within)
    }
  })

  it('are the mean over the phase of the coherent layer of the same material', () => {
    const layer = { n: 1.5, k: 0, thicknessNm: 2000 }
    const steps = 400
    let mean = 0
    for (let i = 0; i < steps; i++) {
      const thicknessNm = 2000 + ((i / steps) * 600) / (2 * 1.5)
      mean += transferMatrix({ wavelengthNm: at(600), layers: [{ ...layer, thicknessNm }], exit: { n: 3.5, k: 0 } })
        .reflectance[0]!
    }
    const incoherent = transferMatrix({
      wavelengthNm: at(600),
      layers: [{ ...layer, coherent: false }],
      exit: { n: 3.5, k: 0 },
    })
    expect(incoherent.reflectance[0]).toBeCloseTo(mean / steps, 10)
  })

  it('stay finite where a matrix product would overflow: 1 mm of a metal-like layer', () => {
    const optics = transferMatrix({
      wavelengthNm: at(400),
      layers: [
        { n: 2, k: 0, thicknessNm: 50 },
        { n: 0.2, k: 8, thicknessNm: 1e6 },
        { n: 1.5, k: 0.1, thicknessNm: 300 },
      ],
    })
    expect(optics.transmittance[0]).toBe(0)
    expect(optics.reflectance[0]! + optics.absorptance[1]![0]!).toBeCloseTo(1, 12)
  })
})

describe('laws', () => {
  it('R + T + Σ A = 1 within 1e-9 for 1000 random stacks, angles and polarisations', () => {
    const random = seededRandom(20_261)
    const between = (low: number, high: number): number => low + (high - low) * random()
    for (let trial = 0; trial < 1000; trial++) {
      const layers: StackLayer[] = Array.from({ length: 1 + Math.floor(between(0, 9)) }, () => ({
        n: between(0.1, 5),
        k: random() < 0.3 ? 0 : 10 ** between(-6, 0.9),
        thicknessNm: 10 ** between(0, 4),
        coherent: random() < 0.75,
      }))
      const optics = transferMatrix({
        wavelengthNm: at(between(250, 1900)),
        incidentIndex: between(1, 2),
        layers,
        exit: { n: between(0.1, 4.5), k: random() < 0.5 ? 0 : between(0, 5) },
        angleDeg: between(0, 89.9),
        polarisation: (['s', 'p', 'unpolarised'] as const)[Math.floor(between(0, 3))],
      })
      const parts = [optics.reflectance[0]!, optics.transmittance[0]!, ...optics.absorptance.map((a) => a[0]!)]
      const total = parts.reduce((sum, part) => sum + part, 0)
      expect(Math.abs(total - 1), JSON.stringify(layers)).toBeLessThan(1e-9)
      for (const part of parts) expect(part, JSON.stringify(layers)).toBeGreaterThan(-1e-9)
    }
  })

  it('transmission through an absorber falls with its thickness', () => {
    const solver = new StackSolver({
      wavelengthNm: at(700),
      layers: [{ n: 2.5, k: 0.4, thicknessNm: 0 }],
      exit: { n: 2.5, k: 0 },
      incidentIndex: 2.5,
    })
    let before = Infinity
    for (let thicknessNm = 0; thicknessNm <= 1500; thicknessNm += 50) {
      solver.setThickness(0, thicknessNm)
      const now = solver.solve().transmittance[0]!
      expect(now).toBeLessThan(before)
      before = now
    }
  })

  it('a solver that is told new thicknesses and indices gives what a fresh one gives, bit for bit', () => {
    const wavelengthNm = Float64Array.of(400, 550, 800, 1100)
    const layers: StackLayer[] = [
      { n: 1.5, k: 1e-7, thicknessNm: 1e6, coherent: false },
      { n: 2.1, k: 0.2, thicknessNm: 80 },
      { n: 3.5, k: 0.01, thicknessNm: 900 },
    ]
    const solver = new StackSolver({ wavelengthNm, layers, angleDeg: 35 })
    solver.setThickness(1, 120)
    solver.solve()
    solver.setThickness(1, 95)
    solver.setIndex(2, 3.4, 0.05)
    const fresh = transferMatrix({
      wavelengthNm,
      angleDeg: 35,
      layers: [layers[0]!, { ...layers[1]!, thicknessNm: 95 }, { ...layers[2]!, n: 3.4, k: 0.05 }],
    })
    expect(solver.solve()).toEqual(fresh)
  })
})

test.each([
  ['an angle of 90°', { angleDeg: 90 }, 'angleDeg'],
  ['a negative thickness', { layers: [{ n: 1, k: 0, thicknessNm: -1 }] }, 'layers[0].thicknessNm'],
  ['a negative k', { layers: [{ n: 1, k: -0.1, thicknessNm: 1 }] }, 'layers[0].k'],
  ['n of zero', { exit: { n: 0, k: 0 } }, 'exit.n'],
  ['a column of the wrong length', { layers: [{ n: Float64Array.of(1, 2), k: 0, thicknessNm: 1 }] }, 'layers[0].n'],
])('%s is refused by name', (_, change, argument) => {
  const refused = (): unknown => transferMatrix({ wavelengthNm: at(500), layers: [], ...change })
  expect(refused).toThrow(DomainError)
  expect(refused).toThrow(expect.objectContaining({ argument }))
})
