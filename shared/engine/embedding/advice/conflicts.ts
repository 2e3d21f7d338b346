import { edgeBetween } from '../../graph/build'
import { chainCount, chainOf } from '../embedding'
import type { Embedding } from '../embedding'
import type { PartialEmbedding } from '../method'
import type { EmbeddingTask } from '../task'

/** Chains that use each qubit. */
export function usesOf(chains: Embedding, qubits: number): Uint32Array {
  const uses = new Uint32Array(qubits)
  for (const q of chains.qubits) uses[q]!++
  return uses
}

/** How much of what stands in the way a variable has a part in. */
export interface VariableConflict {
  readonly variable: number
  /** Qubits of its chain that other chains use too. */
  readonly sharedQubits: number
  /** Its interactions without a coupler. */
  readonly unmet: number
}

const weightOf = ({ sharedQubits, unmet }: VariableConflict): number => sharedQubits + unmet

/** The variables with shared qubits or unmet interactions, most conflicts first. */
export function conflictsOf({ problem, machine }: EmbeddingTask, partial: PartialEmbedding): VariableConflict[] {
  const uses = usesOf(partial.chains, machine.order)
  const unmet = new Uint32Array(problem.order)
  for (const edge of partial.unmet) {
    unmet[problem.ends[2 * edge]!]!++
    unmet[problem.ends[2 * edge + 1]!]!++
  }
  const conflicts: VariableConflict[] = []
  for (let variable = 0; variable < problem.order; variable++) {
    let sharedQubits = 0
    for (const q of chainOf(partial.chains, variable)) if (uses[q]! > 1) sharedQubits++
    if (sharedQubits > 0 || unmet[variable]! > 0) conflicts.push({ variable, sharedQubits, unmet: unmet[variable]! })
  }
  return conflicts.sort((a, b) => weightOf(b) - weightOf(a) || a.variable - b.variable)
}

/**
 * Variables without which the state has no shared qubit and no unmet interaction left, taken out one by one, most
 * conflicts first; ascending. Few, but not always the fewest. Null when more than `most` would have to go.
 */
export function variablesToLeaveOut(task: EmbeddingTask, partial: PartialEmbedding, most: number): number[] | null {
  const { problem, machine } = task
  const uses = usesOf(partial.chains, machine.order)
  const unmet = new Set(partial.unmet)
  const waiting = conflictsOf(task, partial).map(({ variable }) => variable)
  const out: number[] = []
  const sharedBy = (variable: number): number => {
    let shared = 0
    for (const q of chainOf(partial.chains, variable)) if (uses[q]! > 1) shared++
    return shared
  }
  const unmetAt = (variable: number): number[] => {
    const { offsets, edgeIds } = problem
    return [...edgeIds.subarray(offsets[variable], offsets[variable + 1])].filter((edge) => unmet.has(edge))
  }
  for (;;) {
    let worst = -1
    let weight = 0
    for (const variable of waiting) {
      const conflicts = sharedBy(variable) + unmetAt(variable).length
      if (conflicts > weight) [worst, weight] = [variable, conflicts]
    }
    if (worst < 0) return out.sort((a, b) => a - b)
    if (out.length === most) return null
    out.push(worst)
    for (const q of chainOf(partial.chains, worst)) uses[q]!--
    for (const edge of unmetAt(worst)) unmet.delete(edge)
    waiting.splice(waiting.indexOf(worst), 1)
  }
}

/** Variables that use each qubit: those of qubit q are `variables[offsets[q]] … variables[offsets[q + 1] − 1]`. */
export function ownersOf(chains: Embedding, qubits: number): { offsets: Uint32Array; variables: Uint32Array } {
  const offsets = new Uint32Array(qubits + 1)
  for (const q of chains.qubits) offsets[q + 1]!++
  for (let q = 0; q < qubits; q++) offsets[q + 1]! += offsets[q]!
  const next = offsets.slice(0, qubits)
  const variables = new Uint32Array(chains.qubits.length)
  for (let v = 0; v < chainCount(chains); v++) for (const q of chainOf(chains, v)) variables[next[q]!++] = v
  return { offsets, variables }
}

/** For each qubit of a chain, the interacting variables that one of its couplers leads to. */
export function touchedBy(
  { problem, machine }: EmbeddingTask,
  variable: number,
  chain: Iterable<number>,
  owners: ReturnType<typeof ownersOf>,
): Map<number, Set<number>> {
  const touched = new Map<number, Set<number>>()
  for (const q of chain) {
    const others = new Set<number>()
    for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
      const beside = machine.targets[p]!
      for (let i = owners.offsets[beside]!; i < owners.offsets[beside + 1]!; i++) {
        const other = owners.variables[i]!
        if (other !== variable && edgeBetween(problem, variable, other) >= 0) others.add(other)
      }
    }
    touched.set(q, others)
  }
  return touched
}
