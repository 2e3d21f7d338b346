import { groupDigits } from '../../../shared/engine/digits'
import { readsPerGauge } from '../../../shared/engine/programming/machine-time'
import type { Programmed } from '../../../shared/engine/programming/programme'
import { joinSamples } from '../../../shared/engine/sampling/merge'
import type { Samples } from '../../../shared/engine/sampling/samples'
import type { App } from '../../app'
import { findEmbeddingOfJob } from '../../database/repositories/embeddings'
import { findReturnOfJob, updateReturn } from '../../database/repositories/run-sheets'
import { loadBench, programmeBench, requireProgrammed } from '../../services/programming'
import type { RehearsalSettings } from '../../services/rehearsals'
import { figuresOf } from '../../services/returns'
import { packSamples, readsIn } from '../../services/samples-data'
import type { JobContext, JobKindHandler } from '../kind'

/** Blocks per thread: small enough to show progress and share the load, large enough to be worth a message. */
const BLOCKS_PER_THREAD = 4
/** Thrown while saving, it also takes back the adoption of what was written. */
const DELETED = 'the run sheet or its embedding was deleted meanwhile'

/** Anneals the programmed problem over the worker threads and stores the samples. */
export const rehearsalJob: JobKindHandler = {
  async run(app, context) {
    const row = await findReturnOfJob(app.db, context.job.subjectId)
    const embedding = row && (await findEmbeddingOfJob(app.db, row.embeddingId))
    if (!row || !embedding) throw new Error(DELETED)
    const started = performance.now()
    const bench = await loadBench(app, embedding)
    const programmed = requireProgrammed(programmeBench(bench, row.settings))
    const settings = row.made as unknown as RehearsalSettings
    const { h: sigmaH, J: sigmaJ } = bench.machine.sheet.controlError
    const error = settings.controlError ? { sigmaH, sigmaJ } : null
    const samples = await annealBlocks(app, context, programmed, {
      ...settings,
      gauges: row.settings.gauges,
      gaugeSeed: row.settings.seed,
      error,
    })
    const seconds = (performance.now() - started) / 1000
    const cancelled = context.signal.aborted
    const reads = readsIn(samples)
    const samplesBlobId = reads > 0 ? await app.blobs.write(packSamples(samples)) : null
    const given = { samples, programmed, ising: bench.ising, sense: bench.problem.sense, seed: row.settings.seed }
    const figures = reads > 0 ? await figuresOf(app, given) : {}
    const status = reads > 0 ? 'ready' : 'cancelled'
    return {
      status: cancelled ? 'cancelled' : 'done',
      message: cancelled
        ? `cancelled; ${groupDigits(reads)} reads were complete and are kept`
        : `${groupDigits(reads)} reads`,
      async save(tx) {
        if (samplesBlobId) await app.blobs.adopt(tx, samplesBlobId)
        const kept = await updateReturn(tx, row.id, {
          status,
          samplesBlobId,
          reads,
          seconds,
          ...figures,
          reason: cancelled ? `Cancelled after ${groupDigits(reads)} ${reads === 1 ? 'read' : 'reads'}.` : null,
        })
        if (!kept) throw new Error(DELETED)
      },
    }
  },
  async abandon(tx, job, status, reason) {
    await updateReturn(tx, job.subjectId, { status, reason })
  },
}

interface BlockSettings extends Pick<RehearsalSettings, 'reads' | 'sweeps' | 'temperature' | 'seed'> {
  gauges: number
  gaugeSeed: number
  error: { sigmaH: number; sigmaJ: number } | null
}

/** Every read has its own random stream, so the cut into blocks changes nothing in the samples. */
async function annealBlocks(
  app: App,
  context: JobContext,
  programmed: Programmed,
  settings: BlockSettings,
): Promise<Samples> {
  const { reads, sweeps, temperature, seed, gauges, gaugeSeed, error } = settings
  const blockSize = Math.max(1, Math.ceil(reads / (app.compute.threads * BLOCKS_PER_THREAD)))
  const blocks: { gauge: number; firstRead: number; reads: number }[] = []
  let firstRead = 0
  readsPerGauge(reads, gauges).forEach((count, gauge) => {
    for (let at = 0; at < count; at += blockSize)
      blocks.push({ gauge, firstRead: firstRead + at, reads: Math.min(blockSize, count - at) })
    firstRead += count
  })
  const done = new Array<number>(blocks.length).fill(0)
  const parts = await Promise.all(
    blocks.map((block, b) =>
      app.compute.run(
        'rehearse',
        {
          programmed,
          gauge: gauges > 1 ? { seed: gaugeSeed, number: block.gauge } : null,
          // Programming the machine anew draws its error anew: one draw a gauge.
          error: error ? { ...error, seed: seed + block.gauge } : null,
          sweeps,
          temperature,
          firstRead: block.firstRead,
          reads: block.reads,
          seed,
        },
        {
          signal: context.signal,
          onProgress: ({ readsDone }) => {
            done[b] = readsDone
            const sum = done.reduce((total, part) => total + part, 0)
            context.report(sum / reads, `${groupDigits(sum)} of ${groupDigits(reads)} reads`, { reads: sum })
          },
        },
      ),
    ),
  )
  return joinSamples(parts)
}
