import { describe, expect, it } from 'vitest'
import { sendExactMaximumFlow } from '../../../../../shared/engine/problem/presolve/exact-flow'
import type { Network } from '../../../../../shared/engine/problem/presolve/max-flow'
import { networkOf, sendMaximumFlow } from '../../../../../shared/engine/problem/presolve/max-flow'
import type { Random } from '../../../../../shared/engine/random'
import { createRandom } from '../../../../../shared/engine/random'

const never = (): boolean => false

function randomNetwork(random: Random, nodes: number): Network {
  const heads: number[] = []
  for (let a = 0; a < nodes; a++)
    for (let b = 0; b < a; b++) if (random.float() < 0.6) heads.push(...(random.below(2) === 0 ? [a, b] : [b, a]))
  return networkOf(nodes, Uint32Array.from(heads), 0, nodes - 1)
}

/** The least cut, over all sets of nodes that hold the source and not the sink (max-flow min-cut theorem). */
function leastCut({ nodes, heads, source, sink }: Network, capacities: readonly bigint[]): bigint {
  let best: bigint | null = null
  for (let set = 0; set < 2 ** nodes; set++) {
    const holds = (v: number): boolean => ((set >> v) & 1) === 1
    if (!holds(source) || holds(sink)) continue
    const cut = capacities.reduce((sum, c, e) => (holds(heads[e ^ 1]!) && !holds(heads[e]!) ? sum + c : sum), 0n)
    if (best === null || cut < best) best = cut
  }
  return best!
}

/** Net flow out of each node, after checking that no capacity is passed. */
function outflows({ nodes, heads }: Network, capacities: readonly bigint[], residual: readonly bigint[]): bigint[] {
  const out = new Array<bigint>(nodes).fill(0n)
  for (let e = 0; e < heads.length; e++) {
    expect(residual[e]! >= 0n).toBe(true)
    expect(residual[e]! + residual[e ^ 1]!).toBe(capacities[e]! + capacities[e ^ 1]!)
    out[heads[e ^ 1]!]! += capacities[e]! - residual[e]!
  }
  return out
}

function expectMaximum(network: Network, capacities: readonly bigint[], residual: readonly bigint[]): void {
  const out = outflows(network, capacities, residual)
  out.forEach((value, v) => {
    if (v !== network.source && v !== network.sink) expect(value).toBe(0n)
  })
  expect(out[network.source]).toBe(leastCut(network, capacities))
}

describe('maximum flow', () => {
  it('is as large as the least cut, and kept at every node', () => {
    const random = createRandom(31)
    for (let trial = 0; trial < 300; trial++) {
      const network = randomNetwork(random, 2 + random.below(8))
      const capacities = Array.from(network.heads, () => random.below(trial % 2 === 0 ? 3 : 50))
      const residual = Float64Array.from(capacities)
      expect(sendMaximumFlow(network, residual, never)).toBe(true)
      expectMaximum(network, capacities.map(BigInt), Array.from(residual, BigInt))
    }
  })

  it('is exact with capacities of any size', () => {
    const random = createRandom(32)
    for (let trial = 0; trial < 300; trial++) {
      const network = randomNetwork(random, 2 + random.below(7))
      const digits = (): bigint => (BigInt(random.uint32()) << 32n) | BigInt(random.uint32())
      const capacities = Array.from(network.heads, () =>
        random.below(4) === 0 ? 0n : (digits() * digits()) >> BigInt(random.below(140)),
      )
      const residual = [...capacities]
      expect(sendExactMaximumFlow(network, residual, never)).toBe(true)
      expectMaximum(network, capacities, residual)
    }
  })

  it('stays a flow when it is stopped', () => {
    const network = networkOf(3, Uint32Array.from([1, 0, 2, 1, 2, 0]), 0, 2)
    const capacities = [2n ** 80n + 1n, 0n, 2n ** 80n + 1n, 0n, 5n, 0n]
    let asked = 0
    const residual = [...capacities]
    expect(sendExactMaximumFlow(network, residual, () => ++asked > 2)).toBe(false)
    expect(outflows(network, capacities, residual)[1]).toBe(0n)
  })
})
