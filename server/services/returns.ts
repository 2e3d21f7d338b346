import { randomUUID } from 'node:crypto'
import type { EnergyAgreement } from '../../shared/engine/readout/energy-agreement'
import type { SampleRows } from '../../shared/engine/sampling/samples'
import { DomainError } from '../../shared/errors'
import type { UploadReturn } from '../../shared/schemas/returns'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import { endCallOf } from '../database/repositories/bridge-calls'
import { nextNumber } from '../database/repositories/counters'
import type { ReturnRow } from '../database/repositories/run-sheets'
import { findReturn, insertReturn, updateRunSheet } from '../database/repositories/run-sheets'
import type { ReadSamplesOutput } from '../workers/tasks/read-samples'
import { settleTime } from './budget'
import { programmeBench, requireProgrammed } from './programming'
import { qubitIdsOf } from './qubit-ids'
import type { ReadingWatch } from './problem-upload'
import { writeSummary } from './return-summary'
import { benchOf, runSheetRow } from './run-sheets'
import { packSamples, readsIn } from './samples-data'
import type { StoredFile } from './stored-files'

/** A return of the workspace. @throws DomainError not found, also for another workspace's */
export async function returnRow(app: App, actor: Actor, id: string): Promise<ReturnRow> {
  const row = await findReturn(app.db, actor.workspaceId, id)
  if (!row) throw new DomainError('not found', 'return.unknown', 'There are no such samples in this workspace.')
  return row
}

/** @throws DomainError with the reasons when the file holds nothing that can be accepted */
function requireRows({ reading }: ReadSamplesOutput, fileName: string) {
  if (reading.rows) return reading.rows
  throw new DomainError(
    reading.isReadToEnd ? 'not acceptable' : 'unreadable',
    reading.isReadToEnd ? 'samples.refused' : 'samples.unreadable',
    `${fileName}: ${reading.issues[0]?.message ?? 'no samples could be read'}`,
    [...reading.issues],
  )
}

/** What is kept of how the energies of the file compare; nothing where it had none. */
function energiesMade(agreement: EnergyAgreement | null): Record<string, string | number | null> {
  if (!agreement) return {}
  const { rows, agreeing, meaning, cause, worst, tolerance } = agreement
  return {
    energiesMean: meaning,
    energiesCause: cause,
    energiesAgreeing: agreeing,
    energiesLooked: rows,
    energiesWorst: worst,
    energiesTolerance: tolerance,
  }
}

/** Where uploaded samples come from and what was understood of them. */
const uploadMade = (
  file: StoredFile,
  options: UploadReturn,
  { reading, agreement }: ReadSamplesOutput,
  { rows, gauges }: SampleRows,
): ReturnRow['made'] => ({
  file: file.name,
  bytes: file.bytes,
  sha256: file.sha256,
  format: reading.format,
  container: reading.container,
  values: reading.valueSet,
  columns: reading.columnsFrom,
  rows,
  gauges: options.gauges,
  gaugesKnown: gauges !== null,
  machineTimeSeconds: options.machineTimeSeconds ?? reading.machineTimeSeconds,
  ...energiesMade(agreement),
})

/** How samples came. */
export interface Arrival {
  source: ReturnRow['source']
  /** What else is kept of how they came to be. */
  made: ReturnRow['made']
  /** Notes it where samples are awaited, in the transaction that stores them. */
  note(tx: Db, returnId: string): Promise<void>
}

const byHand = (runSheetId: string): Arrival => ({
  ...{ source: 'upload', made: {} },
  note: (tx) => endCallOf(tx, runSheetId),
})

/**
 * Checks and stores returned samples; a run sheet that was approved or issued is returned by it, unless they are a
 * rehearsal.
 * @param arrival by hand where nothing is said
 * @throws DomainError with every reason when the file cannot be accepted; nothing is kept then
 */
export async function uploadReturn(
  app: App,
  actor: Actor,
  runSheetId: string,
  file: StoredFile,
  options: UploadReturn,
  { source, made, note }: Arrival = byHand(runSheetId),
  watch: ReadingWatch = {},
) {
  const sheet = await runSheetRow(app, actor, runSheetId)
  const bench = await benchOf(app, actor, sheet)
  const programmed = requireProgrammed(programmeBench(bench, sheet.settings))
  const { gauges: count, seed } = sheet.settings
  const output = await app.compute.run(
    'readSamplesFile',
    {
      path: file.path,
      format: options.format,
      qubitIds: qubitIdsOf(bench, programmed),
      order: options.qubitOrder ?? null,
      programmed,
      gauges: { count, seed, areUndone: options.gauges === 'undone' },
    },
    { signal: watch.signal, onProgress: ({ bytes }) => watch.onProgress?.(bytes) },
  )
  const samples = requireRows(output, file.name)
  const samplesBlobId = await app.blobs.write(packSamples(samples))
  const summary = await writeSummary(app, { samples, programmed, ising: bench.ising, seed }, bench.problem.sense)
  const id = randomUUID()
  const now = app.now()
  await app.db.transaction(async (tx) => {
    await app.blobs.adopt(tx, samplesBlobId)
    await app.blobs.adopt(tx, summary.blobId)
    await insertReturn(tx, {
      id,
      workspaceId: actor.workspaceId,
      runSheetId,
      embeddingId: sheet.embeddingId,
      number: await nextNumber(tx, runSheetId, 'return'),
      source,
      status: 'ready',
      made: { ...uploadMade(file, options, output, samples), ...made },
      settings: sheet.settings,
      samplesBlobId,
      summaryBlobId: summary.blobId,
      reads: readsIn(samples),
      ...summary.figures,
      version: app.version,
      createdBy: actor.userId,
      createdAt: now,
    })
    await note(tx, id)
    if (source !== 'upload') return
    if (await updateRunSheet(tx, runSheetId, ['approved', 'issued'], { state: 'returned', changedAt: now })) {
      const seconds = options.machineTimeSeconds ?? output.reading.machineTimeSeconds
      await settleTime(app, tx, sheet, { seconds, by: actor.userId })
    }
  })
  return { id, reads: readsIn(samples), rows: samples.rows, ...summary.figures, energies: output.agreement }
}
