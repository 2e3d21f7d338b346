import type { Embedding } from '../../../../../shared/engine/embedding/embedding'
import type { Attempt } from '../../../../../shared/engine/embedding/method'
import { Watch } from '../../../../../shared/engine/embedding/progress'
import type { EmbeddingTask } from '../../../../../shared/engine/embedding/task'
import { verifyEmbedding } from '../../../../../shared/engine/embedding/verify'
import type { Graph } from '../../../../../shared/engine/graph/graph'
import { graphFromEdges } from '../../../../../shared/engine/graph/build'
import { buildFabric } from '../../../../../shared/engine/machine/build-fabric'
import { applyDefects } from '../../../../../shared/engine/machine/defects'
import type { PublishedFamily } from '../../../../../shared/engine/machine/fabric'
import { createRandom } from '../../../../../shared/engine/random'

export type MachineOnly = Omit<EmbeddingTask, 'problem' | 'start'>

/** A family's machine without a random share of its qubits and of its couplers. */
export function machineOf(family: PublishedFamily, qubitShare = 0, couplerShare = 0, seed = 1): MachineOnly {
  const fabric = buildFabric(family)
  const random = createRandom(seed, 77)
  const qubits = [...fabric.ids].filter(() => random.float() < qubitShare)
  const couplers: [number, number][] = []
  for (let k = 0; k < fabric.graph.ends.length; k += 2)
    if (random.float() < couplerShare)
      couplers.push([fabric.ids[fabric.graph.ends[k]!]!, fabric.ids[fabric.graph.ends[k + 1]!]!])
  const { graph, usable } = applyDefects(fabric, { qubits, couplers })
  return { machine: graph, usable, segments: fabric.segments, family }
}

export const taskOn = (problem: Graph, machine: MachineOnly): EmbeddingTask => ({ ...machine, problem, start: null })

/** An attempt whose clock stands still, and all that is offered to it, each checked. */
export function attemptOn(task: EmbeddingTask, seed = 1, looks = Infinity): { attempt: Attempt; offers: Embedding[] } {
  const offers: Embedding[] = []
  let looked = 0
  const cancelled = (): boolean => ++looked > looks
  const attempt: Attempt = {
    random: createRandom(seed, 1),
    seconds: 0.1,
    watch: new Watch({ now: () => 0, cancelled, report: () => {} }, 'template', 1, Infinity),
    objective: 'longest chain',
    kernel: 'plain',
    offer: (embedding) => {
      const [violation] = verifyEmbedding(task.problem, task.machine, task.usable, embedding)
      if (violation) throw new Error(violation.message)
      offers.push(embedding)
    },
  }
  return { attempt, offers }
}

/** Two sides of a and b vertices, each pair across joined with probability p. */
export function bipartiteGraph(a: number, b: number, p = 1, seed = 1): Graph {
  const random = createRandom(seed, 5)
  const ends: number[] = []
  for (let i = 0; i < a; i++) for (let j = 0; j < b; j++) if (random.float() < p) ends.push(i, a + j)
  return graphFromEdges(a + b, ends)
}
