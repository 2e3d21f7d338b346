import { randomUUID } from 'node:crypto'
import { kneeOf } from '../../shared/engine/readout/knee'
import { DomainError } from '../../shared/errors'
import type { PageQuery } from '../../shared/schemas/common'
import type { RunSheetSettings } from '../../shared/schemas/run-sheets'
import type { ReturnedAtStrength, RunSheetScans, ScanRequest, ScanView } from '../../shared/schemas/scans'
import type { Actor, App } from '../app'
import { nextNumber } from '../database/repositories/counters'
import { insertJob, jobsOfSubjects } from '../database/repositories/jobs'
import { readPage } from '../database/repositories/pages'
import { findScan, insertScan, scansOfRunSheet } from '../database/repositories/scans'
import { returnedOnEmbedding } from '../database/repositories/run-sheets'
import { proportion } from './proportion'
import { requireRoom } from './rehearsals'
import type { Bench } from './programming'
import { programmeBench, requireProgrammed } from './programming'
import { benchOf, runSheetRow } from './run-sheets'
import { signOf } from './sense'

/** Closer than this, against their size, strengths are one. */
const SAME_STRENGTH = 1e-9

/** Settings of a run sheet with one strength for all chains. */
export const atStrength = (settings: RunSheetSettings, value: number): RunSheetSettings => ({
  ...settings,
  strength: { rule: 'manual', value },
})

/** Queues the rehearsal of a run sheet as it stands now at several strengths. @throws DomainError for one that cannot be programmed */
export async function startScan(
  app: App,
  actor: Actor,
  runSheetId: string,
  input: ScanRequest,
): Promise<{ id: string; jobId: string }> {
  const sheet = await runSheetRow(app, actor, runSheetId)
  const bench = await benchOf(app, actor, sheet)
  const strengths = [...input.strengths].sort((a, b) => a - b)
  for (const strength of strengths)
    requireUsable(strength, () => programmeBench(bench, atStrength(sheet.settings, strength)))
  requireRoom(input.reads, bench.embedding.qubits.length)
  const [id, jobId, now] = [randomUUID(), randomUUID(), app.now()]
  const { workspaceId, userId: createdBy } = actor
  await app.db.transaction(async (tx) => {
    await insertScan(tx, {
      id,
      workspaceId,
      runSheetId,
      embeddingId: sheet.embeddingId,
      number: await nextNumber(tx, runSheetId, 'scan'),
      status: 'running',
      made: { ...input, strengths },
      settings: sheet.settings,
      version: app.version,
      createdBy,
      createdAt: now,
    })
    await insertJob(tx, { id: jobId, workspaceId, kind: 'scan', subjectId: id, createdBy }, now)
  })
  await app.queue.announce(jobId)
  return { id, jobId }
}

function requireUsable(strength: number, programme: () => Parameters<typeof requireProgrammed>[0]): void {
  try {
    requireProgrammed(programme())
  } catch (error) {
    if (!(error instanceof DomainError)) throw error
    throw new DomainError('not acceptable', 'scan.strength', `Strength ${strength} cannot be tried: ${error.message}`, [
      { path: 'strengths', message: `${strength} cannot be programmed` },
    ])
  }
}

type Row = NonNullable<Awaited<ReturnType<typeof findScan>>>

function viewOf({ scan, by }: Row, jobId: string | null, sense: 'min' | 'max'): ScanView {
  const { points } = scan
  // The rule looks for low energies; maximised problems are shown with their sign turned.
  const knee = kneeOf(
    points.map(({ strength, energy }) => ({
      strength,
      mean: signOf(sense) * energy.mean,
      standardError: energy.standardError,
    })),
  )
  return {
    id: scan.id,
    number: scan.number,
    status: scan.status,
    jobId,
    made: scan.made,
    points,
    knee: knee && { strength: points[knee.index]!.strength, edge: knee.edge },
    reason: scan.reason,
    seconds: scan.seconds,
    version: scan.version,
    by,
    createdAt: scan.createdAt.toISOString(),
  }
}

export async function scanView(app: App, actor: Actor, id: string): Promise<ScanView> {
  const row = await findScan(app.db, actor.workspaceId, id)
  if (!row) throw new DomainError('not found', 'scan.unknown', 'There is no such scan in this workspace.')
  const { problem } = await benchOf(app, actor, row.scan)
  const jobs = await jobsOfSubjects(app.db, [id])
  return viewOf(row, jobs.get(id) ?? null, problem.sense)
}

/** The scans of a run sheet, newest first, and what the machine returned on its embedding. */
export async function scansOf(app: App, actor: Actor, runSheetId: string, query: PageQuery): Promise<RunSheetScans> {
  const sheet = await runSheetRow(app, actor, runSheetId)
  const bench = await benchOf(app, actor, sheet)
  const { items: rows, nextCursor } = await readPage(
    query,
    (place) => scansOfRunSheet(app.db, runSheetId, place),
    (row) => row,
  )
  const jobs = await jobsOfSubjects(
    app.db,
    rows.map(({ scan }) => scan.id),
  )
  return {
    items: rows.map((row) => viewOf(row, jobs.get(row.scan.id) ?? null, bench.problem.sense)),
    nextCursor,
    returned: await returnedOn(app, bench),
  }
}

/** Returned samples whose chains all had one strength: rules that give each chain its own have no place on the axis. */
async function returnedOn(app: App, bench: Bench): Promise<ReturnedAtStrength[]> {
  const points: ReturnedAtStrength[] = []
  for (const { row, runSheet } of await returnedOnEmbedding(app.db, bench.row.id)) {
    const { strengths } = programmeBench(bench, row.settings)
    const [least, most] = [Math.min(...strengths), Math.max(...strengths)]
    if (most - least > SAME_STRENGTH * most || row.readsWithBreak === null || row.best === null) continue
    const readsWithBreak = proportion(row.readsWithBreak, row.reads)
    points.push({ returnId: row.id, number: row.number, runSheet, strength: most, readsWithBreak, best: row.best })
  }
  return points
}
