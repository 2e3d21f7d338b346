import { groupDigits, THIN_SPACE } from '../../../shared/engine/digits'
import type { SearchOptions, SearchResult } from '../../../shared/engine/embedding/search'
import { outcomeOf } from '../../../shared/engine/embedding/search'
import type { EmbeddingTask, Start } from '../../../shared/engine/embedding/task'
import type { EmbeddingProgress } from '../../../shared/schemas/embeddings'
import type { App } from '../../app'
import type { EmbeddingRow } from '../../database/repositories/embeddings'
import { findEmbeddingOfJob, updateEmbedding } from '../../database/repositories/embeddings'
import { changedChains, packEmbedding } from '../../services/chains'
import { storeVerdict } from '../../services/broken-embeddings'
import { damageOfChains } from '../../services/embedding-damage'
import { takePlace } from '../../services/repair-moves'
import { storedStats } from '../../services/embedding-stats'
import type { Subject } from '../../services/embedding-subject'
import { carriedChains, frozenMask, subjectOfRow, taskOf } from '../../services/embedding-subject'
import { shareArrays } from '../../workers/shared-arrays'
import { newSearchClock, secondsOn } from '../../workers/search-clock'
import type { JobContext, JobKindHandler, JobOutcome } from '../kind'
import { SearchMonitor } from '../search/search-monitor'
import { spreadTries } from '../search/spread-tries'
import type { Ending } from '../search/unmet'
import { provedOnly, unmetOf } from '../search/unmet'

/** Thrown while saving, it also takes back the adoption of what was written. */
const DELETED = 'the embedding or its problem was deleted meanwhile'

interface Search {
  row: EmbeddingRow
  subject: Subject
  task: EmbeddingTask
  options: SearchOptions
}

/** Makes an embedding on the worker threads and stores what was found, or how far it came. */
export const embeddingJob: JobKindHandler = {
  async run(app, context) {
    const row = await findEmbeddingOfJob(app.db, context.job.subjectId)
    if (!row) throw new Error(DELETED)
    const subject = await subjectOfRow(app, row)
    const task = taskOf(subject, await startOfRow(app, row, subject))
    const search = { row, subject, task, options: optionsOf(row) }
    const result = await runTries(app, context, search)
    return result.embedding ? found(app, context, search, result) : notFound(app, context, search, result)
  },
  async abandon(tx, job, status, reason) {
    await updateEmbedding(tx, job.subjectId, { status, reason })
  },
}

async function startOfRow(app: App, row: EmbeddingRow, subject: Subject): Promise<Start | null> {
  if (row.method !== 'repair' && row.method !== 'shorten') return null
  const earlier = row.startId ? await findEmbeddingOfJob(app.db, row.startId) : undefined
  if (!earlier) throw new Error('the embedding to begin from was deleted meanwhile')
  return { chains: await carriedChains(app, subject, earlier), frozen: frozenMask(subject.labels, row.frozen) }
}

function optionsOf({ method, seed, tries, timeLimitSeconds, objective, target }: EmbeddingRow): SearchOptions {
  if (method === 'imported' || method === 'edited') throw new Error(`an ${method} embedding is not searched for`)
  return { method, seed, tries, timeLimitSeconds, objective, target }
}

/** Plans the tries, runs as many at once as there are threads, and puts their results together. */
async function runTries(app: App, context: JobContext, search: Search): Promise<SearchResult> {
  const { options } = search
  const { signal } = context
  const task = shareArrays(search.task)
  const plan = await app.compute.run('planSearch', { task, options })
  const clock = newSearchClock()
  const monitor = new SearchMonitor(plan.length, options.objective, options.timeLimitSeconds)
  const tell = (detail: EmbeddingProgress | null): void => {
    if (detail) context.report(monitor.fraction, monitor.message(detail), { ...detail })
  }
  const results = await spreadTries({
    plan,
    threads: app.compute.threads,
    signal,
    run: async (planned, endTry) => {
      monitor.began(planned)
      const result = await app.compute.run(
        'runTry',
        { task, planned, settings: options, clock },
        {
          signal: endTry,
          unbegun: null,
          onProgress: (progress) => tell(monitor.report(progress, secondsOn(clock))),
        },
      )
      tell(monitor.ended(planned, result?.quality ?? null, secondsOn(clock)))
      return result
    },
  })
  return outcomeOf(results, plan.length, options, secondsOn(clock))
}

/**
 * Checks the embedding once more with the separate checker before it is saved, and looks whether a calibration saved since
 * the search began breaks it; a repair takes the place of what it began from.
 */
async function found(
  app: App,
  { job, signal }: JobContext,
  { row, subject, task, options }: Search,
  result: SearchResult,
): Promise<JobOutcome> {
  const embedding = result.embedding!
  const { violations, stats } = await app.compute.run('checkEmbedding', {
    task,
    embedding,
    labels: subject.labels,
    ids: subject.machine.fabric.ids,
  })
  if (!stats)
    throw new Error(
      `the checker refused the embedding (${violations[0]!.message}); please report this with seed ${options.seed}`,
    )
  const { bytes, fingerprint } = packEmbedding(embedding)
  const chainsBlobId = await app.blobs.write(bytes)
  const early = !result.stoppedEarly
    ? ''
    : `, stopped early ${signal.aborted ? 'when it was cancelled' : 'at the time limit'} with the best so far`
  const set = {
    status: 'found' as const,
    methodUsed: result.method,
    tryNumber: result.tryNumber,
    chainsBlobId,
    fingerprint,
    stats: storedStats(stats),
    seconds: result.seconds,
    firstSeconds: result.firstSeconds,
    changedChains: task.start ? changedChains(task.start.chains, embedding) : null,
    unmet: null,
    reason: null,
  }
  const outcome = async (): Promise<JobOutcome> => {
    const { inForce, damage } = await damageOfChains(app, embedding, subject.graph, subject.machine)
    return {
      status: 'done',
      message: `found: longest chain ${groupDigits(stats.chainLength.max)}, ${groupDigits(stats.qubitsUsed)} qubits, by ${result.method} in try ${groupDigits(result.tryNumber)} of ${groupDigits(result.tries)}${early}`,
      async save(tx) {
        await app.blobs.adopt(tx, chainsBlobId)
        if (!(await updateEmbedding(tx, row.id, set))) throw new Error(DELETED)
        const made = { embedding: { ...row, ...set }, problem: subject.problem.name }
        await storeVerdict(app, tx, made, { machine: inForce.machine, damage })
        if (row.replaces && !damage) await takePlace(app, tx, made.embedding, subject, job.createdBy)
      },
      again: outcome,
    }
  }
  return outcome()
}

/** Why there is none; by a proof where a longer look finds one. */
async function endingOf(app: App, signal: AbortSignal, { row, task }: Search, result: SearchResult): Promise<Ending> {
  if (signal.aborted) return { words: 'Cancelled', proved: false }
  const proof = await app.compute.run('proveInfeasible', { task, thorough: true })
  if (proof) return { words: `There is no embedding. ${proof.message.replace(/\.$/, '')}`, proved: true }
  const within =
    result.status === 'timed out'
      ? `the time limit of ${row.timeLimitSeconds}${THIN_SPACE}s`
      : `${groupDigits(result.tries)} ${result.tries === 1 ? 'try' : 'tries'}`
  return { words: `None found in ${within}`, proved: false }
}

/** What stood in the way, from the closest state and the proof; null where there is neither. */
async function unmetBy(app: App, { subject, task }: Search, { partial }: SearchResult, ending: Ending) {
  if (!partial) return ending.proved ? provedOnly(ending) : null
  return unmetOf(subject, partial, await app.compute.run('advise', { task, partial }), ending)
}

async function notFound(app: App, { signal }: JobContext, search: Search, result: SearchResult): Promise<JobOutcome> {
  const { row } = search
  const ending = await endingOf(app, signal, search, result)
  const cancelled = signal.aborted
  const { partial } = result
  const unmet = await unmetBy(app, search, result, ending)
  const reason = unmet?.message ?? `${ending.words}.`
  const chainsBlobId = partial ? await app.blobs.write(packEmbedding(partial.chains).bytes) : null
  return {
    status: cancelled ? 'cancelled' : 'done',
    message: reason,
    async save(tx) {
      if (chainsBlobId) await app.blobs.adopt(tx, chainsBlobId)
      const kept = await updateEmbedding(tx, row.id, {
        status: cancelled ? 'cancelled' : 'none found',
        chainsBlobId,
        unmet,
        reason,
        seconds: result.seconds,
      })
      if (!kept) throw new Error(DELETED)
    },
  }
}
