/**
 * How strong the penalty of a group is beside what the rest of the objective can gain by breaking it. With r the
 * coefficients of the problem less the penalties of all its groups, switching member i off changes the rest by at most
 * `D_i = −r_i + Σ_j max(0, −r_ij)`, switching it on by at most `U_i = r_i + Σ_j max(0, r_ij)`; each such step towards an
 * exact group takes at least P off its penalty, and 2P off that of an at-most-one group. A state with more than k
 * members set has one to switch off whose D is not among the k largest; one with fewer has more than s − k to switch on,
 * so one whose U is not among the s − k largest. So if no other group shares a member, every optimum keeps the group when
 *   P > max(D_(k+1), U_(s−k+1))  (exactly k of s),   2P > D_(2)  (at most one),
 * where X_(m) is the m-th largest, and at least 0. Groups that share variables cannot be mended one by one. There the
 * same follows from the whole cluster of groups that hang together: setting its variables anew changes the rest by at
 * most the sum of |r| over them and their interactions, so a P above that is enough as long as some state keeps all of
 * its groups. The argument is ours.
 */
import type { Problem } from '../problem'
import { linearOfPenalty, type VariableGroup } from './group'
import { EQUAL, Ground, RestAt, restOf, type Penalised } from './rest'

export type PenaltyVerdict = 'strong enough' | 'larger than needed' | 'beats single changes' | 'may be too weak'

export interface PenaltyReport {
  /** P; null where no value dominates among the couplings of the pairs, or the kind has no penalty of its own. */
  readonly weight: number | null
  /** Pairs of members, those of them not coupled by 2P, and by how much the worst of them differs. */
  readonly pairs: number
  readonly pairsDeviating: number
  readonly greatestDeviation: number
  /** Other groups that share a member. */
  readonly overlaps: number
  /** The P that outweighs every change of one member while the other groups hold. */
  readonly single: number | null
  /** A P above this is enough by the bound. */
  readonly sufficient: number | null
  readonly verdict: PenaltyVerdict | null
}

const DEFAULTS = {
  /** Share of the pairs that must have the value that dominates. */
  dominating: 0.5,
  /** P over what is enough from which it is called larger than needed. */
  excess: 3,
  /** Pairs of members looked at in all groups. */
  maxPairs: 10_000_000,
}

export const pairsOf = (size: number): number => (size * (size - 1)) / 2

/** Half the most frequent coupling above zero among the members' pairs, if it dominates. */
function weightOf(ground: Ground, members: readonly number[]): number | null {
  const couplings: number[] = []
  ground.forPairs(members, (k) => {
    if (ground.problem.values[k]! > 0) couplings.push(ground.problem.values[k]!)
  })
  couplings.sort((a, b) => a - b)
  let best = { value: 0, count: 0 }
  for (let low = 0, high = 0; high < couplings.length; high++) {
    while (couplings[high]! > couplings[low]! * (1 + EQUAL)) low++
    if (high + 1 - low > best.count) best = { value: couplings[low]!, count: high + 1 - low }
  }
  return best.count > DEFAULTS.dominating * pairsOf(members.length) ? best.value / 2 : null
}

function deviationsOf(ground: Ground, members: readonly number[], weight: number) {
  let [met, equal, greatest] = [0, 0, 0]
  ground.forPairs(members, (k) => {
    met++
    const difference = Math.abs(ground.problem.values[k]! - 2 * weight)
    if (difference <= EQUAL * 2 * weight) equal++
    else greatest = Math.max(greatest, difference)
  })
  const pairs = pairsOf(members.length)
  return { pairsDeviating: pairs - equal, greatestDeviation: met < pairs ? Math.max(greatest, 2 * weight) : greatest }
}

/** The m-th largest, 0 when it is negative or there are fewer. */
function largest(values: readonly number[], m: number): number {
  return Math.max(0, values.toSorted((a, b) => b - a)[m - 1] ?? 0)
}

type Gains = (i: number) => number

/** The P that outweighs what the rest gains by a change of one member towards the group, by the bounds D and U. */
function neededFor({ kind, k, members }: VariableGroup, off: Gains, on: Gains): number {
  if (kind === 'at most') return largest(members.map(off), 2) / 2
  return Math.max(largest(members.map(off), k + 1), largest(members.map(on), members.length - k + 1))
}

/** Groups of each variable, by number. */
function groupsAt(groups: readonly VariableGroup[]): Map<number, number[]> {
  const at = new Map<number, number[]>()
  groups.forEach(({ members }, g) =>
    members.forEach((i) => {
      const list = at.get(i)
      if (list) list.push(g)
      else at.set(i, [g])
    }),
  )
  return at
}

/**
 * The most that couplings can sum to while other groups hold: of each group at most k partners are set. A partner in
 * several groups counts with the one that holds most of them.
 */
function mostWithin(
  couplings: readonly { partner: number; value: number }[],
  groups: readonly VariableGroup[],
  at: Map<number, number[]>,
): number {
  const limited = (g: number): boolean => groups[g]!.kind !== 'at least'
  const counts = new Map<number, number>()
  for (const { partner } of couplings)
    for (const g of at.get(partner) ?? []) if (limited(g)) counts.set(g, (counts.get(g) ?? 0) + 1)
  const byGroup = new Map<number, number[]>()
  let sum = 0
  for (const { partner, value } of couplings) {
    const of = (at.get(partner) ?? []).filter(limited).sort((a, b) => counts.get(b)! - counts.get(a)! || a - b)[0]
    if (of === undefined) sum += value
    else byGroup.set(of, [...(byGroup.get(of) ?? []), value])
  }
  for (const [g, values] of byGroup)
    for (const value of values.sort((a, b) => b - a).slice(0, groups[g]!.k)) sum += value
  return sum
}

/** Clusters of groups that hang together by shared variables: for each its lowest group. */
function clustersOf(groups: readonly VariableGroup[], at: Map<number, number[]>): number[] {
  const cluster = groups.map((_, g) => g)
  const rootOf = (g: number): number => {
    let root = g
    while (cluster[root] !== root) root = cluster[root]!
    return root
  }
  for (const sharing of at.values())
    for (const g of sharing) {
      const [a, b] = [rootOf(g), rootOf(sharing[0]!)]
      cluster[Math.max(a, b)] = Math.min(a, b)
    }
  return cluster.map((_, g) => rootOf(g))
}

function verdictOf(weight: number, single: number, sufficient: number): PenaltyVerdict {
  if (weight > DEFAULTS.excess * sufficient) return 'larger than needed'
  if (weight > sufficient) return 'strong enough'
  return weight > single ? 'beats single changes' : 'may be too weak'
}

/** The two bounds of each penalised group. */
class Bounds {
  private readonly groups: readonly VariableGroup[]
  private readonly at: Map<number, number[]>
  private readonly clusters: number[]
  private readonly reaches = new Map<number, number>()

  constructor(
    penalised: readonly Penalised[],
    private readonly restAt: RestAt,
  ) {
    this.groups = penalised.map(({ group }) => group)
    this.at = groupsAt(this.groups)
    this.clusters = clustersOf(this.groups, this.at)
  }

  private needed(group: VariableGroup, most: (couplings: { partner: number; value: number }[]) => number): number {
    const { rest } = this.restAt
    const gain = (i: number, sign: 1 | -1): number => {
      const couplings = this.restAt.around(i).map(({ partner, value }) => ({ partner, value: sign * value }))
      return sign * rest.linear[i]! + most(couplings.filter(({ value }) => value > 0))
    }
    return neededFor(
      group,
      (i) => gain(i, -1),
      (i) => gain(i, 1),
    )
  }

  single(g: number): number {
    return this.needed(this.groups[g]!, (couplings) => mostWithin(couplings, this.groups, this.at))
  }

  sufficient(g: number): number {
    const cluster = this.clusters[g]!
    const together = this.groups.filter((_, other) => this.clusters[other] === cluster)
    if (together.length === 1)
      return this.needed(this.groups[g]!, (couplings) => couplings.reduce((sum, { value }) => sum + value, 0))
    const reach =
      this.reaches.get(cluster) ?? this.restAt.reach(new Set(together.flatMap(({ members }) => [...members])))
    this.reaches.set(cluster, reach)
    return reach / (this.groups[g]!.kind === 'at most' ? 2 : 1)
  }
}

/** Whether so many pairs of members can be looked at. */
export const canAssess = (groups: readonly VariableGroup[]): boolean =>
  groups.reduce((sum, { members }) => sum + pairsOf(members.length), 0) <= DEFAULTS.maxPairs

/**
 * The penalties of groups in a QUBO to be minimised, in their order, each beside what the rest of the objective can
 * gain. All groups are taken to be written as penalties at once: what belongs to several is taken off several times.
 * @throws RangeError when the groups have more pairs than can be looked at
 */
export function assessPenalties(qubo: Problem, groups: readonly VariableGroup[]): PenaltyReport[] {
  if (!canAssess(groups))
    throw new RangeError(`groups with more than ${DEFAULTS.maxPairs} pairs of members are not looked at`)
  const ground = new Ground(qubo)
  const weights = groups.map((group) => (linearOfPenalty(group) === null ? null : weightOf(ground, group.members)))
  const penalised = groups.flatMap((group, g) => (weights[g] === null ? [] : [{ group, weight: weights[g]! }]))
  const bounds = new Bounds(penalised, new RestAt(ground, restOf(ground, penalised)))
  const at = groupsAt(groups)
  let next = 0
  return groups.map(({ members }, g) => {
    const weight = weights[g]!
    const overlaps = new Set(members.flatMap((i) => at.get(i)!)).size - 1
    const shape = { weight, pairs: pairsOf(members.length), overlaps }
    if (weight === null)
      return { ...shape, pairsDeviating: 0, greatestDeviation: 0, single: null, sufficient: null, verdict: null }
    const place = next++
    const sufficient = bounds.sufficient(place)
    const single = Math.min(bounds.single(place), sufficient)
    const verdict = verdictOf(weight, single, sufficient)
    return { ...shape, ...deviationsOf(ground, members, weight), single, sufficient, verdict }
  })
}
