/** One stratum of a comparison of two proportions: events among trials, of the one asked about and of those beside it. */
export interface Stratum {
  readonly events: number
  readonly trials: number
  readonly otherEvents: number
  readonly otherTrials: number
}

export interface StratifiedComparison {
  /**
   * Signed root of the Cochran–Mantel–Haenszel statistic with its continuity correction; null where no stratum can tell
   * (no event at all, or nothing but events).
   */
  readonly z: number | null
  /** Proportion over the others' proportion, common to all strata (Greenland & Robins, Biometrics 41:55, 1985). */
  readonly ratio: number | null
  /** Proportion of the others with the weights of that ratio; with one stratum simply their proportion. */
  readonly otherRate: number
}

/**
 * Compares a proportion with another one within strata and adds up what the strata say (Cochran, Biometrics 10:417, 1954;
 * Mantel & Haenszel, JNCI 22:719, 1959). Strata without trials on one side are left out.
 */
export function compareStratified(strata: readonly Stratum[]): StratifiedComparison {
  let [difference, variance, one, other, weight] = [0, 0, 0, 0, 0]
  for (const { events, trials, otherEvents, otherTrials } of strata) {
    if (trials === 0 || otherTrials === 0) continue
    const all = trials + otherTrials
    const hits = events + otherEvents
    difference += events - (trials * hits) / all
    variance += (trials * otherTrials * hits * (all - hits)) / (all * all * (all - 1))
    one += (events * otherTrials) / all
    other += (otherEvents * trials) / all
    weight += (trials * otherTrials) / all
  }
  const size = Math.max(0, Math.abs(difference) - 0.5)
  return {
    z: variance > 0 ? (Math.sign(difference) * size) / Math.sqrt(variance) : null,
    ratio: other > 0 ? one / other : null,
    otherRate: weight > 0 ? other / weight : 0,
  }
}

/** Beyond this the continued fraction takes over from the series. */
const SERIES_TO = 3
const TERMS = 200

/** P(Z > z) of a standard normal variable, to about fifteen digits (Abramowitz & Stegun 26.2.11 and 26.2.14). */
export function normalTail(z: number): number {
  if (z < 0) return 1 - normalTail(-z)
  const density = Math.exp((-z * z) / 2) / Math.sqrt(2 * Math.PI)
  if (z > SERIES_TO) {
    let fraction = z
    for (let k = TERMS; k > 0; k--) fraction = z + k / fraction
    return density / fraction
  }
  let [sum, term] = [z, z]
  for (let k = 3; k < TERMS; k += 2) sum += term *= (z * z) / k
  return 0.5 - density * sum
}

/**
 * Adjusted p-values of the false-discovery procedure (Benjamini & Hochberg, JRSS B 57:289, 1995): taking those that are at
 * most α keeps the expected share of false ones among them at most α.
 */
export function adjustedForDiscovery(pValues: ArrayLike<number>): Float64Array {
  const order = Array.from({ length: pValues.length }, (_, i) => i).sort((a, b) => pValues[b]! - pValues[a]!)
  const adjusted = new Float64Array(pValues.length)
  let least = 1
  order.forEach((i, k) => {
    least = Math.min(least, (pValues[i]! * pValues.length) / (pValues.length - k))
    adjusted[i] = least
  })
  return adjusted
}
