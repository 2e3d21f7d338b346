export interface Interval {
  readonly low: number
  readonly high: number
}

export interface SuccessProbability extends Interval {
  readonly successes: number
  readonly trials: number
  /** successes / trials; 0 without trials. */
  readonly p: number
}

/** Two-sided 95 % quantile of the standard normal distribution. */
export const Z_95 = 1.959964
/** Confidence of R99. */
export const DEFAULT_CONFIDENCE = 0.99

/**
 * Wilson's score interval of a proportion (Wilson, JASA 22:209, 1927); without trials all of 0 … 1.
 * @throws RangeError unless 0 ≤ successes ≤ trials and z ≥ 0
 */
export function wilson(successes: number, trials: number, z = Z_95): Interval {
  if (!(successes >= 0 && successes <= trials && Number.isFinite(trials)))
    throw new RangeError(`${successes} successes in ${trials} trials`)
  if (!(z >= 0)) throw new RangeError(`z must not be negative: ${z}`)
  if (trials === 0) return { low: 0, high: 1 }
  const p = successes / trials
  const z2 = z * z
  const centre = (successes + z2 / 2) / (trials + z2)
  const half = (z * Math.sqrt(p * (1 - p) * trials + z2 / 4)) / (trials + z2)
  return {
    low: successes === 0 ? 0 : Math.max(0, centre - half),
    high: successes === trials ? 1 : Math.min(1, centre + half),
  }
}

/** A success probability with its Wilson interval. */
export function successProbability(successes: number, trials: number, z = Z_95): SuccessProbability {
  return { successes, trials, p: trials > 0 ? successes / trials : 0, ...wilson(successes, trials, z) }
}

/**
 * Reads needed to see at least one success with the given confidence, ln(1 − confidence) / ln(1 − p), not rounded and at
 * least 1; Infinity for p = 0. With confidence 0.99 it is R99 (Rønnow et al., Science 345:420, 2014).
 * @throws RangeError unless 0 ≤ p ≤ 1 and 0 < confidence < 1
 */
export function readsForConfidence(p: number, confidence = DEFAULT_CONFIDENCE): number {
  if (!(p >= 0 && p <= 1)) throw new RangeError(`a probability lies in 0 … 1, not ${p}`)
  if (!(confidence > 0 && confidence < 1)) throw new RangeError(`a confidence lies between 0 and 1, not ${confidence}`)
  if (p === 0) return Infinity
  return Math.max(1, Math.log1p(-confidence) / Math.log1p(-p))
}

/** The interval of the reads needed that follows from an interval of p: the count falls as p rises, so the ends swap. */
export function readsForConfidenceInterval(p: Interval, confidence = DEFAULT_CONFIDENCE): Interval {
  return { low: readsForConfidence(p.high, confidence), high: readsForConfidence(p.low, confidence) }
}

/** Time to solution, reads × time per read, in the unit of `timePerRead`, with its interval. */
export function timeToSolution(
  success: SuccessProbability,
  timePerRead: number,
  confidence = DEFAULT_CONFIDENCE,
): Interval & { readonly time: number } {
  const { low, high } = readsForConfidenceInterval(success, confidence)
  return {
    time: readsForConfidence(success.p, confidence) * timePerRead,
    low: low * timePerRead,
    high: high * timePerRead,
  }
}
