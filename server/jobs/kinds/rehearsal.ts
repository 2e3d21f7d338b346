import { groupDigits } from '../../../shared/engine/digits'
import { thermalGigahertz } from '../../../shared/engine/machine/energy-units'
import { readsPerGauge } from '../../../shared/engine/programming/machine-time'
import type { Programmed } from '../../../shared/engine/programming/programme'
import { straightSchedule } from '../../../shared/engine/programming/schedule'
import { wholeGroups } from '../../../shared/engine/sampling/lanes/lane-model'
import { joinSamples } from '../../../shared/engine/sampling/merge'
import type { SampleRows } from '../../../shared/engine/sampling/samples'
import type { MachineSheet } from '../../../shared/schemas/machines'
import type { RunSheetSettings } from '../../../shared/schemas/run-sheets'
import type { App } from '../../app'
import { findEmbeddingOfJob } from '../../database/repositories/embeddings'
import { findReturnOfJob, updateReturn } from '../../database/repositories/run-sheets'
import { loadBench, programmeBench, requireProgrammed } from '../../services/programming'
import type { RehearsalSettings } from '../../services/rehearsal-settings'
import { writeSummary } from '../../services/return-summary'
import { packSamples, readsIn } from '../../services/samples-data'
import type { RehearseInput } from '../../workers/tasks/rehearse'
import type { JobContext, JobKindHandler } from '../kind'

/** Shares per thread: small enough to show progress and share the load, large enough to be worth a message. */
const SHARES_PER_THREAD = 4
/** Thrown while saving, it also takes back the adoption of what was written. */
const DELETED = 'the run sheet or its embedding was deleted meanwhile'

/** Rehearses the programmed problem over the worker threads and stores the samples. */
export const rehearsalJob: JobKindHandler = {
  async run(app, context) {
    const row = await findReturnOfJob(app.db, context.job.subjectId)
    const embedding = row && (await findEmbeddingOfJob(app.db, row.embeddingId))
    if (!row || !embedding) throw new Error(DELETED)
    const started = performance.now()
    const bench = await loadBench(app, embedding)
    const programmed = requireProgrammed(programmeBench(bench, row.settings))
    const settings = row.made as unknown as RehearsalSettings
    const shares = sharesOf(programmed, settings, row.settings, bench.machine.sheet, app.compute.threads)
    const samples = await rehearseShares(app, context, shares, settings.reads)
    const seconds = (performance.now() - started) / 1000
    const cancelled = context.signal.aborted
    const reads = readsIn(samples)
    const samplesBlobId = reads > 0 ? await app.blobs.write(packSamples(samples)) : null
    const given = { samples, programmed, ising: bench.ising, seed: row.settings.seed }
    const summary = reads > 0 ? await writeSummary(app, given, bench.problem.sense) : null
    const status = reads > 0 ? 'ready' : 'cancelled'
    return {
      status: cancelled ? 'cancelled' : 'done',
      message: cancelled
        ? `cancelled; ${groupDigits(reads)} reads were complete and are kept`
        : `${groupDigits(reads)} reads`,
      async save(tx) {
        for (const blobId of [samplesBlobId, summary?.blobId]) if (blobId) await app.blobs.adopt(tx, blobId)
        const kept = await updateReturn(tx, row.id, {
          status,
          samplesBlobId,
          summaryBlobId: summary?.blobId ?? null,
          reads,
          seconds,
          ...summary?.figures,
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

/** What samples each read, as the settings say. */
function methodOf(
  settings: RehearsalSettings,
  { schedule, annealMicroseconds }: RunSheetSettings,
  sheet: MachineSheet,
): RehearseInput['method'] {
  // Rehearsals queued before there was a choice say neither model nor arithmetic.
  const { model, temperature, arithmetic = '64-bit', slices } = settings
  if (model !== 'path-integral') return { model: 'simulated annealing', temperature, arithmetic }
  const points = schedule ?? straightSchedule(annealMicroseconds)
  return {
    model,
    slices: slices!,
    table: sheet.energyTable!,
    temperature: thermalGigahertz(sheet.temperatureMillikelvin!),
    schedule: { t: points.map(({ microseconds }) => microseconds), s: points.map(({ s }) => s) },
  }
}

/**
 * The reads of a rehearsal, gauge by gauge, in shares for the threads. A share begins where a group of reads does and
 * every group has its own random stream, so how the reads are cut changes nothing in the samples; the reads of a gauge are
 * numbered from a group's first, so that no group is computed for two gauges.
 */
export function sharesOf(
  programmed: Programmed,
  settings: RehearsalSettings,
  runSheet: RunSheetSettings,
  sheet: MachineSheet,
  threads: number,
): RehearseInput[] {
  const { reads, sweeps, seed, controlError } = settings
  const { gauges, seed: gaugeSeed } = runSheet
  const { h: sigmaH, J: sigmaJ } = sheet.controlError
  const most = wholeGroups(reads / (threads * SHARES_PER_THREAD))
  const method = methodOf(settings, runSheet, sheet)
  const shares: RehearseInput[] = []
  let first = 0
  readsPerGauge(reads, gauges).forEach((count, gauge) => {
    for (let at = 0; at < count; at += most)
      shares.push({
        programmed,
        gauge: gauges > 1 ? { seed: gaugeSeed, number: gauge } : null,
        // Programming the machine anew draws its error anew: one draw a gauge.
        error: controlError ? { sigmaH, sigmaJ, seed: seed + gauge } : null,
        sweeps,
        method,
        firstRead: first + at,
        reads: Math.min(most, count - at),
        seed,
      })
    first += wholeGroups(count)
  })
  return shares
}

async function rehearseShares(
  app: App,
  context: JobContext,
  shares: readonly RehearseInput[],
  reads: number,
): Promise<SampleRows> {
  const done = new Array<number>(shares.length).fill(0)
  const parts = await Promise.all(
    shares.map((share, index) =>
      app.compute.run('rehearse', share, {
        signal: context.signal,
        onProgress: ({ readsDone }) => {
          done[index] = readsDone
          const sum = done.reduce((total, part) => total + part, 0)
          context.report(sum / reads, `${groupDigits(sum)} of ${groupDigits(reads)} reads`, { reads: sum })
        },
      }),
    ),
  )
  const gauges = parts.flatMap(({ rows }, k) => new Array<number>(rows).fill(shares[k]!.gauge?.number ?? 0))
  return { ...joinSamples(parts), gauges: Uint32Array.from(gauges), energies: null }
}
