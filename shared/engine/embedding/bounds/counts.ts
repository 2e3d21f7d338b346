import { groupDigits } from '../../digits'
import type { Graph } from '../../graph/graph'
import { degreeOf, sizeOf } from '../../graph/graph'
import { connectedParts } from '../parts'
import type { EmbeddingTask } from '../task'
import { infeasibility } from './infeasibility'
import type { Infeasibility } from './infeasibility'

/** The counts of problem and machine that the simplest bounds compare. */
interface Counts {
  readonly variables: number
  readonly interactions: number
  readonly qubits: number
  /** Couplers with both ends usable. */
  readonly couplers: number
  /** The largest number of them at one qubit. */
  readonly largestDegree: number
}

function countsOf({ problem, machine, usable }: EmbeddingTask): Counts {
  const { ends } = machine
  const degree = new Uint32Array(machine.order)
  let couplers = 0
  let largestDegree = 0
  for (let k = 0; k < ends.length; k += 2) {
    if (usable[ends[k]!] === 0 || usable[ends[k + 1]!] === 0) continue
    couplers++
    largestDegree = Math.max(largestDegree, ++degree[ends[k]!]!, ++degree[ends[k + 1]!]!)
  }
  let qubits = 0
  for (let q = 0; q < usable.length; q++) if (usable[q] !== 0) qubits++
  return { variables: problem.order, interactions: sizeOf(problem), qubits, couplers, largestDegree }
}

/** A tree of L qubits of degree at most D has at most L(D − 2) + 2 couplers leaving it. */
function leastChainLength(degree: number, largestDegree: number): number {
  if (degree <= largestDegree) return 1
  return largestDegree > 2 ? Math.ceil((degree - 2) / (largestDegree - 2)) : Infinity
}

function leastChainLengths(problem: Graph, largestDegree: number): Float64Array {
  const lengths = new Float64Array(problem.order)
  for (let v = 0; v < problem.order; v++) lengths[v] = leastChainLength(degreeOf(problem, v), largestDegree)
  return lengths
}

function bySize({ variables, interactions, qubits, couplers }: Counts): Infeasibility | null {
  if (variables > qubits) {
    const message = `The problem has ${groupDigits(variables)} variables, the machine ${groupDigits(qubits)} usable qubits: ${groupDigits(variables - qubits)} too few.`
    return infeasibility('more variables than qubits', variables, qubits, message)
  }
  if (interactions > couplers) {
    const message = `The problem has ${groupDigits(interactions)} interactions, the machine ${groupDigits(couplers)} usable couplers: ${groupDigits(interactions - couplers)} too few.`
    return infeasibility('more interactions than couplers', interactions, couplers, message)
  }
  return null
}

function byDegrees(problem: Graph, lengths: Float64Array, { largestDegree, qubits }: Counts): Infeasibility | null {
  const code = 'degrees need more qubits'
  const need = lengths.reduce((sum, length) => sum + length, 0)
  if (need <= qubits) return null
  if (need === Infinity) {
    let most = 0
    for (let v = 0; v < problem.order; v++) most = Math.max(most, degreeOf(problem, v))
    const message = `A variable has ${groupDigits(most)} interactions, and a chain of qubits with at most ${groupDigits(largestDegree)} couplers each touches no more than two other chains: ${groupDigits(most - 2)} too few.`
    return infeasibility(code, most, 2, message)
  }
  const message = `With at most ${groupDigits(largestDegree)} couplers a qubit, the problem’s chains need at least ${groupDigits(need)} qubits; the machine has ${groupDigits(qubits)} usable ones: ${groupDigits(need - qubits)} too few.`
  return infeasibility(code, need, qubits, message)
}

const largest = (values: ArrayLike<number>): number => {
  let most = 0
  for (let i = 0; i < values.length; i++) most = Math.max(most, values[i]!)
  return most
}

/** A connected set of variables fills connected qubits of one part of the machine; cycles never come about. */
function byParts({ problem, machine, usable }: EmbeddingTask, lengths: Float64Array, counts: Counts) {
  const { partOf, sizes } = connectedParts(problem)
  const needs = new Float64Array(sizes.length)
  for (let v = 0; v < problem.order; v++) needs[partOf[v]!]! += lengths[v]!
  const rooms = connectedParts(machine, usable).sizes
  const [need, room] = [largest(needs), largest(rooms)]
  if (need > room) {
    const message = `A connected set of variables needs at least ${groupDigits(need)} qubits, and the largest connected part of the machine has ${groupDigits(room)}: ${groupDigits(need - room)} too few.`
    return infeasibility('no connected part large enough', need, room, message)
  }
  // Contracting and deleting couplers never adds an independent cycle (edges − vertices + parts).
  const wanted = counts.interactions - counts.variables + sizes.length
  const present = counts.couplers - counts.qubits + rooms.length
  if (wanted <= present) return null
  const message = `The problem has ${groupDigits(wanted)} independent cycles, the machine ${groupDigits(present)}: ${groupDigits(wanted - present)} too few.`
  return infeasibility('more independent cycles than the machine has', wanted, present, message)
}

/** Bounds from counting alone: variables, interactions, degrees, connected parts and cycles. Linear time. */
export function brokenCount(task: EmbeddingTask): Infeasibility | null {
  const counts = countsOf(task)
  const bySizes = bySize(counts)
  if (bySizes) return bySizes
  const lengths = leastChainLengths(task.problem, counts.largestDegree)
  return byDegrees(task.problem, lengths, counts) ?? byParts(task, lengths, counts)
}
