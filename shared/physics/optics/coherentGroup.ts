/**
 * What a coherent group needs of each medium, for one polarisation: tilted admittances η, r of the interface to the
 * medium behind, e^{2iδ} and its modulus. Outer index: medium; inner: wavelength.
 */
export interface GroupWork {
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
 * Power coefficients of the coherent layers between two media at one wavelength, for light that comes from the first.
 * @param order media, the incident one first, the exit last. @param isReversed the order runs from the rear.
 * @param scratch at least 4 values a medium. @param out [R, T, A of each layer in order]; R + T + Σ A = 1.
 * Where the incident medium absorbs, R is what the net flux leaves over, because flux and intensity differ there.
 */
export function solveGroup(
  work: GroupWork,
  order: readonly number[],
  isReversed: boolean,
  i: number,
  scratch: Float64Array,
  out: Float64Array,
): void {
  const { etaRe, etaIm, rRe, rIm, phaseRe, phaseIm, modulus } = work
  const last = order.length - 1
  const sign = isReversed ? -1 : 1

  // Rear to front. For each medium behind an interface: Γ' at its front face, and |1 + r|²/|1 + rΓ'|².
  let gammaRe = 0
  let gammaIm = 0
  for (let j = last; j >= 1; j--) {
    const medium = order[j]!
    let frontRe = 0
    let frontIm = 0
    if (j < last) {
      const pRe = phaseRe[medium]![i]!
      const pIm = phaseIm[medium]![i]!
      frontRe = gammaRe * pRe - gammaIm * pIm
      frontIm = gammaRe * pIm + gammaIm * pRe
    }
    const face = isReversed ? medium : order[j - 1]!
    const re = sign * rRe[face]![i]!
    const im = sign * rIm[face]![i]!
    const bottomRe = 1 + re * frontRe - im * frontIm
    const bottomIm = re * frontIm + im * frontRe
    const inverse = 1 / (bottomRe * bottomRe + bottomIm * bottomIm)
    const topRe = re + frontRe
    const topIm = im + frontIm
    gammaRe = (topRe * bottomRe + topIm * bottomIm) * inverse
    gammaIm = (topIm * bottomRe - topRe * bottomIm) * inverse
    const s = 3 * j
    scratch[s] = frontRe
    scratch[s + 1] = frontIm
    scratch[s + 2] = ((1 + re) * (1 + re) + im * im) * inverse
  }

  // Front to rear: the net flux through the front face of each medium, in units of the incident flux.
  const incident = order[0]!
  const incidentEta = etaRe[incident]![i]!
  if (!(incidentEta > 0)) {
    out.fill(0, 0, order.length)
    out[0] = 1
    return
  }
  let intensity = 1 / incidentEta
  let fluxBefore = 0
  let entering = 0
  for (let j = 1; j <= last; j++) {
    const medium = order[j]!
    const s = 3 * j
    const frontRe = scratch[s]!
    const frontIm = scratch[s + 1]!
    intensity *= scratch[s + 2]!
    const flux =
      intensity * (etaRe[medium]![i]! * (1 - frontRe * frontRe - frontIm * frontIm) + 2 * etaIm[medium]![i]! * frontIm)
    if (j === 1) entering = flux
    else out[j] = fluxBefore - flux
    fluxBefore = flux
    if (j < last) intensity *= modulus[medium]![i]!
  }
  out[1] = fluxBefore
  out[0] = gammaRe * gammaRe + gammaIm * gammaIm
  if (work.isAbsorbing[incident]) balance(out, entering, last)
}

/** Makes R + T + Σ A one for an absorbing incident medium, with R between 0 and 1. */
function balance(out: Float64Array, entering: number, last: number): void {
  out[0] = Math.max(0, 1 - entering)
  if (entering > 1) for (let j = 1; j <= last; j++) out[j]! /= entering
}
