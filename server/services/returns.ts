import { createHash, randomUUID } from 'node:crypto'
import type { z } from 'zod'
import type { Problem } from '../../shared/engine/problem/problem'
import type { Programmed } from '../../shared/engine/programming/programme'
import type { Samples } from '../../shared/engine/sampling/samples'
import { DomainError } from '../../shared/errors'
import type { uploadReturnSchema } from '../../shared/schemas/returns'
import type { Actor, App } from '../app'
import { nextNumber } from '../database/repositories/counters'
import type { ReturnRow } from '../database/repositories/run-sheets'
import { findReturn, insertReturn, updateRunSheet } from '../database/repositories/run-sheets'
import { programmeBench, requireProgrammed } from './programming'
import type { UploadedFile } from './problem-upload'
import { benchOf, runSheetRow } from './run-sheets'
import { packSamples, readsIn } from './samples-data'
import { signed, signOf } from './sense'

/** A return of the workspace. @throws DomainError not found, also for another workspace's */
export async function returnRow(app: App, actor: Actor, id: string): Promise<ReturnRow> {
  const row = await findReturn(app.db, actor.workspaceId, id)
  if (!row) throw new DomainError('not found', 'return.unknown', 'There are no such samples in this workspace.')
  return row
}

interface Given {
  samples: Samples
  programmed: Programmed
  ising: Problem
  sense: 'min' | 'max'
  /** Of the coins that settle ties: the run sheet's, as wherever the samples are shown. */
  seed: number
}

/** The figures kept with a return for lists: reads with a break, and the best majority-decoded energy. */
export async function figuresOf(
  app: App,
  { samples, programmed, ising, sense, seed }: Given,
): Promise<{ readsWithBreak: number; best: number }> {
  const summary = await app.compute.run('summarise', {
    samples,
    programmed,
    ising,
    seed,
    methods: ['majority'],
    solutions: 1,
  })
  return {
    readsWithBreak: summary.breaks.readsWithBreak,
    best: signed(signOf(sense), summary.decoded[0]!.solutions[0]!.energy),
  }
}

/** Checks and stores returned samples; a run sheet that was approved or issued is returned by it. */
export async function uploadReturn(
  app: App,
  actor: Actor,
  runSheetId: string,
  file: UploadedFile,
  options: z.infer<typeof uploadReturnSchema>,
) {
  const sheet = await runSheetRow(app, actor, runSheetId)
  const bench = await benchOf(app, actor, sheet)
  const programmed = requireProgrammed(programmeBench(bench, sheet.settings))
  const qubitIds = Array.from(programmed.qubits, (q) => bench.machine.fabric.ids[q]!)
  const reading = await app.compute.run('readSamplesFile', { bytes: file.bytes, qubitIds })
  if (!reading)
    throw new DomainError(
      'unreadable',
      'samples.not-text',
      `${file.name} is not UTF-8 text. Send the samples as CSV with a header of qubit numbers.`,
    )
  const { samples } = reading
  if (!samples)
    throw new DomainError(
      'not acceptable',
      'samples.refused',
      `${file.name}: ${reading.issues[0]?.message ?? 'no samples could be read'}`,
      reading.issues,
    )
  const samplesBlobId = await app.blobs.write(packSamples(samples))
  const { ising, problem } = bench
  const given = { samples, programmed, ising, sense: problem.sense, seed: sheet.settings.seed }
  const figures = await figuresOf(app, given)
  const id = randomUUID()
  const now = app.now()
  const sha256 = createHash('sha256').update(file.bytes).digest('hex')
  const machineTimeSeconds = options.machineTimeSeconds ?? null
  await app.db.transaction(async (tx) => {
    await app.blobs.adopt(tx, samplesBlobId)
    await insertReturn(tx, {
      id,
      workspaceId: actor.workspaceId,
      runSheetId,
      embeddingId: sheet.embeddingId,
      number: await nextNumber(tx, runSheetId, 'return'),
      source: 'upload',
      status: 'ready',
      made: { file: file.name, sha256, values: reading.valueSet, machineTimeSeconds },
      settings: sheet.settings,
      samplesBlobId,
      reads: readsIn(samples),
      ...figures,
      version: app.version,
      createdBy: actor.userId,
      createdAt: now,
    })
    await updateRunSheet(tx, runSheetId, ['approved', 'issued'], { state: 'returned', changedAt: now })
  })
  return { id, reads: readsIn(samples), rows: samples.rows, ...figures }
}
