import { randomUUID } from 'node:crypto'
import type { z } from 'zod'
import { ANNEAL_DEFAULTS } from '../../shared/engine/sampling/anneal'
import type { rehearseSchema } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import { nextNumber } from '../database/repositories/counters'
import { insertJob } from '../database/repositories/jobs'
import { insertReturn } from '../database/repositories/run-sheets'
import { programmeBench, requireProgrammed } from './programming'
import { benchOf, runSheetRow } from './run-sheets'

/** What made the samples of a rehearsal, kept with them. */
export interface RehearsalSettings extends Record<string, string | number | boolean | null> {
  reads: number
  sweeps: number
  /** Final temperature in units of the programmed values. */
  temperature: number
  controlError: boolean
  seed: number
}

/** Queues a rehearsal of the run sheet as it stands now. */
export async function startRehearsal(
  app: App,
  actor: Actor,
  runSheetId: string,
  input: z.infer<typeof rehearseSchema>,
): Promise<{ returnId: string; jobId: string }> {
  const sheet = await runSheetRow(app, actor, runSheetId)
  requireProgrammed(programmeBench(await benchOf(app, actor, sheet), sheet.settings))
  const made: RehearsalSettings = { ...input, temperature: input.temperature ?? ANNEAL_DEFAULTS.temperature }
  const returnId = randomUUID()
  const jobId = randomUUID()
  const now = app.now()
  await app.db.transaction(async (tx) => {
    await insertReturn(tx, {
      id: returnId,
      workspaceId: actor.workspaceId,
      runSheetId,
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
