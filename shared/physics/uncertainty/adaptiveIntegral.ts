/** Positive nodes of the 15-point Kronrod rule (odd entries are those of the 7-point Gauss rule) and both weights. */
const NODES = [
  0.9914553711208126, 0.9491079123427585, 0.8648644233597691, 0.7415311855993945, 0.5860872354676911,
  0.4058451513773972, 0.2077849550078985, 0,
]
const KRONROD = [
  0.0229353220105292, 0.0630920926299786, 0.1047900103222502, 0.1406532597155259, 0.1690047266392679,
  0.1903505780647854, 0.2044329400752989, 0.2094821410847278,
]
const GAUSS = [0.1294849661688697, 0.2797053914892767, 0.3818300505051189, 0.4179591836734694]

/** Halving stops here, so that a step in the integrand costs 2⁻³⁰ of the interval and not an endless search. */
const DEEPEST = 30

/**
 * ∫ f over [from, to] by the Gauss–Kronrod pair (7, 15) with halving where the two disagree (QUADPACK, Piessens et al.
 * 1983). Steps in f are allowed. `tolerance` is absolute; each half gets half of it.
 */
export function adaptiveIntegral(
  f: (x: number) => number,
  from: number,
  to: number,
  tolerance: number,
  depth = 0,
): number {
  if (!(to > from)) return 0
  const centre = 0.5 * (from + to)
  const half = 0.5 * (to - from)
  let kronrod = 0
  let gauss = 0
  for (let i = 0; i < 8; i++) {
    const offset = half * NODES[i]!
    const pair = offset === 0 ? f(centre) : f(centre - offset) + f(centre + offset)
    kronrod += KRONROD[i]! * pair
    if (i % 2 === 1) gauss += GAUSS[(i - 1) / 2]! * pair
  }
  if (half * Math.abs(kronrod - gauss) <= tolerance || depth >= DEEPEST) return half * kronrod
  return (
    adaptiveIntegral(f, from, centre, 0.5 * tolerance, depth + 1) +
    adaptiveIntegral(f, centre, to, 0.5 * tolerance, depth + 1)
  )
}
