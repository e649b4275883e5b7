import type { StackOptics } from './stack.js'

/**
 * What coherent groups need of each medium, for one polarisation: tilted admittances η, r of the interface to the medium
 * behind, e^{2iδ} and its modulus. Outer index: medium; inner: wavelength.
 */
export interface MediaTable {
  readonly etaRe: Float64Array[]
  readonly etaIm: Float64Array[]
  readonly rRe: Float64Array[]
  readonly rIm: Float64Array[]
  readonly phaseRe: Float64Array[]
  readonly phaseIm: Float64Array[]
  readonly modulus: Float64Array[]
  readonly isAbsorbing: Uint8Array
}

/**
 * The coherent layers between two media, for light that comes from the first: power coefficients at all wavelengths. What
 * lies behind the rearmost layer that changed is kept from one solution to the next, because the recursion comes from
 * there: a map whose inner axis is a front layer recomputes only that layer and those before it.
 */
export class CoherentGroup {
  /** R, T and the absorptance of each layer in `order`, fractions; R + T + Σ A = 1. */
  readonly reflectance: Float64Array
  readonly transmittance: Float64Array
  readonly absorptance: readonly Float64Array[]
  /** The three together. */
  readonly optics: StackOptics
  private readonly last: number
  /** By position in `order`: Γ at the rear face of each medium. */
  private readonly rearRe: Float64Array[]
  private readonly rearIm: Float64Array[]
  /** |1 + r|²/|1 + rΓ'|²: the intensity behind an interface for one before it. */
  private readonly through: Float64Array[]
  /** Net flux at the front face, and what the layer absorbs, for unit forward intensity there. */
  private readonly flux: Float64Array[]
  private readonly absorbed: Float64Array[]
  private readonly intensity: Float64Array
  /** Rearmost position whose medium changed; 0 when none did. */
  private changed: number

  /** @param order media, the incident one first, the exit last. @param isReversed the order runs from the rear. */
  constructor(
    private readonly media: MediaTable,
    readonly order: readonly number[],
    private readonly isReversed: boolean,
    private readonly points: number,
  ) {
    const rows = (): Float64Array[] => order.map(() => new Float64Array(points))
    this.last = order.length - 1
    this.rearRe = rows()
    this.rearIm = rows()
    this.through = rows()
    this.flux = rows()
    this.absorbed = rows()
    this.intensity = new Float64Array(points)
    this.reflectance = new Float64Array(points)
    this.transmittance = new Float64Array(points)
    this.absorptance = order.slice(1, -1).map(() => new Float64Array(points))
    this.optics = {
      reflectance: this.reflectance,
      transmittance: this.transmittance,
      absorptance: this.absorptance,
    }
    this.changed = this.last
  }

  /** Says that the thickness of a medium changed, or (`isIndex`) its index, which the interface behind it feels too. */
  markChanged(medium: number, isIndex: boolean): void {
    const position = this.order.indexOf(medium)
    if (position < 0) return
    this.changed = Math.max(this.changed, Math.min(this.last, isIndex ? position + 1 : position))
  }

  /** Brings the results up to date. Cost O(layers × wavelengths), less where only front layers changed. */
  solve(): void {
    if (this.changed === 0) return
    for (let j = this.changed; j >= 1; j--) this.crossInterface(j)
    for (let j = this.changed; j >= 1; j--) this.balanceLayer(j)
    this.changed = 0
    this.collect()
  }

  /** Γ from the front face of the medium at `j` to the rear face of the one before it. */
  private crossInterface(j: number): void {
    const medium = this.order[j]!
    const face = this.isReversed ? medium : this.order[j - 1]!
    const sign = this.isReversed ? -1 : 1
    const { points, last } = this
    const [rRe, rIm] = [this.media.rRe[face]!, this.media.rIm[face]!]
    const [pRe, pIm] = [this.media.phaseRe[medium]!, this.media.phaseIm[medium]!]
    const [etaRe, etaIm] = [this.media.etaRe[medium]!, this.media.etaIm[medium]!]
    const [gammaRe, gammaIm] = [this.rearRe[j]!, this.rearIm[j]!]
    const [aboveRe, aboveIm] = [this.rearRe[j - 1]!, this.rearIm[j - 1]!]
    const [through, flux] = [this.through[j]!, this.flux[j]!]
    for (let i = 0; i < points; i++) {
      let frontRe = 0
      let frontIm = 0
      if (j < last) {
        const gRe = gammaRe[i]!
        const gIm = gammaIm[i]!
        frontRe = gRe * pRe[i]! - gIm * pIm[i]!
        frontIm = gRe * pIm[i]! + gIm * pRe[i]!
      }
      const re = sign * rRe[i]!
      const im = sign * rIm[i]!
      const bottomRe = 1 + re * frontRe - im * frontIm
      const bottomIm = re * frontIm + im * frontRe
      const inverse = 1 / (bottomRe * bottomRe + bottomIm * bottomIm)
      const topRe = re + frontRe
      const topIm = im + frontIm
      aboveRe[i] = (topRe * bottomRe + topIm * bottomIm) * inverse
      aboveIm[i] = (topIm * bottomRe - topRe * bottomIm) * inverse
      through[i] = ((1 + re) * (1 + re) + im * im) * inverse
      flux[i] = etaRe[i]! * (1 - frontRe * frontRe - frontIm * frontIm) + 2 * etaIm[i]! * frontIm
    }
  }

  /** What the layer at `j` absorbs for unit intensity at its front: flux in minus flux out. */
  private balanceLayer(j: number): void {
    if (j === this.last) return
    const modulus = this.media.modulus[this.order[j]!]!
    const [flux, next, through, absorbed] = [this.flux[j]!, this.flux[j + 1]!, this.through[j + 1]!, this.absorbed[j]!]
    for (let i = 0; i < this.points; i++) absorbed[i] = flux[i]! - modulus[i]! * through[i]! * next[i]!
  }

  private collect(): void {
    const { points, last, intensity, reflectance, transmittance, media, order } = this
    const incident = order[0]!
    const eta = media.etaRe[incident]!
    const [gammaRe, gammaIm, through] = [this.rearRe[0]!, this.rearIm[0]!, this.through[1]!]
    for (let i = 0; i < points; i++) {
      // No power comes in along an evanescent wave: all of it is sent back.
      intensity[i] = eta[i]! > 0 ? through[i]! / eta[i]! : 0
      reflectance[i] = eta[i]! > 0 ? gammaRe[i]! * gammaRe[i]! + gammaIm[i]! * gammaIm[i]! : 1
    }
    if (media.isAbsorbing[incident]) this.balanceIncident()
    for (let j = 1; j < last; j++) {
      const out = this.absorptance[j - 1]!
      const [absorbed, modulus, next] = [this.absorbed[j]!, media.modulus[order[j]!]!, this.through[j + 1]!]
      for (let i = 0; i < points; i++) {
        const here = intensity[i]!
        out[i] = here * absorbed[i]!
        intensity[i] = here * (modulus[i]! * next[i]!)
      }
    }
    const flux = this.flux[last]!
    for (let i = 0; i < points; i++) transmittance[i] = intensity[i]! * flux[i]!
  }

  /**
   * Where the incident medium absorbs, flux and intensity differ, and R is what the net flux leaves over, kept between 0
   * and 1 so that R + T + Σ A stays one.
   */
  private balanceIncident(): void {
    const flux = this.flux[1]!
    for (let i = 0; i < this.points; i++) {
      const entering = this.intensity[i]! * flux[i]!
      if (this.intensity[i] === 0) continue
      this.reflectance[i] = Math.max(0, 1 - entering)
      if (entering > 1) this.intensity[i]! /= entering
    }
  }
}
