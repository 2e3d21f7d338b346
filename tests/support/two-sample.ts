/**
 * Two-sample test of distributions (Kolmogorov 1933, Smirnov 1939): the largest distance of the empirical distribution
 * functions, and the probability of one as large if both samples come from the same distribution, in the asymptotic form with
 * Stephens' correction (J. R. Stat. Soc. B 32:115, 1970; from memory). Good from some ten values a sample on.
 */
export function kolmogorovSmirnov(a: ArrayLike<number>, b: ArrayLike<number>): { distance: number; p: number } {
  const [x, y] = [Float64Array.from(a).sort(), Float64Array.from(b).sort()]
  let distance = 0
  for (let i = 0, j = 0; i < x.length && j < y.length;) {
    const value = Math.min(x[i]!, y[j]!)
    while (i < x.length && x[i]! <= value) i++
    while (j < y.length && y[j]! <= value) j++
    distance = Math.max(distance, Math.abs(i / x.length - j / y.length))
  }
  const root = Math.sqrt((x.length * y.length) / (x.length + y.length))
  const lambda = (root + 0.12 + 0.11 / root) * distance
  let p = 0
  for (let k = 1; k <= 100; k++) p += 2 * (-1) ** (k - 1) * Math.exp(-2 * k * k * lambda * lambda)
  return { distance, p: lambda < 0.2 ? 1 : Math.min(1, Math.max(0, p)) }
}

/** Pearson's χ² of counts against expected ones; cells that expect fewer than 5 are put together. Degrees of freedom beside it. */
export function chiSquared(seen: ArrayLike<number>, expected: ArrayLike<number>): { value: number; freedom: number } {
  let [value, freedom, rareSeen, rareExpected] = [0, -1, 0, 0]
  const add = (count: number, mean: number): void => {
    value += (count - mean) ** 2 / mean
    freedom++
  }
  for (let k = 0; k < expected.length; k++) {
    if (expected[k]! >= 5) add(seen[k]!, expected[k]!)
    else {
      rareSeen += seen[k]!
      rareExpected += expected[k]!
    }
  }
  if (rareExpected > 0) add(rareSeen, Math.max(rareExpected, 1))
  return { value, freedom }
}

/** χ² has mean f and standard deviation √(2f): the most that four deviations allow. */
export const mostChiSquared = (freedom: number): number => freedom + 4 * Math.sqrt(2 * freedom)
