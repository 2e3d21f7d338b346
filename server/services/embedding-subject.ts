import type { Embedding } from '../../shared/engine/embedding/embedding'
import type { EmbeddingTask, Start } from '../../shared/engine/embedding/task'
import { chainOf, packChains } from '../../shared/engine/embedding/embedding'
import type { Graph } from '../../shared/engine/graph/graph'
import { convertForm } from '../../shared/engine/problem/convert'
import { matchVariables } from '../../shared/engine/problem/difference/match-variables'
import { geometryOf } from '../../shared/engine/machine/geometry'
import { interactionGraph } from '../../shared/engine/problem/interaction-graph'
import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import type { EmbeddingRow } from '../database/repositories/embeddings'
import { findEmbedding } from '../database/repositories/embeddings'
import type { ProblemRow } from '../database/repositories/problems'
import { findReferredProblem } from '../database/repositories/problems'
import { unpackChains } from './chains'
import type { CalibratedMachine } from './machine-graphs'
import { calibratedMachine } from './machine-graphs'
import { problemData, problemRow } from './problems'

/** An embedding of the workspace. @throws DomainError not found, also for another workspace's */
export async function embeddingRow(app: App, actor: Actor, id: string): Promise<EmbeddingRow> {
  const row = await findEmbedding(app.db, actor.workspaceId, id)
  if (!row) throw new DomainError('not found', 'embedding.unknown', 'There is no such embedding in this workspace.')
  return row
}

/** A problem that is to be embedded, or is, and the machine at one calibration. */
export interface Subject {
  problem: ProblemRow
  labels: string[]
  graph: Graph
  machine: CalibratedMachine
}

/** @throws DomainError not found, also for things of another workspace */
export async function subjectOf(
  app: App,
  actor: Pick<Actor, 'workspaceId'>,
  ids: { problemId: string; problemVersion?: number; machineId: string; calibration?: number },
): Promise<Subject> {
  const problem = await problemRow(app, actor, ids.problemId, ids.problemVersion)
  return withMachine(app, problem, await calibratedMachine(app, actor, ids.machineId, ids.calibration))
}

/** What an embedding that is there stands on. @throws Error when its problem is gone */
export async function subjectOfRow(app: App, row: EmbeddingRow): Promise<Subject> {
  const problem = await findReferredProblem(app.db, row.problemId, row.problemVersion)
  if (!problem) throw new Error('the problem was deleted meanwhile')
  return withMachine(app, problem, await calibratedMachine(app, row, row.machineId, row.calibration))
}

async function withMachine(app: App, problem: ProblemRow, machine: CalibratedMachine): Promise<Subject> {
  const { labels, problem: coefficients } = await problemData(app, problem)
  return { problem, labels, graph: interactionGraph(coefficients), machine }
}

/** What the engine is given. */
export const taskOf = ({ graph, machine }: Subject, start: Start | null): EmbeddingTask => ({
  problem: graph,
  machine: machine.graph,
  usable: machine.usable,
  ...geometryOf(machine.fabric),
  start,
})

/** The place in the earlier problem of every variable of the subject, −1 where it had none. Versions know renames. */
async function earlierPlaces(app: App, { problem, labels }: Subject, earlier: ProblemRow): Promise<Int32Array> {
  const before = await problemData(app, earlier)
  if (earlier.id !== problem.id) {
    const places = new Map(before.labels.map((label, i) => [label, i]))
    return Int32Array.from(labels, (label) => places.get(label) ?? -1)
  }
  const after = await problemData(app, problem)
  const inOneForm = { labels: before.labels, problem: convertForm(before.problem, before.form, after.form) }
  const places = new Int32Array(labels.length).fill(-1)
  matchVariables(inOneForm, after).forEach((j, i) => {
    if (j >= 0) places[j] = i
  })
  return places
}

/**
 * The chains of an earlier embedding on the same machine, for the variables of the subject: by label, and for another
 * version of the same problem also for those renamed since. Empty for those that the earlier problem did not have.
 * Qubits keep their dense indices, which are the fabric's at every calibration.
 */
export async function carriedChains(app: App, subject: Subject, earlier: EmbeddingRow): Promise<Embedding> {
  const chains = unpackChains(await app.blobs.read(earlier.chainsBlobId!))
  if (earlier.problemId === subject.problem.id && earlier.problemVersion === subject.problem.version) return chains
  const problem = await findReferredProblem(app.db, earlier.problemId, earlier.problemVersion)
  const places = await earlierPlaces(app, subject, problem!)
  return packChains(Array.from(places, (place) => (place < 0 ? [] : chainOf(chains, place))))
}

/** Marks the variables that are named. */
export function frozenMask(labels: readonly string[], frozen: readonly string[]): Uint8Array {
  const named = new Set(frozen)
  return Uint8Array.from(labels, (label) => (named.has(label) ? 1 : 0))
}

/** What a new embedding of the subject is stored with, however it is made. */
export const identityOf = (app: App, actor: Actor, { problem, machine }: Subject) => ({
  workspaceId: actor.workspaceId,
  problemId: problem.id,
  problemVersion: problem.version,
  machineId: machine.machine.id,
  calibration: machine.calibration.number,
  version: app.version,
  createdBy: actor.userId,
  createdAt: app.now(),
})
