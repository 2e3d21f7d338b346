/**
 * Sums of doubles without rounding error until the very end.
 *
 * The running sum is held as an expansion of non-overlapping doubles, grown by error-free additions (TwoSum: Knuth,
 * The Art of Computer Programming 2, 1969; Ogita, Rump & Oishi, Accurate sum and dot product, SIAM J. Sci. Comput. 26,
 * 2005; expansions: Shewchuk, Adaptive precision floating-point arithmetic, Discrete Comput. Geom. 18, 1997). Two
 * components would do for most data; keeping all of them makes the result the exact sum rounded once, so it depends
 * on neither the order of the terms nor their range.
 */

/** A double spans 2098 bits and each component holds 53 of them without overlap: 40 components and one to carry. */
const COMPONENTS = 48

/** An accumulator to be used again and again: `reset`, `add` …, `value`. */
export class ExactSum {
  private readonly parts = new Float64Array(COMPONENTS)
  private length = 0

  reset(): void {
    this.length = 0
  }

  /** Adds a finite number. O(components), mostly one or two. */
  add(term: number): void {
    const parts = this.parts
    let carry = term
    let kept = 0
    for (let k = 0; k < this.length; k++) {
      const part = parts[k]!
      const sum = carry + part
      const partShare = sum - carry
      const error = carry - (sum - partShare) + (part - partShare)
      if (error !== 0) parts[kept++] = error
      carry = sum
    }
    if (carry !== 0) parts[kept++] = carry
    this.length = kept
  }

  /** The exact sum rounded to the nearest double, ties to even; never −0; not finite when the sum overflowed. */
  value(): number {
    const parts = this.parts
    let k = this.length - 1
    if (k < 0) return 0
    let high = parts[k]!
    let low = 0
    while (k > 0 && low === 0) {
      const before = high
      const part = parts[--k]!
      high = before + part
      low = part - (high - before)
    }
    // A remainder of exactly half a unit was rounded to even without regard to what lies below it.
    if (k > 0 && low !== 0 && low < 0 === parts[k - 1]! < 0) {
      const doubled = 2 * low
      const moved = high + doubled
      if (moved - high === doubled) high = moved
    }
    return high
  }
}

/** The exact sum of finite numbers, rounded once. */
export function exactSum(terms: ArrayLike<number>): number {
  const sum = new ExactSum()
  for (let k = 0; k < terms.length; k++) sum.add(terms[k]!)
  return sum.value()
}
