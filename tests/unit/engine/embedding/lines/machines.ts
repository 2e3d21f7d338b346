import type { EmbeddingTask } from '../../../../../shared/engine/embedding/task'
import type { Graph } from '../../../../../shared/engine/graph/graph'
import { keepEdges } from '../../../../../shared/engine/graph/subgraph'
import { buildFabric } from '../../../../../shared/engine/machine/build-fabric'
import type { Family } from '../../../../../shared/engine/machine/fabric'
import type { Random } from '../../../../../shared/engine/random'

export const SMALL_FAMILIES: readonly Family[] = [
  { kind: 'chimera', m: 4, n: 3, t: 4 },
  { kind: 'pegasus', m: 3, trimmed: true },
  { kind: 'pegasus', m: 3, trimmed: false },
  { kind: 'zephyr', m: 2, t: 4 },
  { kind: 'zephyr', m: 3, t: 2 },
]

/** A problem on a machine of the family from which a random share of qubits and couplers is missing. */
export function taskOn(family: Family, problem: Graph, missing: number, random: Random): EmbeddingTask {
  const { graph, segments } = buildFabric(family)
  const usable = Uint8Array.from({ length: graph.order }, () => (random.float() < missing ? 0 : 1))
  const keep = Uint8Array.from({ length: graph.ends.length / 2 }, (_, k) => {
    const works = usable[graph.ends[2 * k]!] === 1 && usable[graph.ends[2 * k + 1]!] === 1
    return works && random.float() >= missing ? 1 : 0
  })
  return { problem, machine: keepEdges(graph, keep), usable, segments, family, start: null }
}
