import { shareArrays } from '../workers/shared-arrays'
import type { Damage } from '../../shared/engine/embedding/damage'
import type { Embedding } from '../../shared/engine/embedding/embedding'
import { chainCount } from '../../shared/engine/embedding/embedding'
import type { Graph } from '../../shared/engine/graph/graph'
import type { WorkingGraph } from '../../shared/engine/machine/fabric'
import type { EmbeddingDamage } from '../../shared/schemas/machines'
import type { App } from '../app'
import type { EmbeddingRow } from '../database/repositories/embeddings'
import { unpackChains } from './chains'
import { subjectOfRow } from './embedding-subject'
import type { CalibratedMachine } from './machine-graphs'
import { calibratedMachine } from './machine-graphs'

/** Judges embeddings of a machine against one state of it. */
export type DamageJudge = (row: EmbeddingRow) => Promise<EmbeddingDamage | null>

const sharedGraph = ({ graph, usable }: WorkingGraph): WorkingGraph => shareArrays({ graph, usable })

/**
 * A judge of found embeddings: in worker threads, with the large graphs in memory that all threads see.
 * @param now the state that they have to hold in
 */
export function damageJudge(app: App, now: WorkingGraph, ids: Uint32Array): DamageJudge {
  const shared = sharedGraph(now)
  const earlier = new Map<number, WorkingGraph>()
  return async (row) => {
    const { graph: problem, machine } = await subjectOfRow(app, row)
    const made = earlier.get(row.calibration) ?? sharedGraph(machine)
    earlier.set(row.calibration, made)
    const embedding = unpackChains(await app.blobs.read(row.chainsBlobId!))
    return named(await app.compute.run('findDamage', { problem, embedding, made, now: shared }), embedding, ids)
  }
}

/** The damage with published qubit numbers. */
function named(damage: Damage | null, embedding: Embedding, ids: Uint32Array): EmbeddingDamage | null {
  return (
    damage && {
      chains: damage.chains.length,
      ofChains: chainCount(embedding),
      qubitsLost: damage.qubits.map((q) => ids[q]!),
      couplersLost: damage.couplers.map(([a, b]) => [ids[a]!, ids[b]!]),
    }
  )
}

/** What a found embedding lost by the calibration in force; null where it holds, and where it has no chains. */
export async function damageInForce(app: App, row: EmbeddingRow): Promise<EmbeddingDamage | null> {
  const current = await calibratedMachine(app, row, row.machineId)
  if (row.status !== 'found' || current.calibration.number === row.calibration) return null
  return damageJudge(app, current, current.fabric.ids)(row)
}

/** What chains just made for an earlier calibration lost by the one in force. */
export async function damageOfChains(
  app: App,
  embedding: Embedding,
  problem: Graph,
  made: CalibratedMachine,
): Promise<{ inForce: CalibratedMachine; damage: EmbeddingDamage | null }> {
  const inForce = await calibratedMachine(app, made.machine, made.machine.id)
  if (inForce.calibration.number === made.calibration.number) return { inForce, damage: null }
  const input = { problem, embedding, made: sharedGraph(made), now: sharedGraph(inForce) }
  return { inForce, damage: named(await app.compute.run('findDamage', input), embedding, inForce.fabric.ids) }
}
