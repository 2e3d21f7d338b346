import type { KernelChoice } from '../../../../../shared/engine/assembly'
import { ChainState } from '../../../../../shared/engine/embedding/chains/state'
import type { Graph } from '../../../../../shared/engine/graph/graph'
import type { Random } from '../../../../../shared/engine/random'

/** A state with the given chains, all qubits usable, every qubit at one unit of cost. */
export function stateOf(
  problem: Graph,
  machine: Graph,
  chains: readonly (readonly number[])[],
  kernel: KernelChoice = 'plain',
): ChainState {
  const state = new ChainState(problem, machine, new Uint8Array(machine.order).fill(1), kernel)
  chains.forEach((chain, v) => chain.forEach((q) => state.add(v, q)))
  state.setPenalty(3)
  return state
}

export function chainsOf(state: ChainState): number[][] {
  const buffer = new Int32Array(state.qubits)
  return Array.from({ length: state.variables }, (_, v) =>
    [...buffer.subarray(0, state.copyChain(v, buffer))].sort((a, b) => a - b),
  )
}

export const matrixOf = (graph: Graph): boolean[][] => {
  const matrix = Array.from({ length: graph.order }, () => new Array<boolean>(graph.order).fill(false))
  for (let k = 0; k < graph.ends.length; k += 2) {
    matrix[graph.ends[k]!]![graph.ends[k + 1]!] = true
    matrix[graph.ends[k + 1]!]![graph.ends[k]!] = true
  }
  return matrix
}

export const touches = (matrix: boolean[][], a: readonly number[], b: readonly number[]): boolean =>
  a.some((q) => b.some((r) => matrix[q]![r]))

export function isConnected(matrix: boolean[][], chain: readonly number[]): boolean {
  let reached = chain.slice(0, 1)
  for (;;) {
    const more = chain.filter((q) => reached.includes(q) || touches(matrix, [q], reached))
    if (more.length === reached.length) return more.length === chain.length
    reached = more
  }
}

/** The met interactions, as text. */
export const met = (problem: Graph, matrix: boolean[][], chains: readonly (readonly number[])[]): string[] =>
  Array.from({ length: problem.ends.length / 2 }, (_, k) => [problem.ends[2 * k]!, problem.ends[2 * k + 1]!] as const)
    .filter(([i, j]) => touches(matrix, chains[i]!, chains[j]!))
    .map(String)

/** Connected random chains that may overlap. */
export function randomChains(machine: Graph, count: number, random: Random): number[][] {
  return Array.from({ length: count }, () => {
    const chain = [random.below(machine.order)]
    for (let step = random.below(12); step > 0; step--) {
      const q = chain[random.below(chain.length)]!
      const slots = machine.offsets[q + 1]! - machine.offsets[q]!
      const r = machine.targets[machine.offsets[q]! + random.below(slots)]!
      if (!chain.includes(r)) chain.push(r)
    }
    return chain
  })
}
