import type { PartCounts } from './part-breaks'
import { NO_PULL } from './pulls'
import type { Stratum } from './proportion-tests'
import { adjustedForDiscovery, compareStratified, normalTail } from './proportion-tests'

export const SUSPECT_RULE = {
  /** Parts that one is compared with in each return, and the fewest that tell anything … */
  neighbours: 12,
  leastNeighbours: 4,
  /** … the nearest of so many that are pulled most nearly as hard … */
  alike: 24,
  /** … and at least and at most so much as hard. */
  pullFrom: 0.8,
  pullTo: 1.5,
  /** A suspect breaks at least so many times as often as its neighbours … */
  leastRatio: 2,
  /** … in at least so many reads … */
  leastBreaks: 10,
  /** … and the expected share of false ones among all suspects is at most this. */
  falseShare: 0.01,
} as const

/** Parts of one kind in one return; `part` tells which of all parts each is. */
export interface ReturnParts extends PartCounts {
  readonly reads: number
  /** Returns with the same number come from the same embedding: what sets a part apart there is the same in all of them. */
  readonly embedding: number
  readonly part: Uint32Array
  /** 1 for parts that are counted but neither compared nor compared with; none where it is left out. */
  readonly left?: Uint32Array
}

export interface PartsInput {
  /** Middle of every part on the lattice, in line spacings. */
  readonly x: Float64Array
  readonly y: Float64Array
  readonly returns: readonly ReturnParts[]
}

/** A part beside its neighbours. */
export interface JudgedPart {
  /** Reads in which it broke, and all reads, over all returns. */
  readonly count: number
  readonly total: number
  /** Parts it was compared with, summed over returns; 0 where there were too few like it. */
  readonly neighbours: number
  /** Null where there was nothing to compare with, or nothing ever broke. */
  readonly neighbourRate: number | null
  readonly ratio: number | null
  /** Adjusted for the number of parts that were compared; null where it was not. */
  readonly q: number | null
  readonly suspect: boolean
}

export interface Judgement {
  readonly parts: readonly JudgedPart[]
  readonly tested: number
  /**
   * How much like parts of one embedding differ anyway, beyond what chance makes of so many reads: standard deviation of
   * the natural logarithm of the rate over the neighbours'. It widens every comparison, less where several embeddings
   * used the part.
   */
  readonly spread: number
}

interface Compared {
  readonly strata: (Stratum & { readonly embedding: number })[]
  neighbours: number
}

/** Indices of the parts of a return that are compared, in the order of their pull. */
const byPull = ({ pull, left }: ReturnParts): Uint32Array =>
  Uint32Array.from(pull.keys())
    .filter((k) => !left?.[k])
    .sort((a, b) => pull[a]! - pull[b]! || a - b)

/** Places in the order of pulls around `at` whose pull is closest, at most as many as the rule says. */
function alikeAround(order: Uint32Array, pull: Float32Array, at: number): number[] {
  const own = pull[order[at]!]!
  const [from, to] = own === NO_PULL ? [own, own] : [SUSPECT_RULE.pullFrom * own, SUSPECT_RULE.pullTo * own]
  const offAt = (place: number): number => {
    const value = place >= 0 && place < order.length ? pull[order[place]!]! : NaN
    return value >= from && value <= to ? Math.abs(value - own) : Infinity
  }
  const alike: number[] = []
  let [before, after] = [at - 1, at + 1]
  while (alike.length < SUSPECT_RULE.alike) {
    const [lower, higher] = [offAt(before), offAt(after)]
    if (lower === Infinity && higher === Infinity) break
    alike.push(order[lower < higher ? before-- : after++]!)
  }
  return alike
}

/** Parts of a return that the one at a place in the order is compared with. */
function neighboursOf({ x, y }: PartsInput, { part, pull }: ReturnParts, order: Uint32Array, at: number): number[] {
  const own = part[order[at]!]!
  const far = (k: number): number => (x[part[k]!]! - x[own]!) ** 2 + (y[part[k]!]! - y[own]!) ** 2
  return alikeAround(order, pull, at)
    .map((k) => ({ k, distance: far(k) }))
    .sort((a, b) => a.distance - b.distance || a.k - b.k)
    .slice(0, SUSPECT_RULE.neighbours)
    .map(({ k }) => k)
}

/** Adds what one return says of each of its parts. */
function compareWithin(input: PartsInput, parts: ReturnParts, compared: Compared[]): void {
  const order = byPull(parts)
  order.forEach((k, at) => {
    const others = neighboursOf(input, parts, order, at)
    if (others.length < SUSPECT_RULE.leastNeighbours) return
    const entry = compared[parts.part[k]!]!
    entry.neighbours += others.length
    entry.strata.push({
      embedding: parts.embedding,
      events: parts.breaks[k]!,
      trials: parts.reads,
      otherEvents: others.reduce((sum, j) => sum + parts.breaks[j]!, 0),
      otherTrials: others.length * parts.reads,
    })
  })
}

/** A comparison on one embedding on the scale of logarithms. */
interface Deviation {
  readonly log: number
  /** What chance alone makes of it. */
  readonly variance: number
}

/**
 * Logarithm of the rate over the neighbours' rate on each embedding, half a break added everywhere so that it is finite,
 * with its variance (Katz, Baptista, Azen & Pike, Biometrics 34:469, 1978). Embeddings on which nothing broke say nothing.
 */
function deviationsOf(strata: Compared['strata']): Deviation[] {
  const sums = new Map<number, Stratum>()
  for (const { embedding, ...one } of strata) {
    const sum = sums.get(embedding) ?? { events: 0, trials: 0, otherEvents: 0, otherTrials: 0 }
    sums.set(embedding, {
      events: sum.events + one.events,
      trials: sum.trials + one.trials,
      otherEvents: sum.otherEvents + one.otherEvents,
      otherTrials: sum.otherTrials + one.otherTrials,
    })
  }
  return [...sums.values()]
    .filter(({ events, otherEvents }) => events + otherEvents > 0)
    .map(({ events, trials, otherEvents, otherTrials }) => ({
      log: Math.log((events + 0.5) / (trials + 0.5) / ((otherEvents + 0.5) / (otherTrials + 0.5))),
      variance: 1 / (events + 0.5) - 1 / (trials + 0.5) + 1 / (otherEvents + 0.5) - 1 / (otherTrials + 0.5),
    }))
}

const MEDIAN_OF_NORMAL = 0.674489750196082
const LARGEST_SPREAD = 10

function medianOf(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[sorted.length >> 1] ?? 0
}

interface Usual {
  /** Median of the logarithms: rates are skewed, so most parts lie below the mean of their neighbours. */
  readonly centre: number
  readonly spread: number
}

/**
 * How far like parts lie apart on one embedding beyond chance: the least standard deviation at which the median size of
 * the standardised deviations is at most a normal variable's. Medians keep the few that are sought out of it.
 */
function usualOf(deviations: readonly Deviation[]): Usual {
  const centre = medianOf(deviations.map(({ log }) => log))
  const median = (spread: number): number =>
    medianOf(deviations.map(({ log, variance }) => Math.abs(log - centre) / Math.sqrt(variance + spread * spread)))
  if (median(0) <= MEDIAN_OF_NORMAL) return { centre, spread: 0 }
  let [low, high] = [0, LARGEST_SPREAD]
  for (let step = 0; step < 40; step++) {
    const middle = (low + high) / 2
    if (median(middle) > MEDIAN_OF_NORMAL) low = middle
    else high = middle
  }
  return { centre, spread: high }
}

/** Random-effects mean of the deviations over its standard error (DerSimonian & Laird, Controlled Clin. Trials 7:177, 1986). */
function standardised(deviations: readonly Deviation[], { centre, spread }: Usual): number {
  let [sum, weights] = [0, 0]
  for (const { log, variance } of deviations) {
    const weight = 1 / (variance + spread * spread)
    sum += weight * (log - centre)
    weights += weight
  }
  return sum / Math.sqrt(weights)
}

/**
 * Compares every part with its neighbours: in each return the nearest parts that are pulled about as hard, so that the
 * middle of a long weak chain is held against other such places only. Returns are strata, which may differ in strength
 * and number of reads. Parts differ for many more reasons than these; how much they do is measured on all of them at
 * once, and only a part that stands out from that is a suspect (docs/formulas.md, Breaks by part).
 * @returns a judgement of each of the x.length parts, in their order
 */
export function judgeParts(input: PartsInput): Judgement {
  const n = input.x.length
  const [counts, totals] = [new Float64Array(n), new Float64Array(n)]
  const compared: Compared[] = Array.from({ length: n }, () => ({ strata: [], neighbours: 0 }))
  for (const parts of input.returns) {
    parts.part.forEach((part, k) => {
      counts[part]! += parts.breaks[k]!
      totals[part]! += parts.reads
    })
    compareWithin(input, parts, compared)
  }
  const results = compared.map(({ strata }) => compareStratified(strata))
  const tested = results.flatMap(({ z }, part) => (z === null ? [] : [{ part, z }]))
  const deviations = compared.map(({ strata }) => deviationsOf(strata))
  const usual = usualOf(deviations.flat())
  const pValues = tested.map(({ part, z }) => normalTail(Math.min(z, standardised(deviations[part]!, usual))))
  const adjusted = adjustedForDiscovery(pValues)
  const q = new Map(tested.map(({ part }, k) => [part, adjusted[k]!]))
  const { leastRatio, leastBreaks, falseShare } = SUSPECT_RULE
  return {
    tested: tested.length,
    spread: usual.spread,
    parts: results.map(({ ratio, otherRate }, part) => {
      const own = q.get(part) ?? null
      const often = counts[part]! >= leastBreaks && (ratio === null || ratio >= leastRatio)
      return {
        count: counts[part]!,
        total: totals[part]!,
        neighbours: compared[part]!.neighbours,
        neighbourRate: compared[part]!.neighbours > 0 ? otherRate : null,
        ratio,
        q: own,
        suspect: own !== null && own <= falseShare && often,
      }
    }),
  }
}
