/** Uniform numbers in [0, 1) that a seed fixes (the splitmix32 sequence). */
export function seededRandom(seed: number): () => number {
  let state = seed | 0
  return () => {
    state = (state + 0x9e3779b9) | 0
    let z = state ^ (state >>> 16)
    z = Math.imul(z, 0x21f0aaad)
    z ^= z >>> 15
    z = Math.imul(z, 0x735a2d97)
    return ((z ^ (z >>> 15)) >>> 0) / 4_294_967_296
  }
}
