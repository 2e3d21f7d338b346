import type { Control } from '../../../shared/engine/control'
import type { Damage } from '../../../shared/engine/embedding/damage'
import { embeddingDamage } from '../../../shared/engine/embedding/damage'
import type { Embedding } from '../../../shared/engine/embedding/embedding'
import type { Graph } from '../../../shared/engine/graph/graph'
import type { WorkingGraph } from '../../../shared/engine/machine/fabric'

export interface FindDamageInput {
  problem: Graph
  embedding: Embedding
  made: WorkingGraph
  now: WorkingGraph
}

/** What an embedding lost since the calibration it was made at; null where it holds as it is. */
export function findDamage(
  { problem, embedding, made, now }: FindDamageInput,
  _control: Control<never>,
): Damage | null {
  return embeddingDamage(problem, embedding, made, now)
}
