import { randomUUID } from 'node:crypto'
import { packChains } from '../../shared/engine/embedding/embedding'
import { provedInfeasible } from '../../shared/engine/embedding/feasibility'
import { embeddingStats } from '../../shared/engine/embedding/stats'
import { verifyEmbedding } from '../../shared/engine/embedding/verify'
import { familyName } from '../../shared/engine/machine/family'
import { interactionGraph } from '../../shared/engine/problem/interaction-graph'
import { DomainError } from '../../shared/errors'
import type { CreateEmbedding, EmbeddingStats, EmbeddingView, ImportEmbedding } from '../../shared/schemas/embeddings'
import type { Actor, App } from '../app'
import { nextNumber } from '../database/repositories/counters'
import type { EmbeddingRow } from '../database/repositories/embeddings'
import { findEmbedding, insertEmbedding } from '../database/repositories/embeddings'
import { insertJob, findJobOfSubject } from '../database/repositories/jobs'
import { personOf } from '../database/repositories/problems'
import { runSheetsOfEmbeddings } from '../database/repositories/run-sheets'
import { namedChains, packEmbedding, unpackChains } from './chains'
import type { CalibratedMachine } from './machine-graphs'
import { calibratedMachine } from './machine-graphs'
import { problemData, problemRow } from './problems'

type EngineStats = ReturnType<typeof embeddingStats>

export const statsView = ({
  qubitsUsed,
  chainLength,
  chainCouplers,
  interactionCouplers,
}: EngineStats): EmbeddingStats => ({
  qubitsUsed,
  chainLength: { ...chainLength },
  chainCouplers,
  interactionCouplers,
  couplersUsed: chainCouplers + interactionCouplers,
})

/** An embedding of the workspace. @throws DomainError not found, also for another workspace's */
export async function embeddingRow(app: App, actor: Actor, id: string): Promise<EmbeddingRow> {
  const row = await findEmbedding(app.db, actor.workspaceId, id)
  if (!row) throw new DomainError('not found', 'embedding.unknown', 'There is no such embedding in this workspace.')
  return row
}

async function inputsOf(app: App, actor: Actor, input: { problemId: string; machineId: string; calibration?: number }) {
  const problem = await problemRow(app, actor, input.problemId)
  const { labels, problem: coefficients } = await problemData(app, problem)
  const machine = await calibratedMachine(app, actor, input.machineId, input.calibration)
  return { problem, labels, graph: interactionGraph(coefficients), machine }
}

/** Queues a search. Refused at once where a proved bound rules every embedding out. */
export async function startEmbedding(
  app: App,
  actor: Actor,
  input: CreateEmbedding,
): Promise<{ id: string; jobId: string }> {
  const { problem, graph, machine } = await inputsOf(app, actor, input)
  const infeasible = provedInfeasible(graph, machine.graph, machine.usable)
  if (infeasible)
    throw new DomainError(
      'not acceptable',
      'embedding.infeasible',
      `${infeasible.message} Choose a larger machine or a smaller problem.`,
      [{ path: 'machineId', message: infeasible.message }],
    )
  const { seed, tries, timeLimitSeconds } = input
  const id = randomUUID()
  const jobId = randomUUID()
  await app.db.transaction(async (tx) => {
    await insertEmbedding(tx, {
      id,
      ...identityOf(app, actor, problem.id, machine),
      number: await nextNumber(tx, problem.id, 'embedding'),
      status: 'running',
      method: 'search',
      seed,
      tries,
      timeLimitSeconds,
    })
    await insertJob(
      tx,
      { id: jobId, workspaceId: actor.workspaceId, kind: 'embedding', subjectId: id, createdBy: actor.userId },
      app.now(),
    )
  })
  await app.queue.announce(jobId)
  return { id, jobId }
}

const identityOf = (app: App, actor: Actor, problemId: string, { machine, calibration }: CalibratedMachine) => ({
  workspaceId: actor.workspaceId,
  problemId,
  machineId: machine.id,
  calibration: calibration.number,
  version: app.version,
  createdBy: actor.userId,
  createdAt: app.now(),
})

/** Saves chains given by hand, by variable label, after the checker has passed them. */
export async function importEmbedding(app: App, actor: Actor, input: ImportEmbedding): Promise<{ id: string }> {
  const { problem, labels, graph, machine } = await inputsOf(app, actor, input)
  const known = new Set(labels)
  const unknown = Object.keys(input.chains).filter((label) => !known.has(label))
  const issues = unknown.map((label) => ({ path: `chains.${label}`, message: `the problem has no variable ${label}` }))
  const { fabric, indexOf } = machine
  const outside = fabric.graph.order
  const chains = labels.map((label) => (Object.hasOwn(input.chains, label) ? input.chains[label]! : []))
  // A number that the family lacks becomes an index outside the machine, which the checker names as unknown.
  const dense = chains.map((chain) => chain.map((number) => (indexOf(number) < 0 ? outside + number : indexOf(number))))
  const violations = verifyEmbedding(graph, machine.graph, machine.usable, dense, {
    label: (i) => labels[i]!,
    qubitName: (q) => String(q < outside ? fabric.ids[q] : q - outside),
  })
  issues.push(
    ...violations.map(({ variables, message }) => ({ path: `chains.${labels[variables[0] ?? 0] ?? ''}`, message })),
  )
  if (issues.length > 0)
    throw new DomainError(
      'not acceptable',
      'embedding.invalid',
      `These chains break ${issues.length} rules; the first: ${issues[0]!.message}.`,
      issues.slice(0, 200),
    )
  const embedding = packChains(dense)
  const { bytes, fingerprint } = packEmbedding(embedding)
  const chainsBlobId = await app.blobs.write(bytes)
  const id = randomUUID()
  await app.db.transaction(async (tx) => {
    await app.blobs.adopt(tx, chainsBlobId)
    await insertEmbedding(tx, {
      id,
      ...identityOf(app, actor, problem.id, machine),
      number: await nextNumber(tx, problem.id, 'embedding'),
      status: 'found',
      method: 'imported',
      seed: 0,
      tries: 0,
      timeLimitSeconds: 0,
      seconds: 0,
      chainsBlobId,
      fingerprint,
      stats: statsView(embeddingStats(embedding, graph, machine.graph)),
    })
  })
  return { id }
}

/** True when the embedding still holds at the calibration in force; null when it has no chains. */
async function holdsNow(
  app: App,
  row: EmbeddingRow,
  graph: ReturnType<typeof interactionGraph>,
): Promise<boolean | null> {
  if (row.status !== 'found' || !row.chainsBlobId) return null
  const current = await calibratedMachine(app, row, row.machineId)
  if (current.machine.calibration === row.calibration) return true
  return (
    verifyEmbedding(graph, current.graph, current.usable, unpackChains(await app.blobs.read(row.chainsBlobId)))
      .length === 0
  )
}

export async function embeddingView(app: App, actor: Actor, id: string): Promise<EmbeddingView> {
  const row = await embeddingRow(app, actor, id)
  const { problem, labels, graph, machine } = await inputsOf(app, actor, row)
  const chains = row.chainsBlobId
    ? namedChains(unpackChains(await app.blobs.read(row.chainsBlobId)), labels, machine.fabric.ids)
    : {}
  const job = await findJobOfSubject(app.db, id)
  const found = row.status === 'found'
  return {
    id,
    number: row.number,
    status: row.status,
    jobId: job?.id ?? null,
    problem: {
      id: problem.id,
      number: problem.number,
      name: problem.name,
      variables: problem.variables,
      interactions: problem.interactions,
    },
    machine: {
      id: machine.machine.id,
      name: machine.machine.name,
      family: familyName(machine.machine.family),
      qubits: machine.calibration.qubits,
    },
    calibration: row.calibration,
    holdsAtCurrentCalibration: await holdsNow(app, row, graph),
    method: row.method,
    seed: row.seed,
    tries: row.tries,
    timeLimitSeconds: row.timeLimitSeconds,
    seconds: row.seconds,
    version: row.version,
    chains: found ? chains : {},
    stats: row.stats,
    valid: found,
    unmet: row.unmet ? { ...row.unmet, partialChains: found ? {} : chains } : null,
    reason: row.reason,
    createdBy: await personOf(app.db, row.createdBy),
    createdAt: row.createdAt.toISOString(),
    runSheets: (await runSheetsOfEmbeddings(app.db, [id])).map((sheet) => ({
      id: sheet.id,
      number: sheet.number,
      state: sheet.state,
    })),
  }
}
