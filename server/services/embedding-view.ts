import type { Embedding } from '../../shared/engine/embedding/embedding'
import { chainCount } from '../../shared/engine/embedding/embedding'
import { familyName } from '../../shared/engine/machine/family'
import type { EmbeddingView, StartView } from '../../shared/schemas/embeddings'
import type { Actor, App } from '../app'
import type { EmbeddingRow } from '../database/repositories/embeddings'
import { findNumbers } from '../database/repositories/embeddings'
import type { JobRow } from '../database/repositories/jobs'
import { findJobOfSubject } from '../database/repositories/jobs'
import { personOf } from '../database/repositories/problems'
import { runSheetsOfEmbeddings } from '../database/repositories/run-sheets'
import { namedChains, unpackChains } from './chains'
import { statsView } from './embedding-stats'
import { standingOf } from './problem-difference'
import type { Subject } from './embedding-subject'
import { embeddingRow, subjectOf } from './embedding-subject'
import type { CalibratedMachine } from './machine-graphs'
import { calibratedMachine } from './machine-graphs'

/** True when the embedding still holds at the calibration in force; null when it has no chains. */
async function holdsNow(
  app: App,
  row: EmbeddingRow,
  subject: Subject,
  chains: Embedding,
  current: CalibratedMachine,
): Promise<boolean | null> {
  if (row.status !== 'found') return null
  if (current.calibration.number === row.calibration) return true
  const { violations } = await app.compute.run('checkEmbedding', {
    task: { problem: subject.graph, machine: current.graph, usable: current.usable },
    embedding: chains,
    labels: subject.labels,
    ids: current.fabric.ids,
  })
  return violations.length === 0
}

/** What the embedding was made from; null also where that is deleted by now. */
async function startView(app: App, row: EmbeddingRow): Promise<StartView | null> {
  const { method, startId, frozen, changedChains } = row
  const numbers = startId ? await findNumbers(app.db, startId) : undefined
  if (!numbers || (method !== 'repair' && method !== 'shorten' && method !== 'edited')) return null
  return { ...numbers, work: method, frozen, changed: changedChains }
}

/** How many chains there are of each length. */
function lengthHistogram(chains: Embedding): number[] {
  const { offsets } = chains
  const histogram: number[] = []
  for (let i = 0; i < chainCount(chains); i++) {
    const length = offsets[i + 1]! - offsets[i]!
    while (histogram.length <= length) histogram.push(0)
    histogram[length]!++
  }
  return histogram
}

/** Tries of all methods together, as the search told. */
function triesPlanned({ method, tries }: EmbeddingRow, job: JobRow | undefined): number | null {
  const told = job?.detail.tries
  if (typeof told === 'number') return told
  return method === 'auto' ? null : tries
}

const NO_CHAINS: Embedding = { offsets: Uint32Array.of(0), qubits: new Uint32Array() }

/** What the view tells of the problem and the machine. */
const about = ({ problem, machine: { machine, calibration } }: Subject) => ({
  problem: {
    id: problem.id,
    number: problem.number,
    name: problem.name,
    variables: problem.variables,
    interactions: problem.interactions,
  },
  machine: {
    id: machine.id,
    name: machine.name,
    family: familyName(machine.family),
    qubits: calibration.qubits,
  },
  calibration: calibration.number,
})

/** What was asked for and how it was made. */
const making = (row: EmbeddingRow) => ({
  method: row.method,
  methodUsed: row.methodUsed,
  tryNumber: row.tryNumber,
  seed: row.seed,
  tries: row.tries,
  timeLimitSeconds: row.timeLimitSeconds,
  seconds: row.seconds,
  firstSeconds: row.firstSeconds,
  objective: row.objective,
  target: row.target,
  chosen: row.chosen,
  version: row.version,
  reason: row.reason,
})

/** An embedding with its chains, or what stood in the way. */
export async function embeddingView(app: App, actor: Actor, id: string): Promise<EmbeddingView> {
  const row = await embeddingRow(app, actor, id)
  const subject = await subjectOf(app, actor, row)
  const { labels, machine } = subject
  const current = await calibratedMachine(app, row, row.machineId)
  const chains = row.chainsBlobId ? unpackChains(await app.blobs.read(row.chainsBlobId)) : NO_CHAINS
  const named = row.chainsBlobId ? namedChains(chains, labels, machine.fabric.ids) : {}
  const found = row.status === 'found'
  const stats = statsView(row.stats, machine.calibration.qubits)
  const sheets = await runSheetsOfEmbeddings(app.db, [id])
  const job = await findJobOfSubject(app.db, id)
  return {
    id,
    number: row.number,
    status: row.status,
    jobId: job?.id ?? null,
    ...about(subject),
    ofVersion: await standingOf(app, subject.problem),
    calibrationInForce: current.calibration.number,
    holdsAtCurrentCalibration: await holdsNow(app, row, subject, chains, current),
    ...making(row),
    triesPlanned: triesPlanned(row, job),
    start: await startView(app, row),
    chains: found ? named : {},
    stats: stats && { ...stats, lengthHistogram: lengthHistogram(chains) },
    valid: found,
    unmet: row.unmet ? { ...row.unmet, partialChains: found ? {} : named } : null,
    createdBy: await personOf(app.db, row.createdBy),
    createdAt: row.createdAt.toISOString(),
    runSheets: sheets.map((sheet) => ({ id: sheet.id, number: sheet.number, state: sheet.state })),
  }
}
