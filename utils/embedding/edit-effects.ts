import type { Graph } from '#shared/engine/graph/graph'
import { coupledTo } from '../lattice/machine-graph'
import type { HandEdit } from './hand-edit'

/** What one step would do to the chain and to its interactions. */
export interface EditEffect extends HandEdit {
  /** Pieces that the chain would be in; none where it would have no qubit. */
  readonly pieces: number
  /** Variables it interacts with that lack a coupler now and would have one. */
  readonly meets: readonly number[]
  /** Variables it interacts with that would lose their only coupler. */
  readonly loses: readonly number[]
  /** Couplers to interacting chains on the qubit. */
  readonly couplers: number
}

export interface EditState {
  readonly machine: Graph
  readonly usable: Uint8Array
  readonly chains: readonly (readonly number[])[]
  /** Variables that each variable interacts with. */
  readonly neighbours: readonly (readonly number[])[]
}

/** Chain of each qubit, or −1. */
export function ownersOf({ machine, chains }: Pick<EditState, 'machine' | 'chains'>): Int32Array {
  const owner = new Int32Array(machine.order).fill(-1)
  chains.forEach((chain, i) => chain.forEach((q) => (owner[q] = i)))
  return owner
}

/** The effect of every step that frees a qubit of the chain, in the order of the chain. */
export function freeingEffects(state: EditState, variable: number): EditEffect[] {
  const look = lookFrom(state, variable)
  const chain = state.chains[variable]!
  return chain.map((qubit) => {
    const own = look.interactionsOn(qubit)
    return {
      kind: 'free',
      variable,
      qubit,
      pieces: piecesOf(
        state.machine,
        chain.filter((q) => q !== qubit),
      ).length,
      meets: [],
      loses: [...own].flatMap(([other, count]) => (look.couplersTo(other) === count ? [other] : [])),
      couplers: sum(own.values()),
    }
  })
}

/**
 * The effect of every step that adds a free qubit coupled to the chain, the most useful first: those that meet
 * interactions, then those that join its pieces, then those with the most couplers to interacting chains.
 */
export function addingEffects(state: EditState, variable: number): EditEffect[] {
  const candidates = new Set<number>()
  const owner = ownersOf(state)
  for (const q of state.chains[variable]!)
    for (const r of coupledTo(state.machine, q)) if (owner[r]! < 0 && state.usable[r]) candidates.add(r)
  const effectOf = additionsTo(state, variable)
  return [...candidates]
    .map(effectOf)
    .sort(
      (a, b) => b.meets.length - a.meets.length || a.pieces - b.pieces || b.couplers - a.couplers || a.qubit - b.qubit,
    )
}

/** The effect of adding any free qubit, also one that is not coupled to the chain. */
export function additionsTo(state: EditState, variable: number): (qubit: number) => EditEffect {
  const look = lookFrom(state, variable)
  const pieces = piecesOf(state.machine, state.chains[variable]!)
  const pieceOf = new Map(pieces.flatMap((piece, p) => piece.map((q) => [q, p] as const)))
  return (qubit) => {
    const joined = new Set<number>()
    for (const r of coupledTo(state.machine, qubit)) if (pieceOf.has(r)) joined.add(pieceOf.get(r)!)
    const own = look.interactionsOn(qubit)
    return {
      kind: 'add',
      variable,
      qubit,
      pieces: pieces.length - joined.size + 1,
      meets: [...own.keys()].filter((other) => look.couplersTo(other) === 0),
      loses: [],
      couplers: sum(own.values()),
    }
  }
}

/** Couplers of the chain, and of single qubits, to the chains that the variable interacts with. */
function lookFrom(state: EditState, variable: number) {
  const owner = ownersOf(state)
  const interacting = new Set(state.neighbours[variable])
  const interactionsOn = (qubit: number): Map<number, number> => {
    const counts = new Map<number, number>()
    for (const r of coupledTo(state.machine, qubit))
      if (interacting.has(owner[r]!)) counts.set(owner[r]!, (counts.get(owner[r]!) ?? 0) + 1)
    return counts
  }
  const totals = new Map<number, number>()
  for (const q of state.chains[variable]!)
    for (const [other, count] of interactionsOn(q)) totals.set(other, (totals.get(other) ?? 0) + count)
  return { interactionsOn, couplersTo: (other: number): number => totals.get(other) ?? 0 }
}

/** The parts of the chain that couplers hold together. */
export function piecesOf(machine: Graph, chain: readonly number[]): number[][] {
  const waiting = new Set(chain)
  const pieces: number[][] = []
  for (const first of chain) {
    if (!waiting.delete(first)) continue
    const piece = [first]
    for (const q of piece) for (const r of coupledTo(machine, q)) if (waiting.delete(r)) piece.push(r)
    pieces.push(piece)
  }
  return pieces
}

function sum(values: Iterable<number>): number {
  let total = 0
  for (const value of values) total += value
  return total
}
