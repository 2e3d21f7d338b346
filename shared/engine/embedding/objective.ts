import { chainCount, chainOf } from './embedding'
import type { Embedding } from './embedding'

/** What embeddings are compared by first; the other decides between equals. */
export type Objective = 'longest chain' | 'total qubits'

/** Stop as soon as an embedding is at least this good; null where nothing is asked. */
export interface Target {
  readonly longestChain: number | null
  readonly totalQubits: number | null
}

export interface Quality {
  readonly longest: number
  readonly total: number
  /** Chains that differ from those that a repair began from; 0 otherwise. */
  readonly changed: number
}

/** Longest chain and total of qubits. */
export function qualityOf(embedding: Embedding): Quality {
  const { offsets } = embedding
  let longest = 0
  for (let i = 0; i < chainCount(embedding); i++) longest = Math.max(longest, offsets[i + 1]! - offsets[i]!)
  return { longest, total: embedding.qubits.length, changed: 0 }
}

/**
 * Below 0 when `a` is better, above 0 when `b` is, 0 when they are alike. A repair that changes fewer chains is better
 * whatever their lengths.
 */
export function compareQuality(a: Quality, b: Quality, objective: Objective): number {
  const longest = a.longest - b.longest
  const total = a.total - b.total
  return a.changed - b.changed || (objective === 'longest chain' ? longest || total : total || longest)
}

/** Whether something is asked and all of it is reached. */
export function reaches({ longest, total }: Quality, { longestChain, totalQubits }: Target): boolean {
  if (longestChain === null && totalQubits === null) return false
  return longest <= (longestChain ?? Infinity) && total <= (totalQubits ?? Infinity)
}

/** Number of variables whose chains are not the same in both. */
export function changedChains(a: Embedding, b: Embedding): number {
  let changed = 0
  for (let i = 0; i < chainCount(a); i++) {
    const [before, after] = [chainOf(a, i), chainOf(b, i)]
    if (before.length !== after.length || before.some((q, k) => q !== after[k])) changed++
  }
  return changed
}
