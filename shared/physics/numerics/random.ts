import { DomainError } from '../errors.js'

/** Random numbers that a report can draw again, bit for bit, from their seed. */
export interface RandomSource {
  /** Uniform in [0, 1), a multiple of 2⁻⁵³. */
  uniform(): number
  /** Uniform in [low, high). */
  between(low: number, high: number): number
  /** A whole number from 0 to count − 1. */
  below(count: number): number
  /** Normal with mean 0 and standard deviation 1. */
  normal(): number
}

/**
 * A seeded generator: sfc32 (128 bits of state, period at least 2³²) for uniform numbers, Marsaglia's polar method for
 * normal ones. The same seed gives the same numbers in every browser and on the server, apart from the last bit of
 * `Math.log` where an engine computes it otherwise.
 * Sources: C. Doty-Humphrey, PractRand (sfc32), from memory; G. Marsaglia, T. A. Bray, SIAM Review 6 (1964) 260.
 * @param seed a whole number from 0 to 2³² − 1.
 * @throws DomainError for another seed.
 */
export function seededRandom(seed: number): RandomSource {
  if (!Number.isInteger(seed) || seed < 0 || seed > 0xffffffff)
    throw new DomainError('seed', `seed is ${seed}; it must be a whole number from 0 to 4294967295.`)
  let a = 0x9e3779b9
  let b = 0x243f6a88
  let c = seed | 0
  let counter = 1
  const next = (): number => {
    const t = (((a + b) | 0) + counter) | 0
    counter = (counter + 1) | 0
    a = b ^ (b >>> 9)
    b = (c + (c << 3)) | 0
    c = ((c << 21) | (c >>> 11)) + t
    return t >>> 0
  }
  for (let i = 0; i < 15; i++) next()
  const uniform = (): number => (next() * 0x200000 + (next() >>> 11)) / 0x20000000000000
  let spare: number | null = null
  const normal = (): number => {
    if (spare !== null) {
      const value = spare
      spare = null
      return value
    }
    let x: number
    let y: number
    let s: number
    do {
      x = 2 * uniform() - 1
      y = 2 * uniform() - 1
      s = x * x + y * y
    } while (s >= 1 || s === 0)
    const factor = Math.sqrt((-2 * Math.log(s)) / s)
    spare = y * factor
    return x * factor
  }
  return {
    uniform,
    between: (low, high) => low + (high - low) * uniform(),
    below: (count) => Math.floor(count * uniform()),
    normal,
  }
}
