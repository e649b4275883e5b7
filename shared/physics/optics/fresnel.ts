import { assertNotNegative, assertPositive, DomainError } from '../errors.js'

/** Power reflectances of one interface, fractions. */
export interface FresnelReflectance {
  readonly s: number
  readonly p: number
  /** The mean of both: unpolarised light. */
  readonly unpolarised: number
}

/** Throws unless the angle lies in [0°, 90°). */
export function assertAngle(angleDeg: number, argument = 'angleDeg'): void {
  if (!(angleDeg >= 0 && angleDeg < 90))
    throw new DomainError(argument, `${argument} is ${angleDeg}; it must be at least 0 and below 90 degrees.`)
}

/**
 * Writes the component of a medium's index normal to the layers, `q = √(N² − s²)` with `N = n + ik` and the transverse
 * index `s = n₀ sin θ₀`, as [Re, Im]. The branch is the wave that decays into the medium (Im q ≥ 0; time e^{−iωt}).
 */
export function normalIndex(n: number, k: number, transverse: number, out: Float64Array): void {
  const re = n * n - k * k - transverse * transverse
  const im = 2 * n * k
  const modulus = Math.hypot(re, im)
  // The larger part comes from a sum, the smaller one from the product, so that neither cancels.
  if (re >= 0) {
    const x = Math.sqrt(0.5 * (modulus + re))
    out[0] = x
    out[1] = x > 0 ? im / (2 * x) : 0
  } else {
    const y = Math.sqrt(0.5 * (modulus - re))
    out[0] = im / (2 * y)
    out[1] = y
  }
}

/**
 * Reflectance of a plane interface between a transparent medium and a second one, `R = |(η₁ − η₂)/(η₁ + η₂)|²` with the
 * tilted admittances `η = N cos θ` (s) and `η = N/cos θ` (p). Source: M. Born, E. Wolf, Principles of Optics, §1.5.
 * @param n1 index of the first medium, above zero. @param n2 @param k2 index of the second. @param angleDeg in medium 1.
 * @throws DomainError naming the argument. Cost O(1).
 */
export function fresnelReflectance(n1: number, n2: number, k2 = 0, angleDeg = 0): FresnelReflectance {
  assertPositive(n1, 'n1')
  assertPositive(n2, 'n2')
  assertNotNegative(k2, 'k2')
  assertAngle(angleDeg)
  const angle = (angleDeg * Math.PI) / 180
  const cosine = Math.cos(angle)
  const q = new Float64Array(2)
  normalIndex(n2, k2, n1 * Math.sin(angle), q)
  const [re, im] = [q[0]!, q[1]!]
  const s = ratioSquared(n1 * cosine - re, -im, n1 * cosine + re, im)
  // p: η₁ = n₁/cos θ₁ and η₂ = N₂²/q, both multiplied by q cos θ₁.
  const squareRe = (n2 * n2 - k2 * k2) * cosine
  const squareIm = 2 * n2 * k2 * cosine
  const p = ratioSquared(n1 * re - squareRe, n1 * im - squareIm, n1 * re + squareRe, n1 * im + squareIm)
  return { s, p, unpolarised: 0.5 * (s + p) }
}

function ratioSquared(aRe: number, aIm: number, bRe: number, bIm: number): number {
  return (aRe * aRe + aIm * aIm) / (bRe * bRe + bIm * bIm)
}
