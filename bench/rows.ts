/** One line of the benchmark: what was done, how long it took here and in the peer, and how far the results differ. */
export interface BenchRow {
  readonly name: string
  readonly oursMs: number
  readonly peerMs: number
  readonly peer: string
  /** Largest absolute difference between the two results, in the result's own unit. */
  readonly largestDifference: number
}

/** One benchmark: rows to compare, or a report that it prints itself. */
export interface Benchmark {
  readonly name: string
  run(): Promise<BenchRow[]> | void
}
