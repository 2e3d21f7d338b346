import { buildFabric } from '../../shared/engine/machine/build-fabric'
import type { Family } from '../../shared/engine/machine/fabric'
import { createRandom } from '../../shared/engine/random'
import type { Graph } from '../../shared/engine/graph/graph'
import { completeGraph, gridGraph, randomGraph, regularGraph, usableExcept } from '../../tests/fixtures/graphs'

/** A problem and a machine, made from a seed. */
export interface Instance {
  readonly name: string
  readonly make: (seed: number) => { problem: Graph; machine: Graph; usable: Uint8Array }
}

const C16: Family = { kind: 'chimera', m: 16, n: 16, t: 4 }
const P16: Family = { kind: 'pegasus', m: 16, trimmed: true }

function instance(name: string, family: Family, missing: number, problemOf: (seed: number) => Graph): Instance {
  const make: Instance['make'] = (seed) => {
    const machine = buildFabric(family).graph
    return { problem: problemOf(seed), machine, usable: usableExcept(machine.order, missing, createRandom(seed, 1)) }
  }
  return { name, make }
}

export const INSTANCES: readonly Instance[] = [
  instance('K_8 on P16', P16, 0, () => completeGraph(8)),
  instance('K_20 on P16', P16, 0, () => completeGraph(20)),
  instance('G(60, 0.1) on P16, 2 % missing', P16, 0.02, (seed) => randomGraph(60, 0.1, createRandom(seed))),
  instance('3-regular 100 on C16', C16, 0, (seed) => regularGraph(100, 3, createRandom(seed))),
  instance('3-regular 200 on C16', C16, 0, (seed) => regularGraph(200, 3, createRandom(seed))),
  instance('3-regular 300 on P16', P16, 0, (seed) => regularGraph(300, 3, createRandom(seed))),
  instance('grid 12 × 12 on C16', C16, 0, () => gridGraph(12, 12)),
]
