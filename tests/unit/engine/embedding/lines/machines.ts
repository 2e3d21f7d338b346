import type { Assignment } from '../../../../../shared/engine/embedding/lines/assignment'
import type { Coin } from '../../../../../shared/engine/embedding/lines/coin'
import type { EmbeddingTask } from '../../../../../shared/engine/embedding/task'
import type { Graph } from '../../../../../shared/engine/graph/graph'
import { keepEdges } from '../../../../../shared/engine/graph/subgraph'
import { buildFabric } from '../../../../../shared/engine/machine/build-fabric'
import type { PublishedFamily } from '../../../../../shared/engine/machine/fabric'
import type { Random } from '../../../../../shared/engine/random'

export const SMALL_FAMILIES: readonly PublishedFamily[] = [
  { kind: 'chimera', m: 4, n: 3, t: 4 },
  { kind: 'pegasus', m: 3, trimmed: true },
  { kind: 'pegasus', m: 3, trimmed: false },
  { kind: 'zephyr', m: 2, t: 4 },
  { kind: 'zephyr', m: 3, t: 2 },
]

/** A problem on a machine of the family from which a random share of qubits and couplers is missing. */
export function taskOn(family: PublishedFamily, problem: Graph, missing: number, random: Random): EmbeddingTask {
  const { graph, segments } = buildFabric(family)
  const usable = Uint8Array.from({ length: graph.order }, () => (random.float() < missing ? 0 : 1))
  const keep = Uint8Array.from({ length: graph.ends.length / 2 }, (_, k) => {
    const works = usable[graph.ends[2 * k]!] === 1 && usable[graph.ends[2 * k + 1]!] === 1
    return works && random.float() >= missing ? 1 : 0
  })
  return { problem, machine: keepEdges(graph, keep), usable, segments, family, start: null }
}

/** Puts every variable on a random line of either side, and lets a random one of the two serve each interaction. */
export function scatter(assignment: Assignment, coin: Coin): void {
  const { problem, crossings } = assignment
  for (let part = 0; part < 2 * problem.order; part++) {
    assignment.begin()
    assignment.move(part, coin.below(crossings.counts[part & 1]!))
  }
  for (let k = 0; k < problem.ends.length / 2; k++) {
    assignment.begin()
    if (coin.below(2) === 0) assignment.flip(k)
  }
}
