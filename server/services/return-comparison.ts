import { csvCell } from '../../shared/csv'
import type { Success } from '../../shared/engine/readout/success'
import { successOf, successWithin } from '../../shared/engine/readout/success'
import type { ComparedReturn, ReturnComparison, ReturnComparisonQuery } from '../../shared/schemas/return-comparison'
import type { Actor, App } from '../app'
import { pageOf, positionOf } from '../database/repositories/pages'
import { countReturnsOfProblem, returnsOfProblem } from '../database/repositories/run-sheets'
import type { KnownOptimum } from './known-optimum'
import { knownOptimum } from './known-optimum'
import { problemRow } from './problems'
import type { Bench } from './programming'
import { proportion } from './proportion'
import { decodingRow, weighted } from './return-energies'
import { measuresOf } from './return-measures'
import { decodedBy, readSummary } from './return-summary'
import { returnRow } from './returns'
import { benchOf } from './run-sheets'
import { signOf } from './sense'
import { successView, timeOfReads } from './success-view'

/** Rows of a CSV file; pages of JSON are smaller. */
const FILE_ROWS = 1000

interface Stand {
  bench: Bench
  reference: KnownOptimum | null
}

type Listed = Awaited<ReturnType<typeof returnsOfProblem>>[number]

/** Reads that come within the gap of the reference, of all reads: those that the decoding drops are no successes. */
function successOfAll(
  { reference }: Stand,
  gap: number,
  reads: number,
  decoded: ReturnType<typeof weighted>,
): Success | null {
  if (!reference) return null
  const { energy, tolerance } = reference
  return successOf(successWithin({ ...decoded, reference: energy, gap, tolerance }).successes, reads)
}

function gapOf(best: number | null, { bench, reference }: Stand): number | null {
  if (best === null || !reference) return null
  const gap = signOf(bench.problem.sense) * best - reference.energy
  return Math.abs(gap) <= reference.tolerance ? 0 : gap
}

async function comparedReturn(
  app: App,
  actor: Actor,
  { row, runSheet }: Listed,
  stand: Stand,
  query: ReturnComparisonQuery,
): Promise<ComparedReturn> {
  const { bench } = stand
  const measures = await measuresOf(app, actor, row)
  // The measures need the summary, so it is kept by now, though the row may have been read before.
  const summaryBlobId = row.summaryBlobId ?? (await returnRow(app, actor, row.id)).summaryBlobId!
  const summary = await readSummary(app, summaryBlobId)
  const decoded = decodedBy(summary, query.decode)
  const { best, mean } = decodingRow(bench, decoded)
  const time = timeOfReads(row, bench)
  const success = successOfAll(stand, query.gap, row.reads, weighted(decoded))
  const view = success && successView(success, time)
  return {
    id: row.id,
    number: row.number,
    source: row.source,
    createdAt: row.createdAt.toISOString(),
    runSheet,
    version: bench.problem.version,
    embedding: { id: bench.row.id, number: bench.row.number },
    machine: {
      id: bench.machine.machine.id,
      name: bench.machine.machine.name,
      calibration: bench.machine.calibration.number,
    },
    annealMicroseconds: row.settings.annealMicroseconds,
    gauges: row.settings.gauges,
    reads: row.reads,
    strength: measures.strength,
    scale: measures.scale,
    readsWithBreak: proportion(summary.breaks.readsWithBreak, row.reads),
    chainReads: proportion(measures.chainReads.count, measures.chainReads.total),
    best,
    mean,
    gapOfBest: gapOf(best, stand),
    success: success && proportion(success.successes, success.trials),
    r99: view && view.r99,
    milliseconds: view && view.milliseconds,
    ...time,
    temperature: measures.temperature,
  }
}

/** Rows one after another, so that other requests get their turn; what they stand on is loaded once an embedding. */
async function compared(app: App, actor: Actor, rows: readonly Listed[], query: ReturnComparisonQuery) {
  const stands = new Map<string, Stand>()
  const items: ComparedReturn[] = []
  for (const listed of rows) {
    const { embeddingId } = listed.row
    let stand = stands.get(embeddingId)
    if (!stand) {
      const bench = await benchOf(app, actor, listed.row)
      stand = { bench, reference: await knownOptimum(app, bench) }
      stands.set(embeddingId, stand)
    }
    items.push(await comparedReturn(app, actor, listed, stand, query))
  }
  return items
}

/**
 * All samples of a problem, over run sheets, embeddings, machines, calibrations and versions, side by side: breaks, best
 * energy, success within the gap, time to solution and effective temperature, decoded one way.
 */
export async function returnsCompared(
  app: App,
  actor: Actor,
  problemId: string,
  query: ReturnComparisonQuery,
): Promise<ReturnComparison> {
  const problem = await problemRow(app, actor, problemId)
  const { workspaceId } = actor
  const { limit, cursor, decode, gap } = query
  const offset = positionOf(cursor)
  const rows = await returnsOfProblem(app.db, { workspaceId, problemId, limit: limit + 1, offset })
  const counted = new Map(
    (await countReturnsOfProblem(app.db, workspaceId, problemId)).map((row) => [row.source, row.n]),
  )
  const page = pageOf(rows, limit, offset)
  return {
    items: await compared(app, actor, page.items, query),
    nextCursor: page.nextCursor,
    decode,
    gap,
    sense: problem.sense,
    currentVersion: problem.version,
    counts: { returned: counted.get('upload') ?? 0, rehearsals: counted.get('rehearsal') ?? 0 },
  }
}

const HEAD = [
  'samples,source,made at,run sheet,version,embedding,machine,calibration,least strength,greatest strength,scale',
  'anneal (us),gauges,reads,reads with a break,broken chain reads,chain reads,best energy,mean energy,gap of the best',
  'reads within the gap,success,success low,success high,R99,time to solution (ms),time a read (ms),time is',
  'effective temperature,inverse temperature,its standard error',
].join(',')

function line(item: ComparedReturn): string {
  const { runSheet, embedding, machine, strength, readsWithBreak, chainReads, success, temperature } = item
  const cells = [
    `RS-${runSheet.number}/${item.number}`,
    item.source === 'rehearsal' ? 'rehearsal' : 'returned',
    item.createdAt,
    csvCell(runSheet.name),
    item.version,
    `E-${embedding.number}`,
    csvCell(machine.name),
    machine.calibration,
    strength?.min,
    strength?.max,
    item.scale,
    item.annealMicroseconds,
    item.gauges,
    item.reads,
    readsWithBreak.count,
    chainReads.count,
    chainReads.total,
    item.best,
    item.mean,
    item.gapOfBest,
    success?.count,
    success?.rate,
    success?.low,
    success?.high,
    item.r99?.value,
    item.milliseconds?.value,
    item.millisecondsPerRead,
    item.isTimeMeasured ? 'measured' : 'estimated',
    temperature?.temperature,
    temperature?.inverseTemperature,
    temperature?.standardError,
  ]
  return `${cells.map((cell) => cell ?? '').join(',')}\n`
}

/** The same as CSV, the newest thousand, numbers in full. */
export async function returnsComparedFile(
  app: App,
  actor: Actor,
  problemId: string,
  query: ReturnComparisonQuery,
): Promise<{ fileName: string; text: string }> {
  const { number } = await problemRow(app, actor, problemId)
  const { items } = await returnsCompared(app, actor, problemId, { ...query, limit: FILE_ROWS, cursor: undefined })
  return { fileName: `P-${number}-samples.csv`, text: `${HEAD}\n${items.map(line).join('')}` }
}
