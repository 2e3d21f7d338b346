import { buildFabric } from '../../shared/engine/machine/build-fabric'
import { createRandom } from '../../shared/engine/random'
import type { CouplingList } from '../../shared/engine/sampling/physical-model'

/** Qubits of a Pegasus P(16) machine, breadth first from its middle. */
function around(offsets: Uint32Array, targets: Uint32Array, count: number): number[] {
  const queue = [(offsets.length - 1) >> 1]
  const seen = new Set(queue)
  for (let at = 0; queue.length < count; at++)
    for (let p = offsets[queue[at]!]!; p < offsets[queue[at]! + 1]! && queue.length < count; p++) {
      const q = targets[p]!
      if (seen.has(q)) continue
      seen.add(q)
      queue.push(q)
    }
  return queue
}

/** Fields and couplings uniform in −1 … 1 on so many qubits of P(16) and all couplers among them. */
export function pegasusInstance(qubits: number, seed: number): CouplingList {
  const { graph } = buildFabric({ kind: 'pegasus', m: 16, trimmed: true })
  const place = new Map(around(graph.offsets, graph.targets, qubits).map((q, k) => [q, k]))
  const ends: number[] = []
  for (let e = 0; e < graph.ends.length; e += 2) {
    const [a, b] = [place.get(graph.ends[e]!), place.get(graph.ends[e + 1]!)]
    if (a !== undefined && b !== undefined) ends.push(a, b)
  }
  const random = createRandom(seed)
  const value = (): number => 2 * random.float() - 1
  return {
    h: Float64Array.from({ length: qubits }, value),
    ends: Uint32Array.from(ends),
    J: Float64Array.from({ length: ends.length / 2 }, value),
  }
}
