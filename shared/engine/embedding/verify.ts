import type { Graph } from '../graph/graph'
import type { Embedding } from './embedding'

/** The rules of a minor embedding. */
export type EmbeddingRule =
  | 'empty chain'
  | 'unknown qubit'
  | 'missing qubit'
  | 'repeated qubit'
  | 'shared qubit'
  | 'disconnected chain'
  | 'missing coupler'

/** One broken rule, with the variables and qubits (dense indices) that it concerns. */
export interface Violation {
  readonly rule: EmbeddingRule
  readonly variables: readonly number[]
  readonly qubits: readonly number[]
  readonly message: string
}

/** How messages name variables and qubits; by default their indices. */
export interface Naming {
  readonly label?: (variable: number) => string
  readonly qubitName?: (qubit: number) => string
}

interface Names {
  readonly label: (variable: number) => string
  readonly qubit: (qubit: number) => string
}

/** By qubit, the qubits that it shares a coupler with; nothing for those that no chain has. */
type Pairs = readonly (ReadonlySet<number> | undefined)[]

/** Most qubits that a message lists by name. */
const LARGEST_LIST = 6

function listOf(names: readonly string[]): string {
  const shown = names.slice(0, LARGEST_LIST).join(', ')
  return names.length > LARGEST_LIST ? `${shown} and ${names.length - LARGEST_LIST} more` : shown
}

function readChains(problem: Graph, chains: readonly ArrayLike<number>[] | Embedding): number[][] {
  const lists: number[][] = []
  if ('offsets' in chains) {
    for (let i = 0; i + 1 < chains.offsets.length; i++)
      lists.push(Array.from(chains.qubits.slice(chains.offsets[i], chains.offsets[i + 1])))
  } else for (const chain of chains) lists.push(Array.from(chain))
  if (lists.length > problem.order)
    throw new RangeError(`there are ${lists.length} chains for ${problem.order} variables`)
  while (lists.length < problem.order) lists.push([])
  return lists
}

/** Checks the qubits of one chain by themselves and returns those that exist and work, each once. */
function checkQubits(i: number, chain: number[], usable: Uint8Array, names: Names, found: Violation[]): number[] {
  const variables = [i]
  const note = (rule: EmbeddingRule, q: number, what: string): void => {
    found.push({ rule, variables, qubits: [q], message: `The chain of ${names.label(i)} ${what}.` })
  }
  if (chain.length === 0)
    found.push({ rule: 'empty chain', variables, qubits: [], message: `The chain of ${names.label(i)} has no qubit.` })
  const good: number[] = []
  const seen = new Set<number>()
  for (const q of chain) {
    if (seen.has(q)) {
      note('repeated qubit', q, `lists qubit ${names.qubit(q)} more than once`)
      continue
    }
    seen.add(q)
    if (usable[q] === undefined)
      note('unknown qubit', q, `has qubit ${names.qubit(q)}, which the machine does not have`)
    else if (usable[q] === 0) note('missing qubit', q, `has qubit ${names.qubit(q)}, which is missing on this machine`)
    else good.push(q)
  }
  return good
}

function checkSharing(chains: readonly number[][], names: Names, found: Violation[]): void {
  const users = new Map<number, number[]>()
  chains.forEach((chain, i) => chain.forEach((q) => users.set(q, [...(users.get(q) ?? []), i])))
  for (const [q, variables] of [...users].sort(([a], [b]) => a - b)) {
    if (variables.length < 2) continue
    const who = listOf(variables.map(names.label))
    const message = `Qubit ${names.qubit(q)} is in the chains of ${who}; it can serve only one.`
    found.push({ rule: 'shared qubit', variables, qubits: [q], message })
  }
}

/** Only qubits of chains are asked for: on a large machine they are few. */
function coupledPairs(machine: Graph, chains: readonly (readonly number[])[]): Pairs {
  const pairs: (Set<number> | undefined)[] = new Array(machine.order).fill(undefined)
  for (const chain of chains) for (const q of chain) pairs[q] = new Set()
  for (let k = 0; k < machine.ends.length; k += 2) {
    const a = machine.ends[k]!
    const b = machine.ends[k + 1]!
    pairs[a]?.add(b)
    pairs[b]?.add(a)
  }
  return pairs
}

function checkConnection(i: number, chain: readonly number[], pairs: Pairs, names: Names, found: Violation[]): void {
  if (chain.length === 0) return
  const waiting = new Set(chain)
  const reached = [chain[0]!]
  waiting.delete(chain[0]!)
  for (const q of reached) {
    for (const r of pairs[q]!) {
      if (!waiting.delete(r)) continue
      reached.push(r)
    }
  }
  if (waiting.size === 0) return
  const qubits = [...waiting].sort((a, b) => a - b)
  const message = `The chain of ${names.label(i)} falls apart: no path of couplers inside it joins ${listOf(qubits.map(names.qubit))} to qubit ${names.qubit(chain[0]!)}.`
  found.push({ rule: 'disconnected chain', variables: [i], qubits, message })
}

function checkInteractions(
  problem: Graph,
  chains: readonly number[][],
  pairs: Pairs,
  names: Names,
  found: Violation[],
): void {
  for (let k = 0; k < problem.ends.length; k += 2) {
    const i = problem.ends[k]!
    const j = problem.ends[k + 1]!
    const other = new Set(chains[j])
    if (chains[i]!.some((q) => [...pairs[q]!].some((r) => other.has(r)))) continue
    const message = `No coupler joins the chains of ${names.label(i)} and ${names.label(j)}, which interact.`
    found.push({ rule: 'missing coupler', variables: [i, j], qubits: [], message })
  }
}

/**
 * Checks an embedding against the definition (domain rules of a minor embedding), rule by rule, and names every broken
 * one. Shares no code with the search, so that it can vouch for it. Qubits that are not usable bring no
 * connection. An empty list means that the embedding is valid.
 * @param chains one list of qubits per variable, or a packed embedding; absent chains at the end count as empty
 * @param usable 1 for each machine qubit that works; length machine.order
 * @throws RangeError when there are more chains than variables
 */
export function verifyEmbedding(
  problem: Graph,
  machine: Graph,
  usable: Uint8Array,
  chains: readonly ArrayLike<number>[] | Embedding,
  naming: Naming = {},
): Violation[] {
  const names: Names = { label: naming.label ?? ((i) => `variable ${i}`), qubit: naming.qubitName ?? String }
  const found: Violation[] = []
  const good = readChains(problem, chains).map((chain, i) => checkQubits(i, chain, usable, names, found))
  const pairs = coupledPairs(machine, good)
  checkSharing(good, names, found)
  good.forEach((chain, i) => checkConnection(i, chain, pairs, names, found))
  checkInteractions(problem, good, pairs, names, found)
  return found
}
