/** How many members of a group may be 1: exactly k, at most k, at least k. */
export type GroupKind = 'exactly' | 'at most' | 'at least'

/** Variables of which so many must be 1 (x = 1, s = +1). */
export interface VariableGroup {
  readonly kind: GroupKind
  readonly k: number
  /** Distinct variables, ascending. */
  readonly members: readonly number[]
}

/** Whether a group with so many members at 1 holds. */
export function holds({ kind, k }: Pick<VariableGroup, 'kind' | 'k'>, set: number): boolean {
  if (kind === 'exactly') return set === k
  return kind === 'at most' ? set <= k : set >= k
}

/**
 * The penalty of weight P that a group stands for in a QUBO: P (Σ x − k)² of an exact group, 2P Σ x x over the pairs of
 * an at-most-one group. Both couple every pair by 2P; the linear terms are P times this. Null where no quadratic
 * penalty without further variables exists.
 */
export function linearOfPenalty({ kind, k }: Pick<VariableGroup, 'kind' | 'k'>): number | null {
  if (kind === 'exactly') return 1 - 2 * k
  return kind === 'at most' && k === 1 ? 0 : null
}
