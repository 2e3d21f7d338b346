import type { Graph } from '../graph/graph'
import { degreeOf, sizeOf } from '../graph/graph'
import { connectedParts } from './parts'

/** Why no embedding can exist. */
export type InfeasibilityCode =
  | 'more variables than qubits'
  | 'more interactions than couplers'
  | 'degrees need more qubits'
  | 'no connected part large enough'
  | 'more independent cycles than the machine has'

/** A proof that no embedding exists: the bound that is broken, and by how much. */
export interface Infeasibility {
  readonly code: InfeasibilityCode
  readonly message: string
  readonly by: number
}

interface Counts {
  readonly variables: number
  readonly interactions: number
  readonly qubits: number
  readonly couplers: number
}

/** Couplers with both ends usable, and the largest number of them at one qubit. */
function usableCouplers(machine: Graph, usable: Uint8Array): { couplers: number; largestDegree: number } {
  const degree = new Uint32Array(machine.order)
  let couplers = 0
  let largestDegree = 0
  for (let k = 0; k < sizeOf(machine); k++) {
    const a = machine.ends[2 * k]!
    const b = machine.ends[2 * k + 1]!
    if (usable[a] === 0 || usable[b] === 0) continue
    couplers++
    largestDegree = Math.max(largestDegree, ++degree[a]!, ++degree[b]!)
  }
  return { couplers, largestDegree }
}

/** A tree of L qubits of degree at most D has at most L(D − 2) + 2 couplers leaving it. */
function leastChainLength(degree: number, largestDegree: number): number {
  if (degree <= largestDegree) return 1
  return largestDegree > 2 ? Math.ceil((degree - 2) / (largestDegree - 2)) : Infinity
}

function bySize({ variables, interactions, qubits, couplers }: Counts): Infeasibility | null {
  if (variables > qubits) {
    const by = variables - qubits
    const message = `The problem has ${variables} variables, the machine ${qubits} usable qubits: ${by} too few.`
    return { code: 'more variables than qubits', message, by }
  }
  if (interactions > couplers) {
    const by = interactions - couplers
    const message = `The problem has ${interactions} interactions, the machine ${couplers} usable couplers: ${by} too few.`
    return { code: 'more interactions than couplers', message, by }
  }
  return null
}

function byDegrees(problem: Graph, lengths: Float64Array, largestDegree: number, qubits: number): Infeasibility | null {
  const code = 'degrees need more qubits'
  const need = lengths.reduce((sum, length) => sum + length, 0)
  if (need <= qubits) return null
  if (need === Infinity) {
    let most = 0
    for (let v = 0; v < problem.order; v++) most = Math.max(most, degreeOf(problem, v))
    const message = `A variable has ${most} interactions, and a chain of qubits with at most ${largestDegree} couplers each touches no more than two other chains.`
    return { code, message, by: most - 2 }
  }
  const by = need - qubits
  const message = `With at most ${largestDegree} couplers a qubit, the problem's chains need at least ${need} qubits; the machine has ${qubits} usable ones: ${by} too few.`
  return { code, message, by }
}

/** A connected set of variables fills connected qubits of one part of the machine. */
function byParts(problem: Graph, machine: Graph, usable: Uint8Array, lengths: Float64Array): Infeasibility | null {
  const { partOf, sizes } = connectedParts(problem)
  const needs = new Float64Array(sizes.length)
  for (let v = 0; v < problem.order; v++) needs[partOf[v]!]! += lengths[v]!
  const need = needs.reduce((most, value) => Math.max(most, value), 0)
  const room = connectedParts(machine, usable).sizes.reduce((most, size) => Math.max(most, size), 0)
  if (need <= room) return null
  const by = need - room
  const message = `A connected set of variables needs at least ${need} qubits, and the largest connected part of the machine has ${room}: ${by} too few.`
  return { code: 'no connected part large enough', message, by }
}

/** Contracting and deleting couplers never adds an independent cycle (edges − vertices + parts). */
function byCycles(problem: Graph, machine: Graph, usable: Uint8Array, counts: Counts): Infeasibility | null {
  const wanted = counts.interactions - counts.variables + connectedParts(problem).sizes.length
  const present = counts.couplers - counts.qubits + connectedParts(machine, usable).sizes.length
  if (wanted <= present) return null
  const by = wanted - present
  const message = `The problem has ${wanted} independent cycles, the machine ${present}: ${by} too few.`
  return { code: 'more independent cycles than the machine has', message, by }
}

/**
 * Checks bounds whose violation proves that no minor embedding exists. `null` proves nothing: a search may still find
 * none.
 * @param usable 1 for each machine qubit that works
 */
export function provedInfeasible(problem: Graph, machine: Graph, usable: Uint8Array): Infeasibility | null {
  const { couplers, largestDegree } = usableCouplers(machine, usable)
  const qubits = usable.reduce((sum, works) => sum + (works ? 1 : 0), 0)
  const counts = { variables: problem.order, interactions: sizeOf(problem), qubits, couplers }
  const lengths = Float64Array.from({ length: problem.order }, (_, v) =>
    leastChainLength(degreeOf(problem, v), largestDegree),
  )
  return (
    bySize(counts) ??
    byDegrees(problem, lengths, largestDegree, qubits) ??
    byParts(problem, machine, usable, lengths) ??
    byCycles(problem, machine, usable, counts)
  )
}
