import { interactionCouplers } from '../../shared/engine/embedding/couplers'
import { interactionGraph } from '../../shared/engine/problem/interaction-graph'
import { DomainError } from '../../shared/errors'
import { packArrays } from '../../shared/packed-arrays'
import type { Actor, App } from '../app'
import { unpackChains } from './chains'
import { embeddingRow } from './embedding-subject'
import { calibratedMachine } from './machine-graphs'
import { problemData, problemRow } from './problems'

/**
 * What the lattice view and the chain ledger need of an embedding, by dense index: `offsets` and `qubits` of the
 * chains, `neighbours` (pairs of interacting variables), `couplers` (per variable, to the chains it interacts with);
 * labels and the ranges of the machine at that calibration travel in the header.
 * @throws DomainError wrong state where no chains were found
 */
export async function chainsOf(app: App, actor: Actor, id: string): Promise<Uint8Array> {
  const row = await embeddingRow(app, actor, id)
  if (row.status !== 'found' || !row.chainsBlobId)
    throw new DomainError('wrong state', 'embedding.no-chains', `E-${row.number} is ${row.status}; it has no chains.`)
  const { labels, problem } = await problemData(app, await problemRow(app, actor, row.problemId, row.problemVersion))
  const machine = await calibratedMachine(app, actor, row.machineId, row.calibration)
  const embedding = unpackChains(await app.blobs.read(row.chainsBlobId))
  const graph = interactionGraph(problem)
  const groups = interactionCouplers(embedding, graph, machine.graph).offsets
  const couplers = new Uint32Array(graph.order)
  graph.ends.forEach((variable, p) => (couplers[variable]! += groups[(p >> 1) + 1]! - groups[p >> 1]!))
  const { offsets, qubits } = embedding
  return packArrays({ offsets, qubits, neighbours: graph.ends, couplers }, { labels, ranges: machine.sheet.ranges })
}
