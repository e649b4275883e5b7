/**
 * Bulk random numbers of mean 0 and standard deviation 1 for the Monte Carlo, from 32-bit integers: sfc32 (Doty-Humphrey's
 * small fast counting generator, passes PractRand) and the ziggurat of Marsaglia & Tsang (J. Stat. Softw. 5 (2000) 8) with 256
 * layers, the layer taken from eight bits and the value from the other twenty-four, so that the two are independent
 * (Doornik 2005). Values are resolved to 2⁻²³ of a layer's width. The same seed and name give the same numbers, however
 * many are asked for at a time.
 */
const LAYERS = 256
const TAIL_START = 3.6541528853610088
const LAYER_AREA = 0.00492867323399
const HALF_RANGE = 0x800000
const SQRT_3 = Math.sqrt(3)

const edge = new Float64Array(LAYERS + 1)
const density = new Float64Array(LAYERS + 1)
const step = new Float64Array(LAYERS)
const inner = new Int32Array(LAYERS)

edge[0] = LAYER_AREA / Math.exp(-0.5 * TAIL_START * TAIL_START)
edge[1] = TAIL_START
for (let i = 2; i < LAYERS; i++) {
  const below = edge[i - 1]!
  edge[i] = Math.sqrt(-2 * Math.log(LAYER_AREA / below + Math.exp(-0.5 * below * below)))
}
for (let i = 0; i <= LAYERS; i++) density[i] = Math.exp(-0.5 * edge[i]! * edge[i]!)
for (let i = 0; i < LAYERS; i++) {
  step[i] = edge[i]! / HALF_RANGE
  inner[i] = Math.floor((edge[i + 1]! / edge[i]!) * HALF_RANGE)
}

/** One reproducible stream of random numbers. */
export class StandardDraws {
  /** The generator's three words and its counter. */
  private readonly state: Int32Array

  /** @param seed a whole number. @param name separates streams of the same seed. */
  constructor(seed: number, name: string) {
    const text = `${seed} ${name}`
    this.state = Int32Array.of(hash(text, 0x811c9dc5), hash(text, 0x9e3779b9), hash(text, 0x243f6a88), 1)
    for (let i = 0; i < 15; i++) this.nextInteger()
  }

  /** Fills the first `count` places with standard normal numbers. */
  fillNormal(out: Float64Array, count: number): void {
    const { state } = this
    const limit = inner
    const scale = step
    let a = state[0]!
    let b = state[1]!
    let c = state[2]!
    let d = state[3]!
    for (let n = 0; n < count; n++) {
      const bits = (((a + b) | 0) + d) | 0
      d = (d + 1) | 0
      a = b ^ (b >>> 9)
      b = (c + (c << 3)) | 0
      c = (((c << 21) | (c >>> 11)) + bits) | 0
      const layer = bits & 255
      const value = bits >> 8
      let z = value * scale[layer]!
      // |value| without a branch, which would be mispredicted every other time.
      if ((value ^ (value >> 31)) >= limit[layer]!) {
        state[0] = a
        state[1] = b
        state[2] = c
        state[3] = d
        z = this.outsideLayer(layer, value)
        a = state[0]!
        b = state[1]!
        c = state[2]!
        d = state[3]!
      }
      out[n] = z
    }
    state[0] = a
    state[1] = b
    state[2] = c
    state[3] = d
  }

  /** Fills the first `count` places with numbers evenly distributed over ±√3. */
  fillRectangular(out: Float64Array, count: number): void {
    for (let n = 0; n < count; n++) out[n] = SQRT_3 * (2 * this.nextFraction() - 1)
  }

  /** A fraction above 0 and below 1. */
  private nextFraction(): number {
    return ((this.nextInteger() >>> 0) + 0.5) / 4294967296
  }

  private nextInteger(): number {
    const { state } = this
    const [a, b, c, d] = [state[0]!, state[1]!, state[2]!, state[3]!]
    const bits = (((a + b) | 0) + d) | 0
    state[0] = b ^ (b >>> 9)
    state[1] = (c + (c << 3)) | 0
    state[2] = (((c << 21) | (c >>> 11)) + bits) | 0
    state[3] = (d + 1) | 0
    return bits
  }

  /** The one draw in a hundred that falls outside the rectangle of its layer: the wedge or the tail, else a new draw. */
  private outsideLayer(firstLayer: number, firstValue: number): number {
    let layer = firstLayer
    let value = firstValue
    for (;;) {
      if (Math.abs(value) < inner[layer]!) return value * step[layer]!
      if (layer === 0) return value < 0 ? -this.tail() : this.tail()
      const z = value * step[layer]!
      const height = density[layer]! + this.nextFraction() * (density[layer + 1]! - density[layer]!)
      if (height < Math.exp(-0.5 * z * z)) return z
      const bits = this.nextInteger()
      layer = bits & 255
      value = bits >> 8
    }
  }

  /** A normal number beyond the last layer (Marsaglia 1964). */
  private tail(): number {
    for (;;) {
      const beyond = -Math.log(this.nextFraction()) / TAIL_START
      const height = -Math.log(this.nextFraction())
      if (2 * height > beyond * beyond) return TAIL_START + beyond
    }
  }
}

/** FNV-1a over the UTF-16 units with another offset basis for each word of the state, then a finishing mix. */
function hash(text: string, basis: number): number {
  let h = basis
  for (let i = 0; i < text.length; i++) h = Math.imul(h ^ text.charCodeAt(i), 0x01000193)
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b)
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35)
  return (h ^ (h >>> 16)) | 0
}
