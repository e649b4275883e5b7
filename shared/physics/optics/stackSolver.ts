import { assertNotNegative, DomainError } from '../errors.js'
import { normalIndex } from './fresnel.js'
import { CoherentGroup, type MediaTable } from './coherentGroup.js'
import { assertIndex, assertStack, at, type Dispersion, type OpticalStack, type StackOptics } from './stack.js'

/** e^{2iδ} of a layer and its modulus e^{−2 Im δ} on the stack's wavelengths. */
interface Phase {
  readonly re: Float64Array
  readonly im: Float64Array
  readonly modulus: Float64Array
}

/** A coherent group as seen from its front, and from the thick layer behind it where there is one. */
interface CoupledGroup {
  readonly front: CoherentGroup
  readonly rear: CoherentGroup | null
}

/** Thicknesses whose phases are kept for each layer: the columns of a map come back again and again. */
const KEPT_PHASES = 256

/**
 * Transfer through coherent thin layers on or between incoherent thick ones, at one angle, for all wavelengths, made
 * once and solved for many thicknesses. Everything that does not depend on the thickness is kept; one `solve` costs a
 * few dozen multiplications for each layer, wavelength and polarisation and allocates nothing.
 *
 * Coherent layers: the amplitude reflection Γ goes from the rear to the front, `Γ' = Γ e^{2iδ}`,
 * `Γ₋ = (r + Γ')/(1 + rΓ')`, which holds only decaying exponentials and so stays stable for thick absorbing layers where
 * the product of 2 × 2 matrices overflows; then the intensities go forward. A layer's absorptance is the difference of
 * the Poynting flux `Re(η*(1 + Γ)(1 − Γ*))|E|²` at its two faces. Incoherent layers add intensities of all passes.
 * Convention n + ik, e^{−iωt}. Sources: M. Born, E. Wolf, Principles of Optics, §1.6; H. A. Macleod, Thin-Film Optical
 * Filters, chapter 2; L. G. Parratt, Phys. Rev. 95 (1954) 359 (the recursion); C. L. Mitsas, D. I. Siapkas,
 * Appl. Opt. 34 (1995) 1678 (mixed coherence).
 */
export class StackSolver {
  readonly points: number
  private readonly wavelengthNm: Float64Array
  private readonly media: number
  private readonly transverse: Float64Array
  private readonly polarisations: readonly ('s' | 'p')[]
  private readonly groups: readonly (readonly number[])[]
  private readonly n: Dispersion[]
  private readonly k: Dispersion[]
  private readonly thicknessNm: number[]
  private readonly phases: Phase[]
  private readonly kept: Map<number, Phase>[]
  private readonly work: Record<'s' | 'p', MediaTable>
  private readonly qRe: Float64Array[]
  private readonly qIm: Float64Array[]
  private readonly result: { reflectance: Float64Array; transmittance: Float64Array; absorptance: Float64Array[] }
  private readonly coupled: Readonly<Record<'s' | 'p', readonly CoupledGroup[]>>
  private readonly returned: Float64Array

  /** @throws DomainError naming the member of the stack that is out of its domain. */
  constructor(stack: OpticalStack) {
    assertStack(stack)
    const points = stack.wavelengthNm.length
    const layers = stack.layers
    this.points = points
    this.wavelengthNm = stack.wavelengthNm
    this.media = layers.length + 2
    const incident = stack.incidentIndex ?? 1
    const sine = Math.sin(((stack.angleDeg ?? 0) * Math.PI) / 180)
    this.transverse = Float64Array.from({ length: points }, (_, i) => at(incident, i) * sine)
    const polarisation = stack.polarisation ?? 'unpolarised'
    this.polarisations = polarisation !== 'unpolarised' ? [polarisation] : sine === 0 ? ['s'] : ['s', 'p']
    this.n = [incident, ...layers.map((l) => l.n), stack.exit?.n ?? 1]
    this.k = [0, ...layers.map((l) => l.k), stack.exit?.k ?? 0]
    this.thicknessNm = [0, ...layers.map((l) => l.thicknessNm), 0]
    this.groups = groupsBetweenThick(layers.map((l) => l.coherent ?? true))
    this.qRe = this.perMedium()
    this.qIm = this.perMedium()
    this.phases = Array.from({ length: this.media }, () => makePhase(points))
    this.kept = Array.from({ length: this.media }, () => new Map<number, Phase>())
    this.work = { s: this.makeWork(), p: this.makeWork() }
    this.result = {
      reflectance: new Float64Array(points),
      transmittance: new Float64Array(points),
      absorptance: layers.map(() => new Float64Array(points)),
    }
    const couple = (media: MediaTable): CoupledGroup[] =>
      this.groups.map((order, g) => ({
        front: new CoherentGroup(media, order, false, points),
        // Light comes from behind only where a thick layer is.
        rear: g + 1 < this.groups.length ? new CoherentGroup(media, order.slice().reverse(), true, points) : null,
      }))
    this.coupled = { s: couple(this.work.s), p: couple(this.work.p) }
    this.returned = new Float64Array(this.groups.length)
    for (let m = 0; m < this.media; m++) this.refreshIndex(m)
    for (let m = 0; m + 1 < this.media; m++) this.refreshInterface(m)
    for (let m = 1; m + 1 < this.media; m++) this.refreshPhase(m)
  }

  /** Sets the thickness of a layer, nm; layers count from 0. @throws DomainError naming the argument. */
  setThickness(layer: number, thicknessNm: number): void {
    this.assertLayer(layer)
    assertNotNegative(thicknessNm, 'thicknessNm')
    if (this.thicknessNm[layer + 1] === thicknessNm) return
    this.thicknessNm[layer + 1] = thicknessNm
    this.refreshPhase(layer + 1)
    this.markChanged(layer + 1, false)
  }

  /** Sets n and k of a layer; layers count from 0. @throws DomainError naming the value. */
  setIndex(layer: number, n: Dispersion, k: Dispersion): void {
    this.assertLayer(layer)
    assertIndex(n, k, this.points, `layers[${layer}]`)
    const m = layer + 1
    this.n[m] = n
    this.k[m] = k
    this.kept[m]!.clear()
    this.refreshIndex(m)
    this.refreshInterface(m - 1)
    this.refreshInterface(m)
    this.refreshPhase(m)
    this.markChanged(m, true)
  }

  /**
   * R, T and each layer's absorptance at every wavelength. The arrays belong to the solver and are overwritten by the
   * next call; copy what must last. Cost O(layers × wavelengths × polarisations).
   */
  solve(): StackOptics {
    if (this.polarisations.length === 1 && this.groups.length === 1) {
      const { front } = this.coupled[this.polarisations[0]!][0]!
      front.solve()
      return front.optics
    }
    const { reflectance, transmittance, absorptance } = this.result
    reflectance.fill(0)
    transmittance.fill(0)
    for (const spectrum of absorptance) spectrum.fill(0)
    const share = 1 / this.polarisations.length
    for (const polarisation of this.polarisations) {
      const groups = this.coupled[polarisation]
      for (const { front, rear } of groups) {
        front.solve()
        rear?.solve()
      }
      if (groups.length === 1) this.addCoherent(groups[0]!.front, share)
      else this.addIncoherent(groups, share)
    }
    return this.result
  }

  private addCoherent(group: CoherentGroup, share: number): void {
    const { reflectance, transmittance, absorptance } = this.result
    add(reflectance, group.reflectance, share)
    add(transmittance, group.transmittance, share)
    group.absorptance.forEach((spectrum, l) => add(absorptance[l]!, spectrum, share))
  }

  /** Intensities in the thick layers: rear to front for what returns, then front to rear for what arrives. */
  private addIncoherent(groups: readonly CoupledGroup[], share: number): void {
    const { reflectance, transmittance, absorptance } = this.result
    const { returned } = this
    const last = groups.length - 1
    for (let i = 0; i < this.points; i++) {
      for (let g = last; g >= 0; g--) {
        const { front, rear } = groups[g]!
        returned[g] = front.reflectance[i]!
        if (!rear) continue
        const pass = this.passOf(front.order.at(-1)!, i)
        const back = pass * pass * returned[g + 1]!
        returned[g]! += (front.transmittance[i]! * back * rear.transmittance[i]!) / (1 - rear.reflectance[i]! * back)
      }
      reflectance[i]! += share * returned[0]!
      let arriving = share
      for (let g = 0; g <= last; g++) {
        const { front, rear } = groups[g]!
        const layers = front.order.length - 2
        const thick = front.order[layers + 1]!
        const pass = rear ? this.passOf(thick, i) : 0
        const back = rear ? pass * pass * returned[g + 1]! : 0
        const down = (arriving * front.transmittance[i]!) / (rear ? 1 - rear.reflectance[i]! * back : 1)
        for (let l = 0; l < layers; l++) {
          const fromBelow = rear ? down * back * rear.absorptance[layers - 1 - l]![i]! : 0
          absorptance[front.order[l + 1]! - 1]![i]! += arriving * front.absorptance[l]![i]! + fromBelow
        }
        if (!rear) transmittance[i]! += down
        else {
          absorptance[thick - 1]![i]! += down * (1 - pass) * (1 + pass * returned[g + 1]!)
          arriving = down * pass
        }
      }
    }
  }

  private markChanged(medium: number, isIndex: boolean): void {
    for (const polarisation of this.polarisations)
      for (const { front, rear } of this.coupled[polarisation]) {
        front.markChanged(medium, isIndex)
        rear?.markChanged(medium, isIndex)
      }
  }

  /** Share of the intensity that crosses a layer once. */
  private passOf(medium: number, i: number): number {
    return this.phases[medium]!.modulus[i]!
  }

  private refreshIndex(medium: number): void {
    const q = new Float64Array(2)
    const { s, p } = this.work
    for (let i = 0; i < this.points; i++) {
      const n = at(this.n[medium]!, i)
      const k = at(this.k[medium]!, i)
      normalIndex(n, k, this.transverse[i]!, q)
      const [re, im] = [q[0]!, q[1]!]
      this.qRe[medium]![i] = re
      this.qIm[medium]![i] = im
      s.etaRe[medium]![i] = re
      s.etaIm[medium]![i] = im
      // η_p = N²/q
      const [squareRe, squareIm, size] = [n * n - k * k, 2 * n * k, re * re + im * im]
      p.etaRe[medium]![i] = (squareRe * re + squareIm * im) / size
      p.etaIm[medium]![i] = (squareIm * re - squareRe * im) / size
      if (k === 0) {
        // Without absorption the wave is either propagating or evanescent: one of the parts is exactly zero.
        if (im === 0) p.etaIm[medium]![i] = 0
        else p.etaRe[medium]![i] = 0
      }
    }
    s.isAbsorbing[medium] = p.isAbsorbing[medium] = isAbsorbing(this.k[medium]!) ? 1 : 0
  }

  /** r of the interface between `medium` and the one behind it, for both polarisations. */
  private refreshInterface(medium: number): void {
    for (const work of [this.work.s, this.work.p]) {
      const [aRe, aIm] = [work.etaRe[medium]!, work.etaIm[medium]!]
      const [bRe, bIm] = [work.etaRe[medium + 1]!, work.etaIm[medium + 1]!]
      for (let i = 0; i < this.points; i++) {
        const [dRe, dIm] = [aRe[i]! - bRe[i]!, aIm[i]! - bIm[i]!]
        const [sRe, sIm] = [aRe[i]! + bRe[i]!, aIm[i]! + bIm[i]!]
        const size = sRe * sRe + sIm * sIm
        work.rRe[medium]![i] = (dRe * sRe + dIm * sIm) / size
        work.rIm[medium]![i] = (dIm * sRe - dRe * sIm) / size
      }
    }
  }

  private refreshPhase(medium: number): void {
    const thickness = this.thicknessNm[medium]!
    const kept = this.kept[medium]!
    let phase = kept.get(thickness)
    if (!phase) {
      phase = makePhase(this.points)
      const [re, im] = [this.qRe[medium]!, this.qIm[medium]!]
      for (let i = 0; i < this.points; i++) {
        const twice = (4 * Math.PI * thickness) / this.wavelengthNm[i]!
        const modulus = Math.exp(-twice * im[i]!)
        const angle = twice * re[i]!
        phase.modulus[i] = modulus
        phase.re[i] = modulus * Math.cos(angle)
        phase.im[i] = modulus * Math.sin(angle)
      }
      if (kept.size >= KEPT_PHASES) kept.clear()
      kept.set(thickness, phase)
    }
    this.phases[medium] = phase
    for (const work of [this.work.s, this.work.p]) {
      work.phaseRe[medium] = phase.re
      work.phaseIm[medium] = phase.im
      work.modulus[medium] = phase.modulus
    }
  }

  private perMedium(): Float64Array[] {
    return Array.from({ length: this.media }, () => new Float64Array(this.points))
  }

  private makeWork(): MediaTable {
    const empty = this.phases.map((phase) => phase)
    return {
      etaRe: this.perMedium(),
      etaIm: this.perMedium(),
      rRe: this.perMedium(),
      rIm: this.perMedium(),
      phaseRe: empty.map((phase) => phase.re),
      phaseIm: empty.map((phase) => phase.im),
      modulus: empty.map((phase) => phase.modulus),
      isAbsorbing: new Uint8Array(this.media),
    }
  }

  private assertLayer(layer: number): void {
    if (!(Number.isInteger(layer) && layer >= 0 && layer < this.media - 2))
      throw new DomainError('layer', `layer is ${layer}; the stack has layers 0 to ${this.media - 3}.`)
  }
}

/**
 * R, T and each layer's absorptance of a stack; see `StackSolver` for the method and its sources.
 * @throws DomainError naming the member. Cost O(layers × wavelengths × polarisations).
 */
export function transferMatrix(stack: OpticalStack): StackOptics {
  return new StackSolver(stack).solve()
}

/** Media between neighbouring thick ones, ends included: 0 is the incident medium, layers + 1 the exit. */
function groupsBetweenThick(coherent: readonly boolean[]): number[][] {
  const groups: number[][] = []
  let group = [0]
  coherent.forEach((isCoherent, l) => {
    group.push(l + 1)
    if (isCoherent) return
    groups.push(group)
    group = [l + 1]
  })
  groups.push([...group, coherent.length + 1])
  return groups
}

function makePhase(points: number): Phase {
  return { re: new Float64Array(points), im: new Float64Array(points), modulus: new Float64Array(points) }
}

function add(to: Float64Array, values: Float64Array, share: number): void {
  for (let i = 0; i < to.length; i++) to[i]! += share * values[i]!
}

function isAbsorbing(k: Dispersion): boolean {
  return typeof k === 'number' ? k > 0 : k.some((value) => value > 0)
}
