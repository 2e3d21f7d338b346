import type { Graph } from '#shared/engine/graph/graph'
import { coupledTo } from '../lattice/machine-graph'
import type { ChainLayer } from '../lattice/types'
import type { EmbeddingChains } from './layers'

/** One step of editing by hand: a free qubit goes to a chain, or a qubit of a chain becomes free. */
export interface HandEdit {
  readonly kind: 'add' | 'free'
  readonly variable: number
  readonly qubit: number
}

/** Steps so far; those from `done` on were taken back and can be done again. */
export interface EditHistory {
  readonly edits: readonly HandEdit[]
  readonly done: number
}

export const NO_EDITS: EditHistory = { edits: [], done: 0 }

/** Takes a step; what was taken back before it is forgotten. */
export const withEdit = ({ edits, done }: EditHistory, edit: HandEdit): EditHistory => ({
  edits: [...edits.slice(0, done), edit],
  done: done + 1,
})

export const undone = ({ edits, done }: EditHistory): EditHistory => ({ edits, done: Math.max(0, done - 1) })
export const redone = ({ edits, done }: EditHistory): EditHistory => ({
  edits,
  done: Math.min(edits.length, done + 1),
})

/** The chains after the steps that stand, as lists of qubits by variable. */
export function chainsAfter(base: ChainLayer, { edits, done }: EditHistory): number[][] {
  const chains = base.labels.map((_, i) => Array.from(base.qubits.subarray(base.offsets[i], base.offsets[i + 1])))
  for (const { kind, variable, qubit } of edits.slice(0, done)) {
    const others = chains[variable]!.filter((q) => q !== qubit)
    chains[variable] = kind === 'add' ? [...others, qubit].sort((a, b) => a - b) : others
  }
  return chains
}

/** Variables whose chains differ from what they were. */
export function changedVariables(base: ChainLayer, chains: readonly (readonly number[])[]): number[] {
  return chains.flatMap((chain, i) => {
    const was = base.qubits.subarray(base.offsets[i], base.offsets[i + 1])
    const own = new Set(chain)
    return was.length === chain.length && was.every((q) => own.has(q)) ? [] : [i]
  })
}

/** The edited chains as the lattice and the ledger take them. */
export function editedLayer(base: EmbeddingChains, machine: Graph, chains: readonly number[][]): EmbeddingChains {
  const offsets = new Uint32Array(chains.length + 1)
  chains.forEach((chain, i) => (offsets[i + 1] = offsets[i]! + chain.length))
  const layer = { ...base, offsets, qubits: Uint32Array.from(chains.flat()) }
  return { ...layer, couplers: interactionCouplers(layer, machine) }
}

/** Chain of each qubit, or −1. */
export function ownersIn({ offsets, qubits }: Pick<ChainLayer, 'offsets' | 'qubits'>, order: number): Int32Array {
  const owner = new Int32Array(order).fill(-1)
  for (let i = 0; i + 1 < offsets.length; i++) for (let k = offsets[i]!; k < offsets[i + 1]!; k++) owner[qubits[k]!] = i
  return owner
}

/** Per variable, couplers to the chains it interacts with. */
function interactionCouplers({ labels, offsets, qubits, neighbours }: ChainLayer, machine: Graph): Uint32Array {
  const owner = ownersIn({ offsets, qubits }, machine.order)
  const interacting = labels.map(() => new Set<number>())
  for (let k = 0; k < neighbours.length; k += 2) {
    interacting[neighbours[k]!]!.add(neighbours[k + 1]!)
    interacting[neighbours[k + 1]!]!.add(neighbours[k]!)
  }
  const count = new Uint32Array(labels.length)
  for (const q of qubits)
    for (const r of coupledTo(machine, q)) if (interacting[owner[q]!]!.has(owner[r]!)) count[owner[q]!]!++
  return count
}

/** Chains by label with published qubit numbers, as they are saved. */
export const namedChains = (
  labels: readonly string[],
  ids: Uint32Array,
  chains: readonly (readonly number[])[],
): Record<string, number[]> => Object.fromEntries(labels.map((label, i) => [label, chains[i]!.map((q) => ids[q]!)]))
