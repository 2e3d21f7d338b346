/** Why no embedding can exist. */
export type InfeasibilityCode =
  | 'more variables than qubits'
  | 'more interactions than couplers'
  | 'degrees need more qubits'
  | 'no connected part large enough'
  | 'more independent cycles than the machine has'
  | 'too many interactions for a planar machine'
  | 'clique larger than the machine can hold'
  | 'treewidth too large'

/** A proof that no embedding exists: the bound that is broken, and by how much. */
export interface Infeasibility {
  readonly code: InfeasibilityCode
  /** One plain sentence with both numbers. */
  readonly message: string
  /** What every embedding of the problem needs, and what the machine has, in the unit of the bound. */
  readonly needed: number
  readonly available: number
  /** needed − available. */
  readonly by: number
}

/** Puts a proof together; `message` need not name the difference. */
export function infeasibility(
  code: InfeasibilityCode,
  needed: number,
  available: number,
  message: string,
): Infeasibility {
  return { code, message, needed, available, by: needed - available }
}
