/** What a problem is without the penalties of its groups. */
import type { Graph } from '../../graph/graph'
import { interactionGraph } from '../interaction-graph'
import type { Problem } from '../problem'
import { linearOfPenalty, type VariableGroup } from './group'

export const EQUAL = 1e-9

/** A group with the weight P of its penalty. */
export interface Penalised {
  readonly group: VariableGroup
  readonly weight: number
}

/** A problem with its adjacency; finds the interactions inside a group. */
export class Ground {
  readonly graph: Graph
  private readonly mark: Int32Array
  private round = 0

  constructor(readonly problem: Problem) {
    this.graph = interactionGraph(problem)
    this.mark = new Int32Array(problem.n)
  }

  /** Calls back with each interaction between two of the members. */
  forPairs(members: readonly number[], visit: (interaction: number) => void): void {
    const { offsets, targets, edgeIds } = this.graph
    const round = ++this.round
    for (const v of members) this.mark[v] = round
    for (const v of members)
      for (let p = offsets[v]!; p < offsets[v + 1]!; p++)
        if (targets[p]! > v && this.mark[targets[p]!] === round) visit(edgeIds[p]!)
  }

  /** Pairs of members without an interaction. */
  missingPairs(members: readonly number[]): [number, number][] {
    const { offsets, targets } = this.graph
    const missing: [number, number][] = []
    for (const [place, v] of members.entries()) {
      const near = new Set(targets.subarray(offsets[v], offsets[v + 1]))
      for (const u of members.slice(place + 1)) if (!near.has(u)) missing.push([v, u])
    }
    return missing
  }
}

/** Coefficients of the rest: by variable, by interaction, and of pairs that do not interact in the problem itself. */
export interface Rest {
  readonly linear: Float64Array
  readonly values: Float64Array
  readonly more: readonly { readonly a: number; readonly b: number; readonly value: number }[]
}

/** Takes the penalties off; what is left of a coefficient by rounding alone is taken for nothing. */
export function restOf(ground: Ground, penalised: readonly Penalised[]): Rest {
  const { n, linear, values } = ground.problem
  const taken = new Float64Array(values.length)
  const takenAt = new Float64Array(n)
  const more = new Map<number, number>()
  for (const { group, weight } of penalised) {
    for (const i of group.members) takenAt[i]! += weight * linearOfPenalty(group)!
    ground.forPairs(group.members, (k) => (taken[k]! += 2 * weight))
    for (const [a, b] of ground.missingPairs(group.members))
      more.set(a * n + b, (more.get(a * n + b) ?? 0) - 2 * weight)
  }
  const less = (value: number, part: number): number =>
    Math.abs(value - part) <= EQUAL * Math.abs(part) ? 0 : value - part
  return {
    linear: linear.map((value, i) => less(value, takenAt[i]!)),
    values: values.map((value, k) => less(value, taken[k]!)),
    more: [...more].map(([key, value]) => ({ a: Math.floor(key / n), b: key % n, value })),
  }
}

/** Rest couplings at each variable: [partner, value] pairs, and the absolute sum over a set of variables. */
export class RestAt {
  private readonly moreAt = new Map<number, { partner: number; value: number }[]>()

  constructor(
    private readonly ground: Ground,
    readonly rest: Rest,
  ) {
    for (const { a, b, value } of rest.more)
      for (const [from, partner] of [
        [a, b],
        [b, a],
      ] as const)
        this.moreAt.set(from, [...(this.moreAt.get(from) ?? []), { partner, value }])
  }

  /** Nonzero couplings of the rest at a variable. */
  around(v: number): { partner: number; value: number }[] {
    const { offsets, targets, edgeIds } = this.ground.graph
    const found = [...(this.moreAt.get(v) ?? [])]
    for (let p = offsets[v]!; p < offsets[v + 1]!; p++) {
      const value = this.rest.values[edgeIds[p]!]!
      if (value !== 0) found.push({ partner: targets[p]!, value })
    }
    return found
  }

  /** The sum of |r| over these variables and all interactions that touch them, each once. */
  reach(variables: ReadonlySet<number>): number {
    let reach = 0
    for (const v of variables) {
      reach += Math.abs(this.rest.linear[v]!)
      for (const { partner, value } of this.around(v))
        if (!variables.has(partner) || partner > v) reach += Math.abs(value)
    }
    return reach
  }
}
