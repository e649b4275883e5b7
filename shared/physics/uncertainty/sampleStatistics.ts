/** Summary of one quantity's Monte Carlo sample, in the quantity's own unit. */
export interface SampleSummary {
  readonly mean: number
  /** Standard deviation of the sample (n − 1). */
  readonly uncertainty: number
  /** Probabilistically symmetric 95 % coverage interval (JCGM 101:2008, 7.7.2). */
  readonly interval95: readonly [number, number]
}

/** Values beyond this many standard deviations are looked through for the ends of the interval. */
const TAIL_CUT = 1.5

/** Mean, standard deviation and 95 % interval of a sample of at least 40 values. The sample is not changed. O(n). */
export function summarise(sample: Float64Array): SampleSummary {
  const count = sample.length
  const mean = meanOf(sample)
  let squares = 0
  for (let i = 0; i < count; i++) squares += (sample[i]! - mean) * (sample[i]! - mean)
  const uncertainty = Math.sqrt(squares / (count - 1))
  const inside = Math.round(0.95 * count)
  const below = Math.round((count - inside) / 2)
  // The standard's y_(r) and y_(r+q), counted from 1, are these ranks from the bottom.
  const low = valueOfRank(sample, Math.max(0, below - 1), mean, uncertainty)
  const high = valueOfRank(sample, Math.min(count - 1, below - 1 + inside), mean, uncertainty)
  return { mean, uncertainty, interval95: [low, high] }
}

/** The value with `rank` values below it. It mostly lies in a tail, which is then all that needs to be ordered. */
function valueOfRank(sample: Float64Array, rank: number, mean: number, uncertainty: number): number {
  const fromTop = sample.length - 1 - rank
  const lowTail = rank < fromTop
  const cut = mean + (lowTail ? -TAIL_CUT : TAIL_CUT) * uncertainty
  const tail = new Float64Array(sample.length)
  let size = 0
  for (let i = 0; i < sample.length; i++) {
    const value = sample[i]!
    if (lowTail ? value <= cut : value >= cut) tail[size++] = value
  }
  if (size > (lowTail ? rank : fromTop)) return orderStatistic(tail, lowTail ? rank : size - 1 - fromTop, size - 1)
  return orderStatistic(sample.slice(), rank, sample.length - 1)
}

function meanOf(sample: Float64Array): number {
  let sum = 0
  for (let i = 0; i < sample.length; i++) sum += sample[i]!
  return sum / sample.length
}

/** Correlation matrix of samples of equal length; a constant sample is correlated with itself only. O(n · samples²). */
export function sampleCorrelation(samples: readonly Float64Array[]): number[][] {
  const means = samples.map(meanOf)
  const covariance = samples.map(() => new Array<number>(samples.length).fill(0))
  samples.forEach((x, i) => {
    for (let j = 0; j <= i; j++) {
      const y = samples[j]!
      const mx = means[i]!
      const my = means[j]!
      let sum = 0
      for (let n = 0; n < x.length; n++) sum += (x[n]! - mx) * (y[n]! - my)
      covariance[i]![j] = sum
      covariance[j]![i] = sum
    }
  })
  return covariance.map((row, i) =>
    row.map((value, j) => {
      const scale = Math.sqrt(row[i]! * covariance[j]![j]!)
      return i === j ? 1 : scale > 0 ? value / scale : 0
    }),
  )
}

/** The value of a rank among the places 0 … last; reorders `values` (Hoare's selection, median of three). */
function orderStatistic(values: Float64Array, rank: number, last: number): number {
  let left = 0
  let right = last
  while (right > left) {
    const a = values[left]!
    const b = values[(left + right) >> 1]!
    const c = values[right]!
    const pivot = Math.max(Math.min(a, b), Math.min(Math.max(a, b), c))
    let i = left
    let j = right
    while (i <= j) {
      while (values[i]! < pivot) i++
      while (values[j]! > pivot) j--
      if (i <= j) {
        const swap = values[i]!
        values[i] = values[j]!
        values[j] = swap
        i++
        j--
      }
    }
    if (rank <= j) right = j
    else if (rank >= i) left = i
    else return values[rank]!
  }
  return values[rank]!
}
