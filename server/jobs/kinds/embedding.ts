import { chainOf } from '../../../shared/engine/embedding/embedding'
import type { PartialEmbedding } from '../../../shared/engine/embedding/method'
import type { SearchProgress } from '../../../shared/engine/embedding/progress'
import type { SearchResult } from '../../../shared/engine/embedding/search'
import { interactionGraph } from '../../../shared/engine/problem/interaction-graph'
import type { EmbeddingRow } from '../../database/repositories/embeddings'
import { findEmbeddingOfJob, updateEmbedding } from '../../database/repositories/embeddings'
import { findProblem } from '../../database/repositories/problems'
import { packEmbedding } from '../../services/chains'
import { statsView } from '../../services/embeddings'
import { calibratedMachine } from '../../services/machine-graphs'
import { problemData } from '../../services/problems'
import type { App } from '../../app'
import type { JobContext, JobKindHandler, JobOutcome } from '../kind'

/** Thrown while saving, it also takes back the adoption of what was written. */
const DELETED = 'the embedding or its problem was deleted meanwhile'

interface Inputs {
  row: EmbeddingRow
  labels: string[]
  ids: Uint32Array
}

/** Searches for an embedding in a worker thread and stores what was found, or how far it came. */
export const embeddingJob: JobKindHandler = {
  async run(app, context) {
    const row = await findEmbeddingOfJob(app.db, context.job.subjectId)
    const problem = row && (await findProblem(app.db, row.workspaceId, row.problemId))
    if (!row || !problem) throw new Error(DELETED)
    const { labels, problem: coefficients } = await problemData(app, problem)
    const machine = await calibratedMachine(app, row, row.machineId, row.calibration)
    const { seed, tries, timeLimitSeconds } = row
    const output = await app.compute.run(
      'search',
      {
        task: {
          problem: interactionGraph(coefficients),
          machine: machine.graph,
          usable: machine.usable,
          segments: machine.fabric.segments,
          family: machine.fabric.family,
          start: null,
        },
        options: { seed, tries, timeLimitSeconds },
      },
      {
        signal: context.signal,
        onProgress: (progress) =>
          context.report((progress.tryNumber - 1 + progress.fraction) / tries, progressMessage(progress, tries), {
            ...progress,
          }),
      },
    )
    const [violation] = output.violations
    if (violation)
      throw new Error(`the checker refused the embedding (${violation.message}); please report this with seed ${seed}`)
    const inputs = { row, labels, ids: machine.fabric.ids }
    return output.stats
      ? found(app, inputs, output.result, statsView(output.stats))
      : notFound(app, inputs, output.result, context)
  },
  async abandon(tx, job, status, reason) {
    await updateEmbedding(tx, job.subjectId, { status, reason })
  },
}

function progressMessage(
  { phase, tryNumber, overlap, longestChain, qubitsUsed }: SearchProgress,
  tries: number,
): string {
  const best =
    longestChain === null ? 'none valid yet' : `best so far: longest chain ${longestChain}, ${qubitsUsed} qubits`
  return `Try ${tryNumber} of ${tries}, ${phase}, overlap ${overlap}; ${best}`
}

async function found(
  app: App,
  { row }: Inputs,
  result: SearchResult,
  stats: EmbeddingRow['stats'],
): Promise<JobOutcome> {
  const { bytes, fingerprint } = packEmbedding(result.embedding!)
  const chainsBlobId = await app.blobs.write(bytes)
  const early = result.stoppedEarly ? ', stopped early with the best so far' : ''
  return {
    status: 'done',
    message: `found: longest chain ${stats!.chainLength.max}, ${stats!.qubitsUsed} qubits, try ${result.tryNumber} of ${result.tries}${early}`,
    async save(tx) {
      await app.blobs.adopt(tx, chainsBlobId)
      const kept = await updateEmbedding(tx, row.id, {
        status: 'found',
        chainsBlobId,
        fingerprint,
        stats,
        seconds: result.seconds,
        unmet: null,
        reason: null,
      })
      if (!kept) throw new Error(DELETED)
    },
  }
}

async function notFound(app: App, inputs: Inputs, result: SearchResult, context: JobContext): Promise<JobOutcome> {
  const { row } = inputs
  const cancelled = context.signal.aborted
  const why = cancelled
    ? 'Cancelled'
    : result.status === 'timed out'
      ? `None found in the time limit of ${row.timeLimitSeconds} s`
      : `None found in ${result.tries} tries`
  const unmet = result.partial ? unmetOf(inputs, result.partial, why) : null
  const reason = unmet?.message ?? `${why}.`
  const chainsBlobId = result.partial ? await app.blobs.write(packEmbedding(result.partial.chains).bytes) : null
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

/** What stood in the way: the shared qubits of the best state, and whose chains share them. */
function unmetOf({ labels, ids }: Inputs, partial: PartialEmbedding, why: string) {
  const shared = new Set(partial.overlappedQubits)
  const variables = labels.filter((_, i) => chainOf(partial.chains, i).some((q) => shared.has(q)))
  const parts = [
    partial.overlap > 0 ? `${shared.size} ${shared.size === 1 ? 'qubit' : 'qubits'} wanted by more than one chain` : '',
    partial.unmet.length > 0 ? `${partial.unmet.length} interactions without a coupler` : '',
    partial.unplaced > 0 ? `${partial.unplaced} variables without a qubit` : '',
  ].filter(Boolean)
  return {
    message: `${why}. The closest state has ${parts.join(', ') || 'no conflicts'}. More tries, a longer limit or a larger machine may help.`,
    overlap: partial.overlap,
    overlappedQubits: partial.overlappedQubits.map((q) => ids[q]!),
    variables,
    unmetInteractions: partial.unmet.length,
  }
}
