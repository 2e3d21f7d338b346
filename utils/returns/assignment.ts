import type { SolutionRow } from '#shared/schemas/returns'

export interface CompactAssignment {
  /** Variables at 1 (QUBO) or +1 (Ising); the others are at 0 or −1. */
  labels: string[]
  /** How many more there are. */
  more: number
  total: number
}

/** The variables that are set, the rest left to be understood. */
export function compactAssignment(assignment: SolutionRow['assignment'], most: number): CompactAssignment {
  const set = Object.keys(assignment).filter((label) => assignment[label] === 1)
  const labels = set.slice(0, most)
  return { labels, more: set.length - labels.length, total: set.length }
}
