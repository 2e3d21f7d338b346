import type { Embedding } from '../../shared/engine/embedding/embedding'
import { chainCount, chainOf } from '../../shared/engine/embedding/embedding'
import { familyName } from '../../shared/engine/machine/family'
import type { EmbeddingView, StartView } from '../../shared/schemas/embeddings'
import type { Actor, App } from '../app'
import type { EmbeddingRow } from '../database/repositories/embeddings'
import { findEmbeddingOfJob, findNumbers } from '../database/repositories/embeddings'
import type { JobRow } from '../database/repositories/jobs'
import { findJobOfSubject } from '../database/repositories/jobs'
import { personOf } from '../database/repositories/problems'
import { runSheetsOfEmbeddings } from '../database/repositories/run-sheets'
import { brokenView } from './broken-view'
import { namedChains, unpackChains } from './chains'
import { statsView } from './embedding-stats'
import { standingOf } from './problem-difference'
import type { Subject } from './embedding-subject'
import { carriedChains, embeddingRow, subjectOf } from './embedding-subject'
import { machineRow } from './machine-graphs'

/** Most labels of changed chains that are told. */
const CHANGED_TOLD = 200

/** What the embedding was made from; null also where that is deleted by now. */
async function startView(app: App, row: EmbeddingRow, subject: Subject, chains: Embedding): Promise<StartView | null> {
  const { method, startId, frozen, changedChains, replaces } = row
  const numbers = startId ? await findNumbers(app.db, startId) : undefined
  if (!numbers || (method !== 'repair' && method !== 'shorten' && method !== 'edited')) return null
  const start = (await findEmbeddingOfJob(app.db, numbers.id))!
  const found = row.status === 'found'
  return {
    ...numbers,
    work: method,
    frozen,
    changed: changedChains,
    changedChains: found ? changedLabels(await carriedChains(app, subject, start), chains, subject.labels) : [],
    before: start.stats && { longestChain: start.stats.chainLength.max, qubitsUsed: start.stats.qubitsUsed },
    replaces,
  }
}

function changedLabels(before: Embedding, after: Embedding, labels: readonly string[]): string[] {
  const changed = labels.filter((_, i) => String(chainOf(before, i)) !== String(chainOf(after, i)))
  return changed.slice(0, CHANGED_TOLD)
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
  const current = await machineRow(app, row, row.machineId)
  const chains = row.chainsBlobId ? unpackChains(await app.blobs.read(row.chainsBlobId)) : NO_CHAINS
  const named = row.chainsBlobId ? namedChains(chains, labels, machine.fabric.ids) : {}
  const found = row.status === 'found'
  const stats = statsView(row.stats, machine.calibration.qubits)
  const sheets = await runSheetsOfEmbeddings(app.db, [id])
  const job = await findJobOfSubject(app.db, id)
  const broken = await brokenView(app, row)
  return {
    id,
    number: row.number,
    status: row.status,
    jobId: job?.id ?? null,
    ...about(subject),
    ofVersion: await standingOf(app, subject.problem),
    calibrationInForce: current.calibration,
    holdsAtCurrentCalibration: found ? broken === null : null,
    broken,
    ...making(row),
    triesPlanned: triesPlanned(row, job),
    start: await startView(app, row, subject, chains),
    chains: found ? named : {},
    stats: stats && { ...stats, lengthHistogram: lengthHistogram(chains) },
    valid: found,
    unmet: row.unmet ? { ...row.unmet, partialChains: found ? {} : named } : null,
    createdBy: await personOf(app.db, row.createdBy),
    createdAt: row.createdAt.toISOString(),
    runSheets: sheets.map((sheet) => ({ id: sheet.id, number: sheet.number, state: sheet.state })),
  }
}
