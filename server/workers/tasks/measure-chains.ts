import type { Control } from '../../../shared/engine/control'
import { qualityOf } from '../../../shared/engine/embedding/objective'
import { findEmbedding } from '../../../shared/engine/embedding/search'
import type { MachineInput } from '../../../shared/engine/embedding/templates/capacity'
import { randomGraph } from '../../../shared/engine/graph/random-graph'
import { createRandom } from '../../../shared/engine/random'

export interface MeasureChainsInput {
  machine: MachineInput
  variables: number
  density: number
  seed: number
  /** Number of the problem among those of its size and density; its stream of random numbers. */
  problem: number
  timeLimitSeconds: number
}

export interface MeasuredChains {
  /** Null where none was found. */
  found: { longest: number; qubits: number } | null
  /** It was asked to stop before the end: nothing follows from it. */
  cancelled: boolean
}

/** Draws one random problem and looks for an embedding of it. */
export function measureChains(
  { machine, variables, density, seed, problem, timeLimitSeconds }: MeasureChainsInput,
  control: Control<never>,
): MeasuredChains {
  const graph = randomGraph(variables, density, createRandom(seed, problem))
  const quiet = { now: control.now, cancelled: control.cancelled, report: () => undefined }
  const settings = { method: 'auto', seed: seed + problem, tries: 1, timeLimitSeconds } as const
  const { embedding } = findEmbedding({ ...machine, problem: graph, start: null }, settings, quiet)
  const quality = embedding && qualityOf(embedding)
  return {
    found: quality && { longest: quality.longest, qubits: quality.total },
    cancelled: control.cancelled(),
  }
}
