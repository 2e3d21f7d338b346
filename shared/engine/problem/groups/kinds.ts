import type { VariableGroup } from './group'

/** Pairs of these members are coupled by 2P. */
export interface PenaltySet {
  readonly members: readonly number[]
  readonly weight: number
}

export interface FoundKind {
  /** Null where the linear terms fit neither an exact group nor at most one. */
  readonly kind: Pick<VariableGroup, 'kind' | 'k'> | null
  /** Members whose linear coefficient is just what all the sets that they are in foretell. */
  readonly foretold: number
}

const ROUNDS = 12
/** How far the middle linear term of a set may lie from that of its kind, in units of P. */
const NEAR = 0.5
const TOLERANCE = 1e-9

function median(values: number[]): number {
  values.sort((a, b) => a - b)
  const middle = values.length >> 1
  return values.length % 2 === 1 ? values[middle]! : (values[middle - 1]! + values[middle]!) / 2
}

/** The linear term, in units of P, of the kind that a middle linear term is nearest to. */
function nearestTerm(ratio: number, size: number): number {
  if (ratio >= -NEAR) return 0
  const k = Math.min(size - 1, Math.max(1, Math.round((1 - ratio) / 2)))
  return 1 - 2 * k
}

const kindOf = (term: number): Pick<VariableGroup, 'kind' | 'k'> =>
  term === 0 ? { kind: 'at most', k: 1 } : { kind: 'exactly', k: (1 - term) / 2 }

/**
 * What the sets demand, from the linear coefficients: a member of an exact group carries P(1 − 2k), of an at-most-one
 * group nothing, summed over the sets that it is in; the objective comes on top. Each set takes the kind nearest to the
 * middle of what the others leave of its members' coefficients, a few rounds in turn.
 */
export function kindsOf(linear: Float64Array, sets: readonly PenaltySet[]): FoundKind[] {
  const weightAt = new Map<number, number>()
  for (const { members, weight } of sets) for (const i of members) weightAt.set(i, (weightAt.get(i) ?? 0) + weight)
  // At first every set of a variable carries an equal part, by weight, of its coefficient.
  const terms = sets.map(({ members }) =>
    nearestTerm(median(members.map((i) => linear[i]! / weightAt.get(i)!)), members.length),
  )
  const foretoldAt = new Map<number, number>()
  const add = ({ members, weight }: PenaltySet, term: number): void => {
    for (const i of members) foretoldAt.set(i, (foretoldAt.get(i) ?? 0) + weight * term)
  }
  sets.forEach((set, g) => add(set, terms[g]!))
  const ratioOf = ({ members, weight }: PenaltySet, term: number): number =>
    median(members.map((i) => (linear[i]! - foretoldAt.get(i)!) / weight + term))
  for (let round = 0, changed = true; changed && round < ROUNDS; round++) {
    changed = false
    sets.forEach((set, g) => {
      const next = nearestTerm(ratioOf(set, terms[g]!), set.members.length)
      if (next === terms[g]) return
      add(set, next - terms[g]!)
      terms[g] = next
      changed = true
    })
  }
  return sets.map((set, g) => {
    const ratio = ratioOf(set, terms[g]!)
    const fits = terms[g] === 0 ? ratio >= -NEAR : Math.abs(ratio - terms[g]!) <= NEAR
    const isForetold = (i: number): boolean =>
      Math.abs(linear[i]! - foretoldAt.get(i)!) <= TOLERANCE * weightAt.get(i)! * Math.abs(terms[g]!)
    return {
      kind: fits ? kindOf(terms[g]!) : null,
      foretold: terms[g] === 0 ? 0 : set.members.filter(isForetold).length,
    }
  })
}
