/** Fastest of `times` runs after a warm-up, ms: the least disturbed one. */
export function fastestMs(run: () => unknown, times: number): number {
  for (let i = 0; i < Math.min(times, 30); i++) run()
  let best = Infinity
  for (let i = 0; i < times; i++) {
    const start = performance.now()
    run()
    best = Math.min(best, performance.now() - start)
  }
  return best
}
