import { edgeBetween } from '../graph/build'
import type { Graph } from '../graph/graph'
import { sizeOf } from '../graph/graph'
import type { WorkingGraph } from '../machine/fabric'
import type { Embedding } from './embedding'
import { chainCount, chainOf } from './embedding'

/** What an embedding lost between two states of its machine; all indices dense, all lists ascending. */
export interface Damage {
  /** Variables whose chains have to change at the least: see `embeddingDamage`. */
  readonly chains: number[]
  /** Qubits of the chains that no longer work. */
  readonly qubits: number[]
  /** Couplers inside chains and between interacting chains that are gone although both qubits work. */
  readonly couplers: [number, number][]
}

interface Look {
  readonly problem: Graph
  readonly embedding: Embedding
  readonly now: WorkingGraph
  /** The chain of each qubit, −1 for free ones. */
  readonly owner: Int32Array
}

function ownersOf(embedding: Embedding, order: number): Int32Array {
  const owner = new Int32Array(order).fill(-1)
  for (let i = 0; i < chainCount(embedding); i++) for (const q of chainOf(embedding, i)) owner[q] = i
  return owner
}

/** Whether a coupler between the two qubits serves the embedding. */
function isUsed({ problem, owner }: Look, q: number, r: number): boolean {
  const [i, j] = [owner[q]!, owner[r]!]
  return i >= 0 && j >= 0 && (i === j || edgeBetween(problem, i, j) >= 0)
}

/** Used couplers of `graph` whose first qubit is the lower one and whose qubits both work now. */
function* usedCouplers(look: Look, graph: Graph): Generator<[number, number]> {
  const { usable } = look.now
  for (const q of look.embedding.qubits)
    for (let p = graph.offsets[q]!; p < graph.offsets[q + 1]!; p++) {
      const r = graph.targets[p]!
      if (r > q && usable[q] === 1 && usable[r] === 1 && isUsed(look, q, r)) yield [q, r]
    }
}

/** Whether the working qubits of a chain no longer hang together. */
function fellApart({ owner, now, embedding }: Look, i: number): boolean {
  const working = chainOf(embedding, i).filter((q) => now.usable[q] === 1)
  const { offsets, targets } = now.graph
  const reached = new Set(working.slice(0, 1))
  for (const q of reached)
    for (let p = offsets[q]!; p < offsets[q + 1]!; p++) {
      const r = targets[p]!
      if (owner[r] === i && now.usable[r] === 1) reached.add(r)
    }
  return reached.size < working.length
}

/** Interactions, by edge of the problem graph, that a working coupler still carries. */
function carried(look: Look): Uint8Array {
  const met = new Uint8Array(sizeOf(look.problem))
  for (const [q, r] of usedCouplers(look, look.now.graph)) {
    const [i, j] = [look.owner[q]!, look.owner[r]!]
    if (i !== j) met[edgeBetween(look.problem, i, j)] = 1
  }
  return met
}

/** Chains that lost a qubit or fell apart, and both chains of an interaction that nothing carries although they stand. */
function damagedChains(look: Look): number[] {
  const { problem, embedding, now } = look
  const torn = Array.from(
    { length: chainCount(embedding) },
    (_, i) => chainOf(embedding, i).some((q) => now.usable[q] === 0) || fellApart(look, i),
  )
  const damaged = [...torn]
  carried(look).forEach((met, k) => {
    const [i, j] = [problem.ends[2 * k]!, problem.ends[2 * k + 1]!]
    if (!met && !torn[i] && !torn[j]) damaged[i] = damaged[j] = true
  })
  return damaged.flatMap((is, i) => (is ? [i] : []))
}

/**
 * What a valid embedding lost when its machine changed from one state to another; null where it lost nothing. A chain is
 * damaged when it lost a qubit or fell apart; where two chains that stand lost the last coupler of their interaction, both
 * are. A lost coupler that leaves every chain and interaction standing damages no chain, but it is named: what is
 * programmed on all couplers of the embedding would use it. O(couplers at the embedding's qubits × log of a degree).
 * @param made the machine when the embedding was valid; its qubit indices are those of `now`
 */
export function embeddingDamage(
  problem: Graph,
  embedding: Embedding,
  made: WorkingGraph,
  now: WorkingGraph,
): Damage | null {
  const look: Look = { problem, embedding, now, owner: ownersOf(embedding, now.graph.order) }
  const qubits = Array.from(embedding.qubits)
    .filter((q) => now.usable[q] === 0)
    .sort((a, b) => a - b)
  const couplers = [...usedCouplers(look, made.graph)]
    .filter(([q, r]) => edgeBetween(now.graph, q, r) < 0)
    .sort(([a, b], [c, d]) => a - c || b - d)
  const chains = damagedChains(look)
  return chains.length + qubits.length + couplers.length === 0 ? null : { chains, qubits, couplers }
}
