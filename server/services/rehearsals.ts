import { randomUUID } from 'node:crypto'
import { strideOf } from '../../shared/engine/sampling/samples'
import { DomainError } from '../../shared/errors'
import type { Rehearse } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import { nextNumber } from '../database/repositories/counters'
import { insertJob } from '../database/repositories/jobs'
import { insertReturn } from '../database/repositories/run-sheets'
import { programmeBench, requireProgrammed } from './programming'
import { rehearsalSettings } from './rehearsal-settings'
import { benchOf, runSheetRow } from './run-sheets'

/** What the samples of one rehearsal may take, a bit a qubit and read: as much as an upload of samples. */
const MAX_SAMPLE_BYTES = 256 * 2 ** 20

/** @throws DomainError when the samples would be more than memory should hold */
export function requireRoom(reads: number, qubits: number): void {
  const most = Math.floor(MAX_SAMPLE_BYTES / strideOf(qubits))
  if (reads <= most) return
  const message = `at most ${most} reads of ${qubits} qubits can be kept`
  throw new DomainError('not acceptable', 'rehearsal.size', `This rehearsal is too large: ${message}.`, [
    { path: 'reads', message },
  ])
}

/** Queues a rehearsal of the run sheet as it stands now. */
export async function startRehearsal(
  app: App,
  actor: Actor,
  runSheetId: string,
  input: Rehearse,
): Promise<{ returnId: string; jobId: string }> {
  const sheet = await runSheetRow(app, actor, runSheetId)
  const bench = await benchOf(app, actor, sheet)
  const programmed = requireProgrammed(programmeBench(bench, sheet.settings))
  requireRoom(input.reads, programmed.qubits.length)
  const made = rehearsalSettings(input, programmed, bench.machine.sheet)
  const returnId = randomUUID()
  const jobId = randomUUID()
  const now = app.now()
  await app.db.transaction(async (tx) => {
    await insertReturn(tx, {
      id: returnId,
      workspaceId: actor.workspaceId,
      runSheetId,
      embeddingId: sheet.embeddingId,
      number: await nextNumber(tx, runSheetId, 'return'),
      source: 'rehearsal',
      status: 'running',
      made,
      settings: sheet.settings,
      reads: input.reads,
      version: app.version,
      createdBy: actor.userId,
      createdAt: now,
    })
    await insertJob(
      tx,
      { id: jobId, workspaceId: actor.workspaceId, kind: 'rehearsal', subjectId: returnId, createdBy: actor.userId },
      now,
    )
  })
  await app.queue.announce(jobId)
  return { returnId, jobId }
}
