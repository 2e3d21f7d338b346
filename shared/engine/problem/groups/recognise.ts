/**
 * Groups of variables that look like constraints written as penalties: P (Σ x − k)² couples every pair of the group by
 * the same 2P and puts P(1 − 2k) on each member; 2P Σ x x, at most one of them, couples them alike and puts nothing.
 * Couplings of one value are covered by cliques (`cliques.ts`); they count where chance does not explain them
 * (`evidence.ts`); the linear terms then say what each demands (`kinds.ts`). The method is ours.
 */
import { graphFromEdges } from '../../graph/build'
import type { Problem } from '../problem'
import { coverByCliques } from './cliques'
import { bitsSaved } from './evidence'
import type { VariableGroup } from './group'
import { kindsOf, type PenaltySet } from './kinds'

export interface RecognisedGroup extends VariableGroup {
  /** P: half the value that dominates among the couplings of its pairs. */
  readonly weight: number
}

export interface Recognition {
  /** Largest first, then by lowest member. */
  readonly groups: RecognisedGroup[]
  /** False when the work allowed was spent before all couplings were looked at. */
  readonly complete: boolean
}

export const RECOGNITION_DEFAULTS = {
  /** List entries that may be read in all: a second or two. */
  maxWork: 100_000_000,
  /** Values that are looked at, most frequent first. */
  maxValues: 512,
  /** Relative difference of couplings that count as equal. */
  equal: 1e-9,
  /** Where no two are equal: the width of the band of values, and how many bands are tried. */
  band: 0.1,
  bands: 8,
  /** Bits that the sets of one value must save together, if they cover so much of its pairs; else each for itself. */
  bitsTogether: 5,
  coverage: 0.6,
  bitsAlone: 20,
}

type Options = typeof RECOGNITION_DEFAULTS

interface Candidate extends PenaltySet {
  readonly inside: number
}

/** Interactions of one value, by their numbers. */
type ValueClass = readonly number[]

/** Numbers of the couplings above zero, by ascending value. */
const positiveByValue = ({ values }: Problem): number[] =>
  Array.from(values.keys())
    .filter((k) => values[k]! > 0)
    .sort((a, b) => values[a]! - values[b]! || a - b)

/** Runs of equal values of three couplings or more, most frequent first. */
function equalValues({ values }: Problem, sorted: readonly number[], { equal, maxValues }: Options): ValueClass[] {
  const classes: number[][] = []
  let run: number[] = []
  for (const k of sorted) {
    if (run.length > 0 && values[k]! > values[run[0]!]! * (1 + equal)) {
      classes.push(run)
      run = []
    }
    run.push(k)
  }
  classes.push(run)
  return classes
    .filter(({ length }) => length >= 3)
    .sort((a, b) => b.length - a.length)
    .slice(0, maxValues)
}

/** The band of values, so wide in proportion, that holds most couplings. */
function fullestBand({ values }: Problem, sorted: readonly number[], band: number): ValueClass {
  let best: readonly [number, number] = [0, 0]
  for (let low = 0, high = 0; high < sorted.length; high++) {
    while (values[sorted[high]!]! > values[sorted[low]!]! * (1 + band)) low++
    if (high + 1 - low > best[1] - best[0]) best = [low, high + 1]
  }
  return sorted.slice(...best)
}

class Recogniser {
  readonly accepted: Candidate[] = []
  complete = true
  private work = 0
  private readonly localOf: Int32Array

  constructor(
    private readonly problem: Problem,
    private readonly options: Options,
  ) {
    this.localOf = new Int32Array(problem.n).fill(-1)
  }

  /** The graph of these interactions on the variables that they join, and those variables. */
  private graphOf(interactions: ValueClass) {
    const { rows, cols } = this.problem
    const variables = [...new Set(interactions.flatMap((k) => [rows[k]!, cols[k]!]))].sort((a, b) => a - b)
    variables.forEach((v, local) => (this.localOf[v] = local))
    const ends = interactions.flatMap((k) => [this.localOf[rows[k]!]!, this.localOf[cols[k]!]!])
    return { variables, graph: graphFromEdges(variables.length, ends) }
  }

  private candidatesOf(interactions: ValueClass): Candidate[] {
    const { maxWork } = this.options
    const { variables, graph } = this.graphOf(interactions)
    const cover = coverByCliques(graph, maxWork - this.work)
    this.work += cover.work
    this.complete &&= cover.complete
    const middle = interactions[interactions.length >> 1]!
    const weight = this.problem.values[middle]! / 2
    return cover.sets.map((set, g) => ({
      members: set.map((local) => variables[local]!),
      weight,
      inside: cover.edges[g]!,
    }))
  }

  private bits(pairs: number, candidates: readonly Candidate[]): number {
    const kinds = kindsOf(this.problem.linear, [...this.accepted, ...candidates]).slice(this.accepted.length)
    const foretold = kinds.reduce((sum, kind) => sum + kind.foretold, 0)
    const exact = kinds.reduce(
      (sum, { kind }, g) => sum + (kind?.kind === 'exactly' ? candidates[g]!.members.length : 0),
      0,
    )
    const sets = candidates.map(({ members, inside }) => ({ size: members.length, inside }))
    return bitsSaved({ n: this.problem.n, pairs, sets, foretold, notForetold: Math.max(0, exact - foretold) })
  }

  /** Accepts the sets of a class together, those that stand by themselves, or none. */
  consider(interactions: ValueClass, bitsMore = 0): void {
    const { bitsTogether, coverage, bitsAlone } = this.options
    const candidates = this.candidatesOf(interactions)
    const covered = candidates.reduce((sum, { inside }) => sum + inside, 0)
    const pairs = interactions.length
    if (covered >= coverage * pairs && this.bits(pairs, candidates) >= bitsTogether + bitsMore)
      this.accepted.push(...candidates)
    else this.accepted.push(...candidates.filter((one) => this.bits(pairs, [one]) >= bitsAlone + bitsMore))
  }

  /** The couplings among these that lie in no accepted set. */
  outside(interactions: readonly number[]): number[] {
    const { rows, cols, n } = this.problem
    const inside = new Set<number>()
    for (const { members } of this.accepted)
      for (const a of members) for (const b of members) if (a < b) inside.add(a * n + b)
    return interactions.filter((k) => !inside.has(rows[k]! * n + cols[k]!))
  }
}

/** Kinds of the sets; those whose linear terms fit none are left out, and the others judged again without them. */
function withKinds(linear: Float64Array, candidates: readonly Candidate[]): RecognisedGroup[] {
  const kinds = kindsOf(linear, candidates)
  const fitting = candidates.filter((_, g) => kinds[g]!.kind !== null)
  if (fitting.length < candidates.length) return withKinds(linear, fitting)
  return candidates.map(({ members, weight }, g) => ({ ...kinds[g]!.kind!, members, weight }))
}

/**
 * Looks for groups in a QUBO to be minimised. Groups of two are not looked for: any coupling above zero is one. The same
 * problem always gives the same answer: the effort is counted, not timed.
 */
export function recogniseGroups(qubo: Problem, options: Partial<Options> = {}): Recognition {
  const all = { ...RECOGNITION_DEFAULTS, ...options }
  const recogniser = new Recogniser(qubo, all)
  const sorted = positiveByValue(qubo)
  for (const interactions of equalValues(qubo, sorted, all)) recogniser.consider(interactions)
  let left = recogniser.outside(sorted)
  for (let tried = 0; tried < all.bands; tried++) {
    const band = fullestBand(qubo, left, all.band)
    if (band.length < 3) break
    // Of many bands, one was chosen.
    recogniser.consider(band, Math.log2(left.length))
    const taken = new Set(band)
    left = left.filter((k) => !taken.has(k))
  }
  const groups = withKinds(qubo.linear, recogniser.accepted)
  groups.sort((a, b) => b.members.length - a.members.length || a.members[0]! - b.members[0]!)
  return { groups, complete: recogniser.complete }
}
